package runway_test

import (
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/reference"
	"legwright/internal/perf/runway"
)

// fatal is what both testing.TB and rapid.T can do.
type fatal interface {
	Helper()
	Fatal(...any)
}

var standardDay = atmos.Spec{Given: atmos.ByDeviation, QNH: atmos.SeaLevelPressure}

// level is a dry, level, windless strip at sea level.
var level = runway.Strip{Name: "Level", Length: 800, Surface: "dry-asphalt", Obstacle: 15.24}

func both(t testing.TB) map[string]*aircraft.Aircraft {
	all := map[string]*aircraft.Aircraft{}
	for _, kind := range aircrafttest.Propellers {
		all[kind] = aircrafttest.Build(t, aircrafttest.Homebuilt(kind))
	}
	return all
}

// runs takes off from and lands on the strip.
func runs(t fatal, a *aircraft.Aircraft, mass float64, s runway.Strip, day atmos.Spec) (off, on runway.Run) {
	t.Helper()
	place, err := s.On(day)
	if err != nil {
		t.Fatal(err)
	}
	if off, err = runway.TakeOff(a, mass, place, runway.StandardTechnique()); err != nil {
		t.Fatal(err)
	}
	if on, err = runway.Landing(a, mass, place, runway.StandardTechnique()); err != nil {
		t.Fatal(err)
	}
	return off, on
}

func TestPublishedFactors(t *testing.T) {
	for kind, a := range both(t) {
		off, on := runs(t, a, a.StartMass(), level, standardDay)
		for _, row := range reference.Read(t, "field_factors") {
			s, day := level, standardDay
			s.Elevation, s.Slope, s.Surface = row.SI("rise"), row.Num("slope"), row.Text("surface")
			s.HeadWind = -row.Num("tail") * off.Speed
			day.Deviation = row.Num("warmer")
			longer, landed := runs(t, a, a.StartMass()*row.Num("mass"), s, day)
			if row.Has("take_off") {
				row.Near("take_off", longer.Ground/off.Ground)
				if longer.Ground <= off.Ground || longer.Total <= off.Total {
					t.Errorf("%s, %s: the take-off is no longer", kind, row)
				}
			}
			if row.Has("landing") {
				row.Near("landing", landed.Ground/on.Ground)
				if landed.Ground < on.Ground || landed.Total < on.Total {
					t.Errorf("%s, %s: the landing is shorter", kind, row)
				}
			}
		}
	}
}

// Distances grow with weight, heat, height and tail wind; slope up lengthens
// the take-off and shortens the landing.
func TestDistancesGrow(t *testing.T) {
	for kind, a := range both(t) {
		t.Run(kind, rapid.MakeCheck(func(t *rapid.T) {
			s, day := level, standardDay
			s.Elevation = rapid.Float64Range(-100, 1500).Draw(t, "elevation")
			s.Slope = rapid.Float64Range(-0.02, 0.02).Draw(t, "slope")
			s.HeadWind = rapid.Float64Range(-4, 12).Draw(t, "wind")
			s.Obstacle = rapid.Float64Range(0, 30).Draw(t, "obstacle")
			s.Surface = rapid.SampledFrom(runway.Surfaces).Draw(t, "surface").Name
			day.Deviation = rapid.Float64Range(-20, 25).Draw(t, "deviation")
			mass := rapid.Float64Range(480, 600).Draw(t, "mass")
			off, on := runs(t, a, mass, s, day)
			check := func(what string, s runway.Strip, day atmos.Spec, mass float64) {
				t.Helper()
				longer, landed := runs(t, a, mass, s, day)
				if longer.Ground <= off.Ground || longer.Total <= off.Total {
					t.Errorf("take-off %s: roll %g to %g m, total %g to %g m", what, off.Ground, longer.Ground, off.Total, longer.Total)
				}
				if what != "uphill" && (landed.Ground <= on.Ground || landed.Total <= on.Total) {
					t.Errorf("landing %s: roll %g to %g m, total %g to %g m", what, on.Ground, landed.Ground, on.Total, landed.Total)
				}
				if what == "uphill" && landed.Ground >= on.Ground {
					t.Errorf("landing uphill: roll %g to %g m", on.Ground, landed.Ground)
				}
			}
			check("heavier", s, day, mass*1.05)
			hot := day
			hot.Deviation += 10
			check("hotter", s, hot, mass)
			high := s
			high.Elevation += 300
			check("higher", high, day, mass)
			up := s
			up.Slope += 0.01
			check("uphill", up, day, mass)
			behind := s
			behind.HeadWind--
			check("with less head wind", behind, day, mass)
		}))
	}
}

// The parts of a run add up to it, and its path ends where they do.
func TestRunAddsUp(t *testing.T) {
	for kind, a := range both(t) {
		t.Run(kind, rapid.MakeCheck(func(t *rapid.T) {
			s := level
			s.HeadWind = rapid.Float64Range(-4, 12).Draw(t, "wind")
			s.Obstacle = rapid.Float64Range(0, 40).Draw(t, "obstacle")
			off, on := runs(t, a, rapid.Float64Range(450, 640).Draw(t, "mass"), s, standardDay)
			for name, r := range map[string]*runway.Run{"take-off": &off, "landing": &on} {
				sum, time := 0.0, 0.0
				for _, g := range r.Segments {
					if g.Distance < 0 || g.Time < 0 || g.Fuel < 0 {
						t.Errorf("%s: %+v", name, g)
					}
					sum += g.Distance
					time += g.Time
				}
				if diff := sum - r.Total; diff > 1e-9 || diff < -1e-9 || r.Time() != time || r.Ground > r.Total {
					t.Errorf("%s: segments of %g m and %g s, total %g m, %g s, roll %g m", name, sum, time, r.Total, r.Time(), r.Ground)
				}
				last := r.Path[len(r.Path)-1]
				height := 0.0
				if name == "take-off" {
					height = s.Obstacle
				}
				if last.X-r.Total > 1e-9 || r.Total-last.X > 1e-9 || last.Height-height > 1e-9 || height-last.Height > 1e-9 {
					t.Errorf("%s: the path ends at %+v, the run at %g m, %g m", name, last, r.Total, height)
				}
				for i := 1; i < len(r.Path); i++ {
					if r.Path[i].X < r.Path[i-1].X {
						t.Errorf("%s: the path turns back at %g m", name, r.Path[i].X)
					}
				}
			}
		}))
	}
}
