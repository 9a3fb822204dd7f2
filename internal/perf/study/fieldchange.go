package study

import (
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// A FieldChange is a take-off or landing with one condition changed.
type FieldChange struct {
	What units.Message
	FieldPoint
	// Rise is the distance over the obstacle as a share of the present one, less 1,
	// dimensionless, >= -1; 0 when either does not exist.
	Rise float64
	// Published is the rise that light-aircraft practice reckons with, dimensionless, > -1;
	// 0 when no factor is published for this change.
	Published float64
	AtLeast   bool // the published rise is a lower bound
}

// A published factor on the distance for one change; 0 where the source has none. Source:
// UK CAA SafetySense Leaflet 7c, Aeroplane Performance, 2013; landing on very short wet
// grass: UK CAA, GM1 CAT.POL.A.335; all from memory. Surfaces are against a dry hard one.
type published struct{ off, on float64 }

var (
	heavier  = published{1.20, 1.10} // 10 %
	higher   = published{1.10, 1.05} // 1000 ft
	warmer   = published{1.10, 1.05} // 10 K
	uphill   = published{1.10, 0}    // 2 %
	downhill = published{0, 1.10}    // 2 %
	tailWind = published{1.20, 1.20} // a tenth of the lift-off speed
	surfaces = map[string]published{"dry-asphalt": {1, 1}, "dry-grass": {1.20, 1.15}, "wet-grass": {1.30, 1.60}, "soft-ground": {1.25, 0}}
)

// rise is the factor less 1 for the take-off or the landing.
func (p published) rise(landing bool) float64 {
	v := p.off
	if landing {
		v = p.on
	}
	if v == 0 {
		return 0
	}
	return v - 1
}

// onto is the published factor of one surface against another; both have to be published.
// That of soft ground comes on top of others, so it stands only against a dry hard surface.
func onto(from, to string) published {
	if to == "soft-ground" && from != "dry-asphalt" {
		return published{}
	}
	a, b := surfaces[from], surfaces[to]
	var p published
	if a.off > 0 {
		p.off = b.off / a.off
	}
	if a.on > 0 {
		p.on = b.on / a.on
	}
	return p
}

// A variation is one change of the conditions and its published factor.
type variation struct {
	what    units.Message
	change  func(at *runway.Place, mass *float64) error
	known   published
	atLeast bool
}

// fieldChanges changes one condition at a time.
func (s *Study) fieldChanges(f *Field) {
	for _, v := range s.variations(f) {
		at, mass := f.Present.Place, f.Present.Mass
		c := FieldChange{What: v.what, Published: v.known.rise(f.Landing), AtLeast: v.atLeast}
		if err := v.change(&at, &mass); err != nil {
			c.FieldPoint = FieldPoint{Mass: mass, Word: "no air", Err: err}
		} else {
			c.FieldPoint = s.fieldRun(f, at, mass)
		}
		if c.Has() && f.Present.Err == nil && f.Present.Run.Total > 0 {
			c.Rise = c.Run.Total/f.Present.Run.Total - 1
		}
		f.Changes = append(f.Changes, c)
	}
}

func (s *Study) variations(f *Field) []variation {
	sys := s.Project.Spec.System()
	wind := 2.0 // round in the unit in which the project shows speeds
	if sys == units.Aviation {
		wind = sys.Step(units.Speed, 5)
	}
	const thousand = 304.8 // 1000 ft in m, exact
	lift := 0.1 * f.Present.Run.Speed
	say, of := units.Say, units.Of
	list := []variation{
		{what: say("5 % heavier"), change: scaled(1.05)},
		{what: say("10 % heavier"), change: scaled(1.1), known: heavier},
		{what: say("{} higher", of(units.Altitude, thousand)), change: f.aired(thousand, 0), known: higher},
		{what: say("{} warmer", of(units.TemperatureStep, 10)), change: f.aired(0, 10), known: warmer},
		{what: say("2 % more uphill"), change: sloped(0.02), known: uphill},
		{what: say("2 % more downhill"), change: sloped(-0.02), known: downhill},
		{what: say("{} more head wind", of(units.Speed, wind)), change: blown(wind)},
		{what: say("{} more tail wind", of(units.Speed, wind)), change: blown(-wind)},
	}
	if lift > 0 {
		list = append(list, variation{what: say("{} more tail wind, a tenth of {}", of(units.Speed, lift), units.Text(f.speedName())), change: blown(-lift), known: tailWind})
	}
	from := f.Present.Place.Surface
	for _, name := range []string{"dry-asphalt", "wet-grass", "soft-ground"} {
		if to, ok := runway.LookupSurface(name); ok && name != from.Name {
			list = append(list, variation{what: say("{} instead of {}", units.Text(to.Label), units.Text(from.Label)), change: covered(to),
				known: onto(from.Name, name), atLeast: name == "soft-ground"})
		}
	}
	return list
}

// speedName names the speed at which the wheels leave or meet the ground.
func (f *Field) speedName() string {
	if f.Landing {
		return "touchdown"
	}
	return "lift-off"
}

func scaled(by float64) func(*runway.Place, *float64) error {
	return func(_ *runway.Place, mass *float64) error { *mass *= by; return nil }
}

func sloped(by float64) func(*runway.Place, *float64) error {
	return func(at *runway.Place, _ *float64) error { at.Strip.Slope += by; return nil }
}

func blown(by float64) func(*runway.Place, *float64) error {
	return func(at *runway.Place, _ *float64) error { at.HeadWind += by; return nil }
}

func covered(by runway.Surface) func(*runway.Place, *float64) error {
	return func(at *runway.Place, _ *float64) error { at.Surface = by; return nil }
}

// aired lifts the strip by metres and warms its air by kelvin.
func (f *Field) aired(metres, kelvin float64) func(*runway.Place, *float64) error {
	return func(at *runway.Place, _ *float64) error {
		air, err := f.airAt(at.Air.PressureAltitude+metres, f.Deviation+kelvin, f.Humidity)
		at.Air = air
		return err
	}
}
