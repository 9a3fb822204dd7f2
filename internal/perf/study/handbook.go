package study

import (
	"math"
	"slices"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// A Handbook is the axes of the tables that a flight handbook gives. Each table is
// computed a cell or a row at a time by the methods beside it, in any order and at once,
// so that whoever asks may share the work out.
type Handbook struct {
	Masses       []HandbookMass // rising
	Ground       []float64      // pressure altitudes of take-off and landing in m, rising
	Temperatures []float64      // of the air at take-off and landing in K, rising
	Aloft        []float64      // pressure altitudes of the climb in m, rising
	Deviations   []float64      // of temperature from standard in the climb in K, rising
	Cruise       []float64      // pressure altitudes of the cruise in m, rising
	Shares       []float64      // of the rated power or thrust in cruise, 0 to 1, rising; 1 stands for all there is
	CruiseMass   float64        // half way between start and landing, in kg
	HeadWind     float64        // of the glide against wind in m/s
	Banks        []float64      // of the stall in rad, rising
}

// A HandbookMass is a mass of the tables.
type HandbookMass struct {
	Label string
	Mass  float64 // in kg
}

// Full stands among the shares for all the power there is.
const Full = 1.0

var (
	handbookShares     = []float64{0.45, 0.55, 0.65, 0.75, Full}
	handbookDeviations = []float64{-20, 0, 20}
	handbookCelsius    = []float64{0, 10, 20, 30, 40}
	handbookBanks      = []float64{0, 30, 45, 60} // in degrees
)

// Handbook chooses the axes: round altitudes in the project's unit, and the masses of note.
func (s *Study) Handbook() Handbook {
	sys := s.Project.Spec.System()
	h := Handbook{Deviations: slices.Clone(handbookDeviations), Shares: []float64{Full}, HeadWind: 5,
		CruiseMass: (s.Masses.Start + s.Masses.Landing) / 2}
	step := 500.0
	if sys == units.Aviation {
		h.HeadWind, step = sys.Step(units.Speed, 10), sys.Step(units.Altitude, 2000)
	}
	for _, m := range gathered([]namedMass{{"fuel used up", s.Aircraft().DryMass()}, {"start of the mission", s.Masses.Start}, {"greatest take-off", s.Masses.MaxTakeOff}}) {
		h.Masses = append(h.Masses, HandbookMass{m.label, m.mass})
	}
	for _, c := range handbookCelsius {
		h.Temperatures = append(h.Temperatures, 273.15+c)
	}
	for _, b := range handbookBanks {
		h.Banks = append(h.Banks, b*math.Pi/180)
	}
	const rows, most = 6, 10
	hp := s.Project.Departure.Air.PressureAltitude
	first := math.Min(0, math.Floor(hp/step))
	last := math.Min(math.Max(first+rows-1, math.Ceil(hp/step)+1), first+most-1)
	for i := first; i <= last; i++ {
		h.Ground = append(h.Ground, i*step)
	}
	top := hp + 2*step
	if s.Service.Err == nil {
		top = s.Service.Value
	}
	h.Aloft = rungs(top, 12, sys)
	h.Cruise = rungs(0.85*top, 7, sys)
	if c := s.HandbookCruise(h.CruiseMass, h.Cruise[0], Full); c.Err == nil {
		h.Shares = sharesBelow(c.Level.Output.Fraction)
	}
	return h
}

// sharesBelow are round shares of the rating below the one that full level flight makes, and Full.
func sharesBelow(full float64) []float64 {
	if full >= handbookShares[len(handbookShares)-2] {
		return slices.Clone(handbookShares)
	}
	const n = 4
	step := 0.1
	if full < (n+1)*step {
		step = math.Max(full/(n+1), 0.01)
		step = math.Floor(step*100) / 100
	}
	top := math.Ceil(full/step-1e-9) - 1
	var list []float64
	for i := top - n + 1; i <= top; i++ {
		if i > 0 {
			list = append(list, math.Round(i*step*100)/100)
		}
	}
	return append(list, Full)
}

// rungs are about n steps of round altitudes in m from sea level to at most top.
func rungs(top float64, n int, sys units.System) []float64 {
	step := roundStep(top*10/float64(n), sys)
	list := []float64{0}
	for i := 1.0; i*step <= top*(1+1e-9); i++ {
		list = append(list, i*step)
	}
	return list
}

// handbookDay is the project's humidity at a deviation from standard in K.
func (s *Study) handbookDay(deviation float64) atmos.Day {
	return atmos.Day{Deviation: deviation, Humidity: s.Project.Plan.Day.Humidity}
}

// HandbookPlace is the ground of the take-off or landing tables: the surface and the
// obstacle of the mission's strip, level and in calm air.
func (s *Study) HandbookPlace(landing bool) runway.Place {
	at := s.Project.Departure
	if landing {
		at = s.Project.Arrival
	}
	at.Strip.Slope, at.HeadWind = 0, 0
	return at
}

// HandbookRun is the take-off or landing at the mass in kg, the pressure altitude in m and
// the air temperature in K on HandbookPlace.
func (s *Study) HandbookRun(landing bool, mass, hp, temperature float64) FieldPoint {
	how := s.Project.Plan.Technique
	f := Field{Landing: landing, Humidity: s.Project.Plan.Day.Humidity, Factor: how.TakeOffFactor}
	if landing {
		f.Factor = how.LandingFactor
	}
	f.Present = Strip{Place: s.HandbookPlace(landing), Mass: mass}
	standard, _, err := atmos.Standard(hp)
	if err != nil {
		return FieldPoint{Altitude: hp, Mass: mass, Word: "no air", Err: err}
	}
	return s.elsewhere(&f, hp, temperature-standard, f.Humidity)
}

// A HandbookClimb is the best rate of climb at one condition, or the reason why there is none.
type HandbookClimb struct {
	Rate     float64 // geometric, in m/s
	CAS      float64 // calibrated airspeed of it in m/s
	Gradient float64 // of the path at that speed, dimensionless
	Err      error
}

// HandbookClimb is the climb at full setting, clean, at the mass in kg, the pressure
// altitude in m and the deviation of temperature from standard in K.
func (s *Study) HandbookClimb(mass, hp, deviation float64) HandbookClimb {
	air, err := s.handbookDay(deviation).At(hp, nil)
	if err != nil {
		return HandbookClimb{Err: err}
	}
	p := &pointperf.Point{Air: air, Mass: mass}
	best := pointperf.BestRate(s.Aircraft(), p)
	if best.Err != nil {
		return HandbookClimb{Err: best.Err}
	}
	if best.Value <= 0 {
		return HandbookClimb{Err: units.Errorf(nil, "it does not climb there: at best it sinks at {}", units.Of(units.ClimbRate, -best.Value))}
	}
	climb, err := pointperf.FullClimb(s.Aircraft(), p, best.TAS, nil)
	return HandbookClimb{Rate: best.Value, CAS: float64(air.CAS(best.TAS)), Gradient: climb.Gradient(), Err: err}
}

// HandbookToClimb is time, fuel and distance to climb on the project's day from the
// departure strip, the mass in kg there. It may hold rows and an error, which says why it stops short.
func (s *Study) HandbookToClimb(mass float64) ([]mission.ClimbRow, error) {
	if s.Service.Err != nil {
		return nil, s.Service.Err
	}
	return mission.ClimbProfile(s.Aircraft(), s.Project.Plan.Day, mass, s.climbAltitudes())
}

// HandbookCeilings are the ceilings at the mass in kg and the deviation in K.
func (s *Study) HandbookCeilings(mass, deviation float64) (service, absolute Altitude) {
	day := s.handbookDay(deviation)
	service.Value, service.Err = pointperf.Ceiling(s.Aircraft(), day, mass, aircraft.Clean, pointperf.ServiceRate)
	absolute.Value, absolute.Err = pointperf.Ceiling(s.Aircraft(), day, mass, aircraft.Clean, pointperf.AbsoluteRate)
	return service, absolute
}

// HandbookStall is the calibrated airspeed of the stall in m/s at the departure strip, at the
// mass in kg and in a level turn at the bank in rad, 0 to below π/2.
func (s *Study) HandbookStall(config aircraft.Config, mass, bank float64) float64 {
	air := s.Project.Departure.Air
	p := &pointperf.Point{Air: air, Mass: mass, Config: config}
	return float64(air.CAS(pointperf.Stall(s.Aircraft(), p, nil) * math.Sqrt(pointperf.LoadFactor(bank, nil))))
}

// A HandbookGlide is the glide at idle at one mass.
type HandbookGlide struct {
	Glide    pointperf.Glide
	Against  pointperf.GroundGlide
	RatioCAS float64 // calibrated airspeed of the best ratio in m/s
	SinkCAS  float64 // of the least sink in m/s
	WindCAS  float64 // of the best ratio against the wind in m/s
	Err      error   // why there is no glide
	WindErr  error   // why there is none against the wind
}

// HandbookGlide glides clean from the altitude of the departure strip, at the mass in kg,
// in calm air and against the head wind in m/s.
func (s *Study) HandbookGlide(mass, headWind float64) HandbookGlide {
	air := s.Project.Departure.Air
	p := &pointperf.Point{Air: air, Mass: mass}
	var g HandbookGlide
	g.Glide, g.Err = pointperf.BestGlide(s.Aircraft(), p)
	g.Against, g.WindErr = pointperf.GlideInWind(s.Aircraft(), p, headWind)
	if g.Err == nil {
		g.RatioCAS, g.SinkCAS = float64(air.CAS(g.Glide.RatioTAS)), float64(air.CAS(g.Glide.SinkTAS))
	}
	if g.WindErr == nil {
		g.WindCAS = float64(air.CAS(g.Against.TAS))
	}
	return g
}

// HandbookSpeeds are the speeds of note, clean, on the departure strip's air, at the mass in kg.
func (s *Study) HandbookSpeeds(mass float64) pointperf.Speeds {
	return pointperf.AllSpeeds(s.Aircraft(), &pointperf.Point{Air: s.Project.Departure.Air, Mass: mass})
}

// A HandbookEconomy is the level flight of best range and of best endurance.
type HandbookEconomy struct {
	Air           atmos.Air
	Stall         float64 // true airspeed of the stall in m/s
	Range         pointperf.Level
	RangeErr      error
	Endurance     pointperf.Level
	EnduranceErr  error
	AgainstWind   pointperf.Level
	AgainstWindOK bool // there is a way against the wind
}

// HandbookEconomy is at the mass in kg and the pressure altitude in m on the project's day.
func (s *Study) HandbookEconomy(mass, hp, headWind float64) HandbookEconomy {
	var e HandbookEconomy
	air, err := s.Project.Plan.Day.At(hp, nil)
	if err != nil {
		e.RangeErr, e.EnduranceErr = err, err
		return e
	}
	e.Air = air
	a, p := s.Aircraft(), &pointperf.Point{Air: air, Mass: mass}
	e.Stall = pointperf.Stall(a, p, nil)
	e.Range, e.RangeErr = pointperf.BestRange(a, p, 0)
	e.Endurance, e.EnduranceErr = pointperf.BestEndurance(a, p)
	e.AgainstWind, err = pointperf.BestRange(a, p, headWind)
	e.AgainstWindOK = err == nil
	return e
}

// A HandbookCruise is level flight at one altitude and share of the rating.
type HandbookCruise struct {
	Air   atmos.Air
	Level pointperf.Level // at the mass of the cruise table
	Err   error
	// Time and Distance are those of level flight in calm air from the start mass until
	// what is kept for the reserve is left.
	Time     float64 // in s
	Distance float64 // in m
	RangeErr error   // why there is neither
}

// HandbookCruise is at the pressure altitude in m and the share of the rating, 0 to 1, on
// the project's day.
func (s *Study) HandbookCruise(mass, hp, share float64) HandbookCruise {
	var c HandbookCruise
	if c.Air, c.Err = s.Project.Plan.Day.At(hp, nil); c.Err != nil {
		c.RangeErr = c.Err
		return c
	}
	c.Level, c.Err = s.levelOn(c.Air, mass, share)
	c.Time, c.Distance, c.RangeErr = s.levelRange(c.Air, share)
	return c
}

// levelOn is the fastest level flight on the share of the rating, 0 to 1.
func (s *Study) levelOn(air atmos.Air, mass, share float64) (pointperf.Level, error) {
	a, p := s.Aircraft(), &pointperf.Point{Air: air, Mass: mass}
	if share < Full {
		return pointperf.AtFraction(a, p, share)
	}
	fast := pointperf.AllSpeeds(a, p).LevelMax
	if fast.Err != nil {
		return pointperf.Level{}, fast.Err
	}
	return pointperf.LevelAt(a, p, fast.TAS*(1-1e-9))
}

// ReserveTime is the time in s that the mission's reserve legs ask for, 0 when it has none.
func (s *Study) ReserveTime() float64 {
	sum := 0.0
	for i := range s.Project.Spec.Legs {
		if l := &s.Project.Spec.Legs[i]; l.Kind == mission.Reserve {
			sum += l.Time
		}
	}
	return sum
}

// levelRange integrates dm = −flow dt from the start mass over the usable fuel less the
// reserve, which is burnt at the flow of the lightest mass, by Simpson's rule over the mass.
func (s *Study) levelRange(air atmos.Air, share float64) (time, distance float64, err error) {
	stores := s.Aircraft().Stores()
	if !(stores.Fuel > 0) {
		return 0, 0, units.Errorf(nil, "it carries no fuel to burn down; a battery's range follows from its discharge, which the mission integrates")
	}
	light, err := s.levelOn(air, s.Masses.Start-stores.Fuel, share)
	if err != nil {
		return 0, 0, err
	}
	kept := light.Output.FuelFlow * s.ReserveTime()
	burn := stores.Fuel - kept
	if !(burn > 0) {
		return 0, 0, units.Errorf(nil, "the reserve alone takes {} of the {} of usable fuel", units.Of(units.Mass, kept), units.Of(units.Mass, stores.Fuel))
	}
	const parts = 4
	for i := range parts + 1 {
		l, err := s.levelOn(air, s.Masses.Start-burn*float64(i)/parts, share)
		if err != nil {
			return 0, 0, err
		}
		if !(l.Output.FuelFlow > 0) {
			return 0, 0, units.Errorf(nil, "no fuel is burnt there")
		}
		weight := simpson(i, parts) * burn / parts
		time += weight / l.Output.FuelFlow
		distance += weight * l.TAS / l.Output.FuelFlow
	}
	return time, distance, nil
}

// simpson is the weight of node i of n intervals of Simpson's rule, n even, of unit width.
func simpson(i, n int) float64 {
	switch {
	case i == 0 || i == n:
		return 1.0 / 3
	case i%2 == 1:
		return 4.0 / 3
	}
	return 2.0 / 3
}
