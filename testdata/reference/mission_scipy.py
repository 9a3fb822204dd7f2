"""Flies the two variants of mission_scipy.json with SciPy: their own mission, written
to mission_scipy.csv, and the legs of mission_kinds.json, written to mission_kinds.csv.

An implementation of its own of the published methods, for comparison with the program:

    python3 mission_scipy.py        (Debian: python3-scipy)

What it does otherwise than the program: every optimum (best rate of climb, best
endurance, best range, share of power, level maximum, most thrust in hand) is found anew at every evaluation of the
derivatives, not interpolated between nodes; legs are integrated by an explicit
Runge-Kutta pair of order 8 to 1e-10; roots by brentq. Tables are SciPy's
PchipInterpolator, whose slopes are those of Fritsch and Butland (1984) with the
three-point end slope: the same published formula as the program's.

Sources: U.S. Standard Atmosphere 1976; WMO-No. 8 vapour pressure; Liepmann and Roshko
1957 (pitot relations); Gagg and Ferrar 1934 (lapse); Glauert 1935 (disc); Anderson 1999
(polar, ground effect, climb with acceleration, turns); Raymer 1992 (arcs of take-off and landing).
"""
import copy
import json
import math
import os

from scipy.integrate import solve_ivp
from scipy.interpolate import PchipInterpolator
from scipy.optimize import brentq, minimize_scalar

G, R, GAMMA, T0, P0 = 9.80665, 287.05287, 1.4, 288.15, 101325.0
RHO0 = P0 / (R * T0)
A0 = math.sqrt(GAMMA * R * T0)


def standard(hp):
    """Temperature and pressure of the troposphere; the mission stays below 11 km."""
    t = T0 - 0.0065 * hp
    return t, P0 * (t / T0) ** (G / (R * 0.0065))


class Air:
    def __init__(self, hp, day):
        t, self.p = standard(hp)
        self.hp, self.t = hp, t + day["isa_deviation"]
        self.ratio = self.t / t
        c = self.t - 273.15
        e = day["humidity"] * 611.2 * math.exp(17.62 * c / (243.12 + c))
        self.rho = (self.p - 0.378 * e) / (R * self.t)
        self.sigma = (self.p - e) / (R * self.t) / RHO0
        self.a = math.sqrt(GAMMA * R * self.t)

    def tas(self, cas):
        qc = P0 * ((1 + 0.2 * (cas / A0) ** 2) ** 3.5 - 1)
        return self.a * math.sqrt(5 * ((qc / self.p + 1) ** (1 / 3.5) - 1))


class Curve:
    """A PchipInterpolator read at one place quickly; its end values are held."""

    def __init__(self, rows, column=1):
        x = [r[0] for r in rows]
        self.pchip = PchipInterpolator(x, [r[column] for r in rows])
        self.x = x
        self.c = self.pchip.c.T.tolist()
        self.first, self.last = rows[0][column], rows[-1][column]

    def __call__(self, x):
        if x <= self.x[0]:
            return self.first
        if x >= self.x[-1]:
            return self.last
        i = 0
        while x >= self.x[i + 1]:
            i += 1
        u = x - self.x[i]
        c3, c2, c1, c0 = self.c[i]
        return c0 + u * (c1 + u * (c2 + u * c3))


class Engine:
    def __init__(self, v):
        e = v["engine"]
        self.e, self.curve, self.sfc = e, Curve(e["power_curve"]), Curve(e["consumption_curve"])
        self.rated = max(r[1] for r in e["power_curve"])
        self.gear, self.loss, self.acc = e["gear_ratio"], e["installation_loss"], e["accessory_power"]

    def sea_level(self, n):
        n *= self.gear
        low = self.curve.x[0]
        return self.curve(n) if n >= low else self.curve.first * n / low

    def full(self, air, n):
        return self.sea_level(n) * (air.sigma - (1 - air.sigma) / 7.55) * (1 - self.loss)

    def burn(self, shaft):
        """Fuel flow and share of rated power at a propeller power."""
        brake = (shaft + self.acc) / (1 - self.loss)
        return max(self.e["idle_flow"], self.sfc(brake / self.rated) * brake), brake / self.rated


class FixedPitch:
    def __init__(self, v):
        p = v["propeller"]
        self.engine, self.d = Engine(v), p["diameter"]
        self.ct, self.cp = Curve(p["coefficients"]), Curve(p["coefficients"], 2)
        self.jmax = p["coefficients"][-1][0]
        self.top = v["engine"]["redline"] / v["engine"]["gear_ratio"]

    def thrust(self, air, v, n):
        return self.ct(v / (n * self.d)) * air.rho * n**2 * self.d**4

    def absorbed(self, air, v, n):
        return self.cp(v / (n * self.d)) * air.rho * n**3 * self.d**5

    def low(self, v):
        return max(v / (self.jmax * self.d), 1e-3 * self.top)

    def run(self, air, v, setting):
        """Thrust and fuel flow at a setting above idle: torque balance, or the redline."""
        def surplus(n):
            return max(0.0, setting * self.engine.full(air, n) - self.engine.acc) - self.absorbed(air, v, n)
        n = self.top
        if surplus(n) < 0:
            while surplus(n) < 0:
                n *= 0.96
            n = brentq(surplus, n, n / 0.96, xtol=1e-13, rtol=1e-14)
        return self.thrust(air, v, n), self.engine.burn(max(0.0, self.absorbed(air, v, n)))[0]

    def idle(self, air, v):
        return self.thrust(air, v, v / (self.jmax * self.d)) if v > 0 else 0.0

    def part(self, air, v, want):
        """Fuel flow and share of power that give the thrust wanted."""
        if want <= self.idle(air, v):
            raise ValueError("below idle")
        n = brentq(lambda n: self.thrust(air, v, n) - want, self.low(v), self.top, xtol=1e-13, rtol=1e-14)
        shaft = max(0.0, self.absorbed(air, v, n))
        if (shaft + self.engine.acc) > self.engine.full(air, n) * (1 + 1e-9):
            raise ValueError("not enough thrust")
        return self.engine.burn(shaft)


class ConstantSpeed:
    def __init__(self, v):
        p = v["propeller"]
        self.engine, self.n, self.k = Engine(v), p["speed"], p["loss_factor"]
        self.area = math.pi * p["diameter"] ** 2 / 4

    def run(self, air, v, setting):
        shaft = setting * self.engine.full(air, self.n) - self.engine.acc
        c = self.k * shaft / (2 * air.rho * self.area)
        w = brentq(lambda w: (v + w) ** 2 * w - c, 0.0, 1.1 * c ** (1 / 3), xtol=1e-13, rtol=1e-14)
        return 2 * air.rho * self.area * (v + w) * w, self.engine.burn(shaft)[0]

    def idle(self, air, v):
        return 0.0

    def part(self, air, v, want):
        w = -v / 2 + math.sqrt(v * v / 4 + want / (2 * air.rho * self.area))
        shaft = want * (v + w) / self.k
        if shaft + self.engine.acc > self.engine.full(air, self.n) * (1 + 1e-9):
            raise ValueError("not enough thrust")
        return self.engine.burn(shaft)


class Aircraft:
    def __init__(self, doc, day):
        f, w, v = doc["airframe"], doc["weights"], doc["powerplant"]["values"]
        self.f, self.s, self.day = f, f["wing_area"], day
        self.k = 1 / (math.pi * f["span"] ** 2 / f["wing_area"] * f["efficiency"])
        fixed = v["propeller"]["kind"] == "fixed-pitch"
        self.plant = FixedPitch(v) if fixed else ConstantSpeed(v)
        tank = v["fuel"]
        self.fuel = (tank["volume"] - tank["unusable"]) * tank["density"]
        self.mass = w["empty"] + v["mass"] + sum(i["mass"] for i in w["items"]) + tank["volume"] * tank["density"]
        r = 16 * f["wing_height"] / f["span"]
        self.ground = r * r / (1 + r * r)

    def cd(self, cl, config="clean", phi=1.0):
        c = self.f[config]
        return self.f["cd_min"] + c["delta_cd"] + phi * self.k * (cl - self.f["cl_min_drag"] - c["delta_clm"]) ** 2

    def drag(self, air, v, lift, config="clean"):
        qs = 0.5 * air.rho * v * v * self.s
        return qs * self.cd(lift / qs, config)

    def stall(self, air, mass, config="clean"):
        return math.sqrt(2 * mass * G / (air.rho * self.s * self.f[config]["cl_max"]))

    def level(self, air, mass, v, load=1.0):
        """Fuel flow and share of power in level flight, straight or in a turn; within 1e-4 of full thrust, full power."""
        want = self.drag(air, v, load * mass * G)
        try:
            return self.plant.part(air, v, want)
        except ValueError:
            thrust, flow = self.plant.run(air, v, 1.0)
            if want > thrust * (1 + 1e-4):
                raise
            return flow, 1.0

    def hand(self, air, mass, v, load=1.0):
        """Thrust in hand at full power."""
        return self.plant.run(air, v, 1.0)[0] - self.drag(air, v, load * mass * G)

    def most_in_hand(self, air, mass, load):
        stall = self.stall(air, mass) * math.sqrt(load)
        return max(1.2 * stall, self.best(lambda v: self.hand(air, mass, v, load), stall, air.tas(self.f["never_exceed"])))

    def level_max(self, air, mass):
        v = air.tas(self.f["never_exceed"])
        if self.hand(air, mass, v) >= 0:
            return v
        while self.hand(air, mass, v) < 0:
            v -= 1.0
        return brentq(lambda v: self.hand(air, mass, v), v, v + 1.0, xtol=1e-12)

    def angle(self, air, mass, v, thrust, f=0.0, config="clean"):
        """Path angle of L = W cos, T - D = W sin (1 + f)."""
        w = mass * G
        return brentq(lambda x: thrust - self.drag(air, v, w * math.cos(x), config) - w * math.sin(x) * (1 + f),
                      -1.0, 1.0, xtol=1e-15, rtol=1e-14)

    def best(self, merit, lo, hi):
        """The argument that makes merit greatest: scan, minimize_scalar, then the root of the difference quotient."""
        def safe(v):
            try:
                return merit(v)
            except ValueError:
                return -math.inf
        grid = [lo + (hi - lo) * i / 30 for i in range(31)]
        i = max(range(31), key=lambda i: safe(grid[i]))
        a, b = grid[max(i - 1, 0)], grid[min(i + 1, 30)]
        x = minimize_scalar(lambda v: -safe(v), bounds=(a, b), method="bounded", options={"xatol": 1e-7}).x
        h = 0.02
        if x - lo < 2 * h or hi - x < 2 * h:
            return lo if safe(lo) > safe(x) else x
        slope = lambda v: merit(v + h) - merit(v - h)
        return brentq(slope, x - h, x + h, xtol=1e-12) if slope(x - h) * slope(x + h) < 0 else x

    def best_rate(self, air, mass):
        def rate(v):
            return v * math.sin(self.angle(air, mass, v, self.plant.run(air, v, 1.0)[0]))
        return self.best(rate, self.stall(air, mass), air.tas(self.f["never_exceed"]))

    def least_flow(self, air, mass, wind, for_range):
        def merit(v):
            flow = self.level(air, mass, v)[0]
            return 1e3 * (v - wind if for_range else 1.0) * 1e-3 / flow
        return self.best(merit, self.stall(air, mass), air.tas(self.f["never_exceed"]))

    def at_share(self, air, mass, share):
        """The fastest level speed on a share of rated power."""
        v = self.stall(air, mass) * 1.2
        while self.level(air, mass, v)[1] < share:
            v += 0.5
        return brentq(lambda v: self.level(air, mass, v)[1] - share, v - 0.5, v, xtol=1e-12)


class Flight:
    def __init__(self, project, variant):
        self.doc, self.day = project, project["day"]
        self.aboard = sum(i["mass"] for i in variant["aircraft"]["weights"]["items"])
        self.a = Aircraft(variant["aircraft"], self.day)
        self.name, self.mass, self.left, self.rows = variant["id"], self.a.mass, self.a.fuel, []
        self.trip, self.kept = 0.0, []
        self.strip, self.how = project["strips"][0], project["technique"]
        qnh = self.day["qnh"]
        self.field = self.strip["elevation"] + T0 / 0.0065 * (1 - (qnh / P0) ** (R * 0.0065 / G))
        self.hp = self.field
        self.mu = {"dry-grass": (0.06, 0.3)}[self.strip["surface"]]

    def air(self, hp):
        return Air(hp, self.day)

    def fly(self):
        self.onward(self.doc["legs"])
        return self.rows

    def onward(self, legs):
        for i, leg in enumerate(legs):
            if leg.get("extent") == "rest":
                leg = dict(leg, extent="distance", distance=self.rest(leg, legs[i + 1:]))
            self.one(leg)

    def one(self, leg):
        kinds = {"taxi": self.taxi, "take-off": self.take_off, "landing": self.landing, "drop": self.load, "pick-up": self.load,
                 "contingency": self.contingency, "alternate": self.alternate}
        day = self.day
        if leg["day_given"] == "own":
            self.day = dict(day, isa_deviation=leg["isa_deviation"])
        time, distance, fuel, extra = kinds.get(leg["kind"], self.path)(leg)
        self.day = day
        self.mass -= fuel
        self.left -= fuel
        if leg["kind"] not in ("taxi", "alternate", "contingency", "reserve"):
            self.trip += fuel
        self.rows.append((self.name, leg["name"], time, distance, fuel, self.hp) + extra + (self.mass,))

    def rest(self, leg, after):
        """The distance after which the legs that follow leave what the contingencies keep."""
        def over(distance):
            f = copy.copy(self)
            f.kept, f.rows = [], []
            f.one(dict(leg, extent="distance", distance=distance))
            f.onward(after)
            return f.left - sum(max(share * f.trip, held) for share, held in f.kept)
        return brentq(over, 0.0, 900e3, xtol=1e-4, rtol=1e-12)

    def load(self, leg):
        change = leg["payload"] if leg["kind"] == "pick-up" else -leg["payload"]
        self.aboard += change
        assert self.aboard >= 0
        self.mass += change
        return 0.0, 0.0, 0.0, ("", "")

    def contingency(self, leg):
        air = self.air(leg["altitude"])
        v = self.a.least_flow(air, self.mass, 0.0, False)
        self.kept = self.kept + [(leg["share"], self.a.level(air, self.mass, v)[0] * leg["time"])]
        return 0.0, 0.0, 0.0, ("", "")

    def alternate(self, leg):
        """Up at best rate, then level for the rest of the distance."""
        time, distance, fuel, extra = self.path(dict(leg, kind="climb", speed_rule="best-rate"))
        self.mass -= fuel
        more = self.path(dict(leg, kind="cruise", extent="distance", distance=leg["distance"] - distance))
        self.mass += fuel
        return time + more[0], distance + more[1], fuel + more[2], extra

    def taxi(self, leg):
        flow = self.a.plant.run(self.air(self.hp), 0.0, leg["setting"])[1]
        return leg["time"], 0.0, flow * leg["time"], ("", "")

    def take_off(self, leg):
        a, air, how, wind = self.a, self.air(self.field), self.how, self.strip["head_wind"]
        tilt, mu, w, m = math.atan(self.strip["slope"]), self.mu[0], self.mass * G, self.mass
        vs = a.stall(air, m, "take_off")
        off, screen = how["lift_off_factor"] * vs, how["climb_out_factor"] * vs
        cl = a.f["ground_cl"]
        cd = a.cd(cl, "take_off", a.ground)

        def rates(t, y):
            v = max(0.0, y[0] + wind)
            qs = 0.5 * air.rho * v * v * a.s
            thrust, flow = a.plant.run(air, v, 1.0)
            return [(thrust - qs * cd - mu * max(0.0, w * math.cos(tilt) - qs * cl) - w * math.sin(tilt)) / m, y[0], flow]
        stop = lambda t, y: y[0] + wind - off
        stop.terminal = True
        sol = solve_ivp(rates, (0, 200), [0, 0, 0], "DOP853", events=stop, rtol=1e-11, atol=1e-11)
        time, (_, distance, fuel) = sol.t[-1], sol.y[:, -1]
        flow = a.plant.run(air, off, 1.0)[1]
        time, distance, fuel = time + how["rotation_time"], distance + (off - wind) * how["rotation_time"], fuel + flow * how["rotation_time"]
        ground = distance
        thrust, flow = a.plant.run(air, screen, 1.0)
        gamma = a.angle(air, m, screen, thrust, config="take_off")
        arc = (off + screen) / 2
        radius, height = arc * arc / (G * 0.2), self.strip["obstacle"]
        turn = gamma if radius * (1 - math.cos(gamma)) < height else math.acos(1 - height / radius)
        seconds = radius * turn / arc
        distance += radius * math.sin(turn) - wind * seconds
        rest = height - radius * (1 - math.cos(turn))
        climb = max(0.0, rest / (screen * math.sin(gamma)))
        distance += climb * (screen * math.cos(gamma) - wind)
        seconds += climb
        self.hp = self.field + height / air.ratio
        return time + seconds, 0.0, fuel + flow * seconds, (ground, distance)

    def landing(self, leg):
        a, air, how, wind, m = self.a, self.air(self.field), self.how, self.strip["head_wind"], self.mass
        self.hp = self.field
        tilt, w = math.atan(self.strip["slope"]), self.mass * G
        mu = max(self.mu[0], how["braking_fraction"] * self.mu[1])
        vs = a.stall(air, m, "landing")
        approach, touch, gamma, height = how["approach_factor"] * vs, 1.15 * vs, how["approach_angle"], self.strip["obstacle"]
        arc = (approach + touch) / 2
        radius = arc * arc / (G * 0.2)
        begin = radius * (1 - math.cos(gamma))
        seconds = (height - begin) / (approach * math.sin(gamma))
        distance = seconds * (approach * math.cos(gamma) - wind)
        flare = radius * gamma / arc
        distance += radius * math.sin(gamma) - wind * flare
        ground, time = (touch - wind) * how["free_roll_time"], seconds + flare + how["free_roll_time"]
        cl = a.f["ground_cl"]
        cd = a.cd(cl, "landing", a.ground)

        def rates(t, y):
            v = y[0] + wind
            qs = 0.5 * air.rho * v * v * a.s
            load = max(0.0, w * math.cos(tilt) - qs * cl)
            return [(a.plant.idle(air, v) - qs * cd - mu * load - w * math.sin(tilt)) / m, y[0]]
        stop = lambda t, y: y[0]
        stop.terminal = True
        sol = solve_ivp(rates, (0, 200), [touch - wind, 0], "DOP853", events=stop, rtol=1e-11, atol=1e-11)
        time, ground = time + sol.t[-1], ground + sol.y[1, -1]
        return time, 0.0, time * a.plant.engine.e["idle_flow"], (ground, distance + ground)

    def speed(self, leg, hp, mass):
        air, rule = self.air(hp), leg["speed_rule"]
        if rule == "cas":
            return air.tas(leg["speed"])
        if rule == "best-rate":
            return self.a.best_rate(air, mass)
        if rule == "tas":
            return leg["speed"]
        if rule == "mach":
            return leg["mach"] * air.a
        if rule == "maximum":
            return self.a.level_max(air, mass)
        if rule == "most-in-hand":
            return self.a.most_in_hand(air, mass, self.load_factor(leg))
        if rule == "percent-power":
            return self.a.at_share(air, mass, leg["power"])
        return self.a.least_flow(air, mass, leg["head_wind"], rule == "best-range")

    def factor(self, leg, air, mass, v, lost):
        """Acceleration factor (V/g) dV/dh along the flight path, on which the mass falls by lost kg a metre."""
        h = 10.0
        dv = self.speed(leg, air.hp + h, mass - lost * h) - self.speed(leg, air.hp - h, mass + lost * h)
        return v / G * dv / (2 * h) / air.ratio

    def load_factor(self, leg):
        if leg["kind"] != "turns":
            return 1.0
        return leg["load_factor"] if leg["path"] == "load-factor" else 1 / math.cos(leg["bank"])

    def path(self, leg):
        load = self.load_factor(leg)
        a, start, inclined = self.a, self.mass, leg["kind"] in ("climb", "descent")
        circles = leg["kind"] in ("loiter", "turns") or leg["kind"] == "reserve" and leg["extent"] == "time"
        if leg["kind"] == "reserve":
            self.hp = leg["altitude"]

        def rates(t, y):
            hp, mass = y[1], start - y[2]
            air, v = self.air(hp), self.speed(leg, hp, mass)
            if not inclined:
                ground = 0.0 if circles else v - leg["head_wind"]
                return [ground, 0.0, a.level(air, mass, v, load)[0], G * math.sqrt(load * load - 1) / v]
            if leg["kind"] == "climb":
                thrust, flow = a.plant.run(air, v, 1.0)
                lost = flow * air.ratio / (v * math.sin(a.angle(air, mass, v, thrust)))
                gamma = a.angle(air, mass, v, thrust, self.factor(leg, air, mass, v, lost))
            else:
                f = self.factor(leg, air, mass, v, 0.0)
                gamma = -math.asin(leg["rate"] / v)
                w = mass * G
                flow = a.plant.part(air, v, a.drag(air, v, w * math.cos(gamma)) + w * math.sin(gamma) * (1 + f))[0]
            return [v * math.cos(gamma) - leg["head_wind"], v * math.sin(gamma) / air.ratio, flow, 0.0]

        events = None
        span = leg["time"]
        if inclined:
            events, span = (lambda t, y: y[1] - leg["altitude"]), 1e5
        elif leg["kind"] in ("cruise", "dash") and leg["extent"] == "distance":
            if leg["distance"] <= 0:
                return 0.0, 0.0, 0.0, ("", "")
            events, span = (lambda t, y: y[0] - leg["distance"]), 1e5
        elif leg["kind"] == "turns":
            angle = leg["heading"] if leg["extent"] == "heading" else 2 * math.pi * leg["turns"]
            events, span = (lambda t, y: y[3] - angle), 1e5
        if events:
            events.terminal = True
        sol = solve_ivp(rates, (0, span), [0, self.hp, 0, 0], "DOP853", events=events, rtol=1e-10, atol=1e-9, first_step=min(span, 30.0))
        distance, self.hp, fuel, _ = sol.y[:, -1]
        return sol.t[-1], distance, fuel, ("", "")


HEAD = """\
# title: A whole mission of nine legs, flown by two variants: fixed pitch (a) and constant speed (b)
# source: mission_scipy.py beside this file, an independent integration of mission_scipy.json with SciPy {version}; its own text names the published relations
# status: computed by that script, outside the program
# tolerance time: 1e-6 relative; steps of the program's integration are accurate to 1e-8, and events to 1e-10 of ten days; the take-off to 5e-6, as its end is read off a step of seconds, and the climb to 1e-4, because its best speed is interpolated between five altitudes and the acceleration follows from the interpolation's slope
# tolerance distance: 1e-6 relative; as time, and 0.001 where a leg has none
# tolerance fuel: 3e-6 relative; as time, and the table of consumption has jumps of curvature that the steps pass over
# tolerance altitude: 0.002; an event is located to 1e-10 of ten days, 0.1 ms, in which the aircraft climbs less than a millimetre
# tolerance ground: 5e-6 relative; as the time of the take-off
# tolerance total: 5e-6 relative; as the time of the take-off
variant,leg,time,distance,fuel,altitude,ground,total
"""


KINDS = """\
# title: The other kinds of leg, flown by two variants: fixed pitch (a) and constant speed (b)
# source: mission_scipy.py beside this file, an independent integration of the legs of mission_kinds.json by the aircraft of mission_scipy.json with SciPy {version}; its own text names the published relations
# status: computed by that script, outside the program
# tolerance time: 2e-6 relative; as in mission_scipy.csv, 0.001 where a leg has none
# tolerance distance: 2e-6 relative; as time, and 0.001 where a leg has none; the cruise for the rest of the range to 5e-6, as it takes up the differences of fuel of all other legs, the 1e-7 of the fuel that the program leaves over, and flies 20 m for each gram
# tolerance fuel: 3e-6 relative; as in mission_scipy.csv, and 1e-6 where a leg has none
# tolerance altitude: 0.002; as in mission_scipy.csv
# tolerance mass: 5e-4; a thousandth of a gram of fuel in a kilogram, over what was burnt so far, the climb's tolerance of 1e-4 among it
# tolerance kept: 2e-5 relative; a share of the fuel of all other legs, or the flow at best endurance, which is flat, at a mass as above
variant,leg,time,distance,fuel,altitude,mass,kept
"""


def cells(row):
    """The row as text; a time, distance or fuel has a tolerance of its own where the header says so."""
    own = {"Take-off": 5e-6, "Climb": 1e-4}.get(row[1])
    for i, x in enumerate(row):
        if isinstance(x, str):
            yield x
        elif i == 3 and x == 0:
            yield "0±0.001"
        elif own and 2 <= i <= 4:
            yield "%.9g±%.2g" % (x, own * x)
        else:
            yield "%.9g" % x


def kinds_cells(flight, row, contingency):
    """The row of mission_kinds.csv: without the strip's distances, with the mass reached and what a contingency keeps."""
    name, kept = row[1], ""
    if contingency is not None:
        share, held = contingency
        kept = "%.9g" % max(share * flight.trip, held)
    own = {"Take-off": 5e-6, "Climb": 1e-4, "Alternate": 1e-4, "Cruise": 5e-6}.get(name, 0)
    yield from row[:2]
    for i, x in enumerate(row[2:6]):
        if x == 0:
            yield "0±%s" % ("0.001", "0.001", "1e-06", "0.002")[i]
        elif own and i < 3:
            yield "%.9g±%.2g" % (x, own * x)
        else:
            yield "%.9g" % x
    yield "%.9g" % row[-1]
    yield kept


def main():
    import scipy
    here = os.path.dirname(os.path.abspath(__file__))
    read = lambda name: json.load(open(os.path.join(here, name)))
    project, kinds = read("mission_scipy.json"), read("mission_kinds.json")
    with open(os.path.join(here, "mission_scipy.csv"), "w") as out:
        out.write(HEAD.format(version=scipy.__version__))
        for variant in project["variants"]:
            for row in Flight(project, variant).fly():
                out.write(",".join(cells(row[:-1])) + "\n")
    project["legs"] = kinds["legs"]
    with open(os.path.join(here, "mission_kinds.csv"), "w") as out:
        out.write(KINDS.format(version=scipy.__version__))
        for variant in project["variants"]:
            flight = Flight(project, variant)
            rows = flight.fly()
            held = iter(flight.kept)
            for leg, row in zip(project["legs"], rows):
                out.write(",".join(kinds_cells(flight, row, next(held) if leg["kind"] == "contingency" else None)) + "\n")


if __name__ == "__main__":
    main()
