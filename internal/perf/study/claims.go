package study

import (
	"math"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/propeller"
)

// Formulas that give a thrust, a power that turns the propeller, and a drag coefficient.
var (
	thrusts = []string{"propeller.thrust", "disc.thrust"}
	powers  = []string{"propeller.power", "disc.power", "piston.installed-power"}
)

const (
	engine = "aircraft.powerplant.values.engine."
	prop   = "aircraft.powerplant.values.propeller."
	frame  = "aircraft.airframe."
	limit  = "aircraft.limits."
	part   = frame + "components[{component}]."
)

// claims are the possible origins of each symbol by its meaning, the surest
// first. A meaning that is used in a working and is not listed fails TestOrigins.
var claims = map[string][]claim{
	// Constants and the air.
	"standard gravity":                               {said("standard acceleration of free fall, exact")},
	"gas constant of dry air":                        {said("constant of the standard atmosphere")},
	"sea-level pressure":                             {said("constant of the standard atmosphere")},
	"sea-level temperature":                          {said("constant of the standard atmosphere")},
	"standard temperature at this pressure altitude": {said("standard atmosphere at this pressure altitude")},
	"pressure altitude":                              {made("elevation at the QNH of the day", pressureAltitude, "departure.elevation", "day.qnh"), made("elevation at the QNH of the day", pressureAltitude, "arrival.elevation", "day.qnh"), said("altitude of this condition")},
	"deviation from standard":                        {given("day.isa_deviation"), said("deviation of this condition")},
	"relative humidity":                              {given("day.humidity"), said("humidity of this condition")},
	"static temperature":                             {result("air.temperature")},
	"static pressure":                                {result("air.pressure-troposphere"), said("standard atmosphere at this pressure altitude")},
	"vapour pressure":                                {result("air.vapour-pressure"), exactly(0, "dry air")},
	"air density":                                    {result("air.density"), said("of the air of this condition")},
	"speed of sound":                                 {after("as √(1.4 R T)", func(v []float64) float64 { return math.Sqrt(atmos.HeatRatio * atmos.GasConstant * v[0]) }, "air.temperature"), said("of the air of this condition")},
	"temperature in degrees Celsius":                 {after("less 273.15 K", func(v []float64) float64 { return v[0] - 273.15 }, "air.temperature")},
	"density ratio of the dry air":                   {said("dry-air density (p − e)/(R T) over that of standard air at sea level")},
	"density ratio at the critical altitude": {made("standard air there over that at sea level", func(v []float64) float64 {
		t, p, err := atmos.Standard(v[0])
		if err != nil {
			return math.NaN()
		}
		return p / (atmos.GasConstant * t) / atmos.SeaLevelDensity
	}, engine+"critical_altitude")},

	// The condition flown.
	"mass":                            {said("mass of this condition")},
	"weight":                          {result("weight")},
	"true airspeed":                   {exactly(0, "at rest"), said("speed of this condition, named in the remark above")},
	"dynamic pressure":                {result("air.dynamic-pressure")},
	"lift":                            {result("weight"), said("in a climb W cos γ, in the take-off run q S CL with its own CL")},
	"acceleration factor (V/g) dV/dh": {exactly(0, "at a steady true airspeed"), said("of the speed schedule")},

	// The airframe.
	"wing area":                           {given(frame + "wing_area")},
	"wing span":                           {given(frame + "span")},
	"height of the wing above the ground": {given(frame + "wing_height")},
	"maximum lift coefficient": {given(frame + "{config}.cl_max"), result("polar.stall-lift"),
		made("2 m g/(ρ₀ V² S)", liftAtStall, frame+"{config}.stall_mass", frame+"{config}.stall_speed", frame+"wing_area")},
	"minimum drag coefficient":              {given(frame + "cd_min"), result("polar.drag-area", "polar.best-glide-minimum")},
	"increment of the configuration":        {given(frame + "{config}.delta_cd")},
	"least CD of the table":                 {read("least of the table", frame+"polar")},
	"CD read from the table at this CL":     {read("read from the table", frame+"polar")},
	"span efficiency":                       {given(frame + "efficiency")},
	"aspect ratio":                          {made("b²/S", aspect, frame+"span", frame+"wing_area")},
	"ground-effect factor":                  {result("polar.ground-effect"), exactly(1, "away from the ground")},
	"lift coefficient":                      {result("lift.coefficient")},
	"drag coefficient":                      {result("polar.parabolic", "polar.tabulated")},
	"lift coefficient of minimum drag":      {made("with the shift of the configuration", func(v []float64) float64 { return v[0] + v[1] }, frame+"cl_min_drag", frame+"{config}.delta_clm"), given(frame + "cl_min_drag")},
	"lift-dependent drag factor":            {result("polar.induced-factor", "polar.best-glide-factor"), made("1/(π A e) with A = b²/S", func(v []float64) float64 { return 1 / (math.Pi * aspect(v) * v[2]) }, frame+"span", frame+"wing_area", frame+"efficiency")},
	"sea-level density":                     {said("constant of the standard atmosphere")},
	"mass of the stall speed given":         {given(frame + "{config}.stall_mass")},
	"stall speed given":                     {given(frame + "{config}.stall_speed")},
	"mass of the best glide":                {given(frame + "glide_mass")},
	"equivalent airspeed of the best glide": {given(frame + "glide_speed")},
	"best ratio of lift to drag":            {given(frame + "glide_ratio")},
	"lift coefficient of the best ratio":    {result("polar.glide-lift")},

	// The drag build-up.
	"drag area, or flat-plate area":                      {given(frame + "drag_area"), result("drag.whole")},
	"air density where friction is taken":                {made("standard day", func(v []float64) float64 { return standardAir(v[0]).Density }, frame+"friction_alt")},
	"viscosity where friction is taken":                  {made("standard day", func(v []float64) float64 { return standardAir(v[0]).Viscosity }, frame+"friction_alt")},
	"true airspeed where friction is taken":              {given(frame + "friction_tas")},
	"Mach number where friction is taken":                {made("over the speed of sound of the standard day", func(v []float64) float64 { return v[0] / standardAir(v[1]).SoundSpeed }, frame+"friction_tas", frame+"friction_alt")},
	"length along the flow":                              {given(part + "length")},
	"Reynolds number":                                    {result("drag.reynolds"), said("of the laminar run, x Re")},
	"Reynolds number of the laminar run":                 {said("x Re")},
	"laminar share of the length":                        {given(part + "laminar")},
	"turbulent friction coefficient of the whole length": {result("drag.friction-turbulent")},
	"turbulent friction coefficient of the laminar run":  {result("drag.friction-turbulent")},
	"laminar friction coefficient of the laminar run":    {result("drag.friction-laminar")},
	"friction coefficient":                               {result("drag.friction", "drag.friction-turbulent")},
	"thickness over chord":                               {given(part + "thickness_ratio")},
	"place of the greatest thickness on the chord":       {given(part + "thickness_at")},
	"length over diameter":                               {given(part + "fineness")},
	"form factor":                                        {result("drag.form-surface", "drag.form-body", "drag.form-nacelle", "drag.form-streamlined")},
	"interference factor":                                {given(part + "interference")},
	"wetted area":                                        {given(part + "wetted_area")},
	"sum of the parts":                                   {said("the drag areas above together")},
	"leakage and protuberances":                          {given(frame + "leakage")},
	"drag area not in the list":                          {given(frame + "unlisted")},

	// Forces and the climb.
	"drag":                           {result("drag.force")},
	"drag with the lift L = W cos γ": {result("drag.force")},
	"thrust required":                {result("drag.force")},
	"thrust":                         {result(thrusts...), exactly(0, "throttle closed")},
	"thrust available":               {result(thrusts...), exactly(0, "throttle closed")},
	"propeller thrust":               {result(thrusts...)},
	"climb angle":                    {result("climb.angle"), said("of a path straight up or down")},

	// Manoeuvre and gust envelope.
	"wing loading": {result("loads.wing-loading")},
	"wing loading at the greatest take-off mass": {result("loads.wing-loading")},
	"greatest take-off weight":                   {made("m g", func(v []float64) float64 { return v[0] * atmos.Gravity }, "aircraft.weights.max_take_off")},
	"greatest lift coefficient, upwards or downwards": {given(frame + "clean.cl_max"), made("its size", size, limit+"negative_cl"),
		made("2 m g/(ρ₀ V² S)", liftAtStall, frame+"clean.stall_mass", frame+"clean.stall_speed", frame+"wing_area")},
	"positive limit load factor":                     {given(limit + "positive"), result("loads.limit-factor"), said("the least of the rule")},
	"share of the positive one":                      {said("of the rule and category")},
	"limit load factor":                              {given(limit + "positive"), result("loads.limit-factor"), made("its size", size, limit+"negative"), after("its size", size, "loads.negative-factor"), said("the least of the rule")},
	"stall speed":                                    {result("loads.stall")},
	"factor of the category":                         {said("of the rule and category")},
	"factor of the category, kt over root of lb/ft²": {said("of the rule and category")},
	"one pound-force":                                {said("exact, by definition")},
	"one pound per square foot":                      {said("exact, by definition")},
	"one knot":                                       {said("exact, by definition")},
	"least design cruising speed":                    {result("loads.least-cruise", "loads.least-cruise-vla")},
	"design cruising speed":                          {given(limit + "cruise"), result("loads.least-cruise", "loads.least-cruise-vla")},
	"mean geometric chord":                           {result("loads.chord"), given(limit + "chord")},
	"lift-curve slope per radian":                    {result("loads.lift-slope"), given(limit + "slope")},
	"aeroplane mass ratio":                           {result("loads.mass-ratio")},
	"gust alleviation factor":                        {result("loads.gust-alleviation")},
	"standard air density at sea level":              {said("constant of the standard atmosphere")},
	"derived gust velocity up to 20 000 ft":          {said("of the rule")},
	"derived gust velocity": {result("loads.gust-aloft"), given(limit + "gust_cruise"), given(limit + "gust_dive"),
		made("downwards", negated, limit+"gust_cruise"), made("downwards", negated, limit+"gust_dive"), after("downwards", negated, "loads.gust-aloft"), said("of the rule, upwards or downwards")},
	"equivalent airspeed": {given(limit + "cruise"), given(limit + "dive"), result("loads.least-cruise", "loads.least-cruise-vla", "loads.least-dive", "loads.least-dive-vla"), said("speed of this condition")},

	// Piston engines and propellers.
	"throttle":                      {exactly(1, "full throttle"), said("setting of this condition")},
	"power against sea-level power": {result("piston.lapse", "piston.turbo-lapse"), exactly(0, "the air is too thin to run in")},
	"sea-level full-throttle power at this speed": {given(engine + "rated_power"), read("at this engine speed", engine+"rated_power", engine+"rated_speed", engine+"power_curve")},
	"installation loss":                           {given(engine + "installation_loss")},
	"accessory power":                             {given(engine + "accessory_power")},
	"specific fuel consumption":                   {given(engine + "consumption"), read("read from the table", engine+"consumption_curve")},
	"idle fuel flow":                              {given(engine + "idle_flow")},
	"brake power":                                 {result("piston.brake-power")},
	"shaft power":                                 {result(powers...)},
	"power absorbed by the propeller":             {result(powers...), exactly(0, "none: the air turns the propeller")},
	"propeller diameter":                          {given(prop + "diameter")},
	"propeller speed in rev/s":                    {given(prop + "speed"), said("the speed of the remark above")},
	"thrust coefficient at J, from the table":     {read("read from the table at J", prop+"coefficients")},
	"power coefficient at J, from the table":      {read("read from the table at J", prop+"coefficients")},
	"disc area":                                   {made("π D²/4", func(v []float64) float64 { return propeller.Area(v[0]) }, prop+"diameter")},
	"loss factor":                                 {given(prop + "loss_factor")},
	"induced speed at the disc":                   {result("disc.induced-speed"), said("found so that k P = T (V + v)")},
}

// standardAir is the air of the standard day at a pressure altitude in m; zero outside the atmosphere.
func standardAir(hp float64) atmos.Air {
	air, _ := atmos.Day{}.At(hp, nil)
	return air
}

// aspect is the aspect ratio of span and wing area.
func aspect(v []float64) float64 { return v[0] * v[0] / v[1] }

// pressureAltitude is that of an elevation and a QNH.
func pressureAltitude(v []float64) float64 { return atmos.PressureAltitude(v[0], v[1]) }

// size is a number without its sign.
func size(v []float64) float64 { return math.Abs(v[0]) }

// liftAtStall is the lift coefficient of a stall with the mass, the equivalent airspeed and the wing area.
func liftAtStall(v []float64) float64 {
	return 2 * v[0] * atmos.Gravity / (atmos.SeaLevelDensity * v[1] * v[1] * v[2])
}

// negated is a value with the other sign.
func negated(v []float64) float64 { return -v[0] }
