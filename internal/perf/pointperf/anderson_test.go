package pointperf_test

import (
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/reference"
)

// inBook is an aeroplane at its gross weight in air of the row's density.
func inBook(t *testing.T, row reference.Row) (*aircraft.Aircraft, *pointperf.Point) {
	t.Helper()
	b := aircrafttest.Read(t, row.Text("name"))
	return b.Build(t), &pointperf.Point{Air: aircrafttest.AirOf(t, 0, row.SI("density")), Mass: b.Mass}
}

func balance(t *testing.T, a *aircraft.Aircraft, p *pointperf.Point, tas float64) pointperf.Balance {
	t.Helper()
	b, err := pointperf.At(a, p, tas, nil)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

func TestAeroplanesOfTheBook(t *testing.T) {
	for _, row := range reference.Read(t, "anderson_aircraft") {
		b := aircrafttest.Read(t, row.Text("name"))
		a := b.Build(t)
		row.Near("aspect", a.Span()*a.Span()/a.WingArea())
		p := &pointperf.Point{Air: aircrafttest.AirOf(t, 0, aircrafttest.SeaLevelDensity), Mass: b.Mass}
		row.Near("best_ratio", p.Weight()/pointperf.AllSpeeds(a, p).LeastThrust.Value)
	}
}

func TestThrustRequired(t *testing.T) {
	for _, row := range reference.Read(t, "anderson_thrust_required") {
		a, p := inBook(t, row)
		v := row.SI("speed")
		got := balance(t, a, p, v).Required
		row.Near("cl", p.Weight()/(0.5*p.Air.Density*v*v*a.WingArea()))
		row.Near("thrust", got)
		for column, value := range map[string]float64{"ratio": p.Weight() / got, "computed_thrust": got, "computed_power": got * v} {
			if row.Has(column) {
				row.Near(column, value)
			}
		}
	}
}

// The book's rate of climb is excess power over weight with the lift equal to
// the weight. The true path is inclined: its lift is W cos γ, so it climbs
// better, by the induced drag that the cosine saves.
func TestRateOfClimb(t *testing.T) {
	for _, row := range reference.Read(t, "anderson_climb") {
		a, p := inBook(t, row)
		v := row.SI("speed")
		level := balance(t, a, p, v).InHand() * v / p.Weight()
		row.Near("rate", level)
		row.Near("computed_rate", level)
		c, err := pointperf.FullClimb(a, p, v, nil)
		if err != nil {
			t.Fatal(err)
		}
		saved := pointperf.ThrustRequired(a, p, v, nil) - c.Drag
		if off := (c.Rate-level)*p.Weight()/v - saved; off > 1e-6*saved+1e-6 || off < -1e-6*saved-1e-6 {
			t.Errorf("%s: climbs at %g m/s, %g m/s by excess power; the drag saved, %g N, does not explain the difference", row, c.Rate, level, saved)
		}
		if c.Rate < level || c.Rate > 1.025*level {
			t.Errorf("%s: climbs at %g m/s, %g m/s by excess power", row, c.Rate, level)
		}
	}
}
