package study

import (
	"math"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// A Field is a take-off or a landing at the view's condition, and what it becomes when
// height, heat, mass, wind, slope and ground change.
type Field struct {
	Landing    bool // false for a take-off
	Present    Strip
	Deviation  float64 // of temperature from standard, in K
	Humidity   float64 // relative, 0 to 1
	Factor     float64 // safety factor of the present case, dimensionless
	ByAltitude []FieldPoint
	ByMass     []FieldPoint
	Grid       FieldGrid
	Changes    []FieldChange
}

// A FieldPoint is a take-off or landing at one condition, or the reason why there is none.
type FieldPoint struct {
	Altitude    float64 // pressure altitude in m
	Density     float64 // density altitude in m
	Temperature float64 // of the air in K; 0 when there is no such air
	Mass        float64 // in kg
	Run         runway.Run
	Word        string // short for why there is no distance; empty when there is one
	Err         error
}

// Has reports whether there is a distance.
func (p *FieldPoint) Has() bool { return p.Word == "" }

// Fit is how a distance suits a strip.
type Fit string

// The fits.
const (
	Fits  Fit = "fits"  // with the safety factor
	Tight Fit = "tight" // only without the safety factor
	Over  Fit = "over"  // not even without it
	None  Fit = "none"  // there is no distance
)

// Fit holds the point against a strip of the length in m, >= 0.
func (p *FieldPoint) Fit(length float64) Fit {
	switch {
	case !p.Has():
		return None
	case p.Run.Factored <= length:
		return Fits
	case p.Run.Total <= length:
		return Tight
	}
	return Over
}

// Fields are the take-off and the landing at the view's condition. The default view gives
// those of the study. A mass of the view's own holds for both; its altitude holds for the
// landing only where the mission lands on the strip that it left.
func (s *Study) Fields() (off, on Field) {
	how, base := s.Project.Plan.Technique, DefaultView(s.Project, s.Index)
	off = Field{Present: s.TakeOff, Factor: how.TakeOffFactor}
	on = Field{Landing: true, Present: s.Landing, Factor: how.LandingFactor}
	moved := differ(s.View.Altitude, base.Altitude) || differ(s.View.Deviation, base.Deviation)
	loaded := differ(s.View.Mass, base.Mass)
	for _, f := range []*Field{&off, &on} {
		f.Deviation, f.Humidity = s.View.Deviation, s.Project.Plan.Day.Humidity
		if loaded {
			f.Present.Mass = s.View.Mass
		}
		air := f.Present.Place.Air
		if moved && (!f.Landing || s.Project.Arrival.Strip == s.Project.Departure.Strip) {
			air.PressureAltitude = s.View.Altitude
		}
		if standard, _, err := atmos.Standard(air.PressureAltitude); err == nil && !moved {
			f.Deviation = air.Temperature - standard // a day given by its temperature has another at each strip
		}
		if moved {
			f.Present.Place.Air, f.Present.Err = f.airAt(air.PressureAltitude, f.Deviation, f.Humidity)
		}
		if present := s.fieldRun(f, f.Present.Place, f.Present.Mass); f.Present.Place.Air.Density > 0 {
			f.Present.Run, f.Present.Err = present.Run, present.Err
		}
		s.alongAltitude(f)
		s.alongMass(f)
		s.fieldGrid(f)
		s.fieldChanges(f)
	}
	return off, on
}

// differ tells a condition of the view's own from the default that a form wrote and read
// again: an entry field holds seven digits.
func differ(a, b float64) bool { return math.Abs(a-b) > 1e-5*max(math.Abs(a), math.Abs(b)) }

// airAt is the air of the field at the pressure altitude in m, the deviation of
// temperature from standard in K and the relative humidity, 0 to 1.
func (f *Field) airAt(hp, deviation, humidity float64) (atmos.Air, error) {
	return atmos.Day{Deviation: deviation, Humidity: humidity}.At(hp, nil)
}

// fieldRun flies one take-off or landing of the mass in kg.
func (s *Study) fieldRun(f *Field, at runway.Place, mass float64) FieldPoint {
	p := FieldPoint{Altitude: at.Air.PressureAltitude, Mass: mass}
	if at.Air.Density <= 0 {
		p.Word, p.Err = "no air", units.Errorf(runway.ErrNoRun, "the air there is outside the air model")
		return p
	}
	p.Density, p.Temperature = at.Air.DensityAltitude(), at.Air.Temperature
	fly := runway.TakeOff
	if f.Landing {
		fly = runway.Landing
	}
	p.Run, p.Err = fly(s.Aircraft(), mass, at, s.Project.Plan.Technique)
	p.Run.Factor(f.Factor)
	if p.Err == nil && !(p.Run.Factored > 0 && p.Run.Factored < math.MaxFloat64) {
		p.Err = units.Errorf(runway.ErrNoRun, "the wind alone carries the aircraft: there is no run over the ground")
	}
	if p.Err != nil {
		p.Word = s.noRun(f, &p, at)
	}
	return p
}

// noRun says in two words why p has no distance; p.Err says it in a sentence.
func (s *Study) noRun(f *Field, p *FieldPoint, at runway.Place) string {
	switch {
	case f.Landing:
		return "no stop"
	case p.Run.Ground > 0:
		return "no climb"
	}
	point := &pointperf.Point{Air: at.Air, Mass: p.Mass}
	out, err := pointperf.ThrustAvailable(s.Aircraft(), point, math.Max(0, at.HeadWind), nil)
	switch {
	case err != nil:
		return "no thrust"
	case out.Thrust <= runway.Resistance(s.Aircraft(), p.Mass, at, math.Max(0, at.HeadWind)):
		return "no roll"
	}
	return "no lift-off"
}

// elsewhere is fieldRun on the same strip in other air: at the pressure altitude in m,
// the deviation in K and the relative humidity, 0 to 1.
func (s *Study) elsewhere(f *Field, hp, deviation, humidity float64) FieldPoint {
	at := f.Present.Place
	air, err := f.airAt(hp, deviation, humidity)
	if err != nil {
		return FieldPoint{Altitude: hp, Mass: f.Present.Mass, Word: "no air", Err: err}
	}
	at.Air = air
	return s.fieldRun(f, at, f.Present.Mass)
}

const fieldPoints = 17

// alongAltitude varies the altitude on the day's deviation from 500 m below the strip, or
// sea level if that is higher, to 3 000 m above it. Where nothing runs on the strip itself it
// begins at sea level and ends soon, to show from where on it does not.
func (s *Study) alongAltitude(f *Field) {
	hp := f.Present.Place.Air.PressureAltitude
	from, to := math.Max(math.Min(0, hp), hp-500), hp+3000
	if f.Present.Err != nil {
		from, to = math.Min(0, hp), hp+500
	}
	for i := range fieldPoints {
		f.ByAltitude = append(f.ByAltitude, s.elsewhere(f, from+(to-from)*float64(i)/(fieldPoints-1), f.Deviation, f.Humidity))
	}
}

// alongMass varies the mass from the empty aircraft with its first load item, such as the
// pilot, to the greatest take-off mass, or to the present mass if that is greater.
func (s *Study) alongMass(f *Field) {
	from, to := s.Masses.Empty+s.Masses.Growth, math.Max(s.Masses.MaxTakeOff, f.Present.Mass)
	if items := s.Variant().Aircraft.Weights.Items; len(items) > 0 && from+items[0].Mass < 0.95*to {
		from += items[0].Mass
	}
	from = math.Min(from, f.Present.Mass)
	for i := range fieldPoints {
		f.ByMass = append(f.ByMass, s.fieldRun(f, f.Present.Place, from+(to-from)*float64(i)/(fieldPoints-1)))
	}
}

// A FieldGrid is the distance across pressure altitude and temperature.
type FieldGrid struct {
	Altitudes    []float64      // pressure altitudes of the rows in m
	Temperatures []float64      // of the columns in K
	Cells        [][]FieldPoint // by row and column
	Humid        []FieldPoint   // along the columns in humid air at HumidAltitude; empty when the day is about as humid
	HumidLevel   float64        // relative humidity of Humid, 0 to 1
	HumidRow     int            // index of the row that Humid repeats
}

// fieldGrid surrounds the strip with round altitudes in the project's unit and
// with temperatures in steps of 10 K.
func (s *Study) fieldGrid(f *Field) {
	const rows, columns, humid = 5, 5, 0.8
	air := f.Present.Place.Air
	step := 500.0
	if s.Project.Spec.System() == units.Aviation {
		step = s.Project.Spec.System().Step(units.Altitude, 1000)
	}
	nearest := math.Round(air.PressureAltitude / step)
	first := nearest
	if nearest > 0 {
		first--
	}
	// At a strip outside the air model there is no temperature to start from.
	middle := atmos.SeaLevelTemperature
	if air.Temperature > 0 {
		middle = air.Temperature
	}
	coldest := (math.Floor((middle-273.15)/10)-2)*10 + 273.15
	g := FieldGrid{HumidLevel: humid, HumidRow: int(nearest - first)}
	for j := range columns {
		g.Temperatures = append(g.Temperatures, coldest+10*float64(j))
	}
	row := func(hp, humidity float64) []FieldPoint {
		standard, _, _ := atmos.Standard(hp)
		list := make([]FieldPoint, columns)
		for j, t := range g.Temperatures {
			list[j] = s.elsewhere(f, hp, t-standard, humidity)
		}
		return list
	}
	for i := range rows {
		hp := (first + float64(i)) * step
		g.Altitudes = append(g.Altitudes, hp)
		g.Cells = append(g.Cells, row(hp, f.Humidity))
	}
	if f.Humidity < humid-0.1 {
		g.Humid = row(g.Altitudes[g.HumidRow], humid)
	}
	f.Grid = g
}
