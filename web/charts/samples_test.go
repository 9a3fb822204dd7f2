package charts

import "math"

// Sample charts with invented figures, in the shapes that the pages draw.

func grid(lo, hi float64, n int) []float64 {
	x := make([]float64, n)
	for i := range x {
		x[i] = lo + (hi-lo)*float64(i)/float64(n-1)
	}
	return x
}

func apply(x []float64, f func(float64) float64) []float64 {
	y := make([]float64, len(x))
	for i, v := range x {
		y[i] = f(v)
	}
	return y
}

func thrustChart() Chart {
	v := grid(20, 70, 101)
	available := apply(v, func(v float64) float64 { return 1540 - 9.6*v - 0.065*v*v })
	required := apply(v, func(v float64) float64 {
		if v < 26.6 {
			return math.NaN()
		}
		return 0.187*v*v + 3.3e5/(v*v)
	})
	inHand := make([]float64, len(v))
	for i := range v {
		inHand[i] = available[i] - required[i]
	}
	return Chart{
		ID: "thrust", Title: "Thrust required and available",
		Desc: "At 1200 m the thrust available falls from 1320 to 550 N and meets the thrust required at 63 m/s.",
		X:    Axis{Label: "true airspeed", Unit: "m/s"},
		Panels: []Panel{{
			Y: Axis{Label: "thrust", Unit: "N", Zero: true},
			Series: []Series{
				{Name: "thrust available", Unit: "N", X: v, Y: available, Class: "available", LabelAt: 0.12},
				{Name: "thrust required", Unit: "N", X: v, Y: required, Class: "required", LabelAt: 0.2},
				{Name: "in hand", Unit: "N", X: v, Y: inHand, Class: "none", LabelAt: -1},
			},
			Bands: []Band{
				{X: v, Lower: required, Upper: available, Class: "hand", Label: "in hand"},
				{X: v, Lower: available, Upper: required, Class: "short", Label: "short"},
			},
		}},
		Marks: []Mark{
			{26.6, "stall 26.6"}, {30.6, "best angle 30.6"}, {36.4, "least thrust 36.4"},
			{39.1, "best rate 39.1"}, {60.1, "level max 60.1"},
		},
	}
}

func climbChart() Chart {
	c := Chart{
		ID: "climb", Title: "Rate of climb against speed", Desc: "Four altitudes.",
		X:      Axis{Label: "true airspeed", Unit: "m/s"},
		Panels: []Panel{{Y: Axis{Label: "rate of climb", Unit: "m/s"}, Lines: []HLine{{0.5, "service ceiling, 0.5 m/s"}}}},
	}
	p := &c.Panels[0]
	for i, name := range []string{"0 m", "1200 m", "2400 m", "3600 m"} {
		best, v0 := 4.6-1.15*float64(i), 37+1.8*float64(i)
		v := grid(27+float64(i), 64-float64(i), 80)
		y := apply(v, func(v float64) float64 { return best - 0.0085*(v-v0)*(v-v0)*(1+0.004*(v-v0)) })
		p.Series = append(p.Series, Series{
			Name: name, Unit: "m/s", X: v, Y: y, Class: []string{"alt-1", "alt-2", "alt-3", "alt-4"}[i], LabelAt: 0.5, Decimals: 2,
		})
	}
	p.Flags = []Flag{{37, 4.6, "best rate 4.60 m/s at 37.0", "alt-1"}}
	return c
}

func ceilingChart() Chart {
	h := grid(0, 6200, 63)
	rate := apply(h, func(h float64) float64 { return 4.6 * (1 - h/6200) * (1 + 0.05*h/6200) })
	return Chart{
		ID: "ceiling", Title: "Rate of climb against altitude", Desc: "Falls to nothing at 6200 m.",
		X: Axis{Label: "best rate of climb", Unit: "m/s", Zero: true},
		Panels: []Panel{{
			Y:      Axis{Label: "pressure altitude", Unit: "m", Zero: true},
			Series: []Series{{Name: "best rate", Unit: "m", X: rate, Y: h, Class: "rate", LabelAt: 0.6}},
			Lines:  []HLine{{5530, "service ceiling 5530 m"}},
		}},
		Marks: []Mark{{0.5, "0.5 m/s"}},
	}
}

// missionChart has three panels over eight legs, with steps at the legs' ends.
func missionChart() Chart {
	minutes := []float64{0, 6, 22, 82, 94, 113, 127, 189, 201, 231}
	altitude := []float64{610, 610, 2400, 2400, 450, 450, 2400, 2400, 610, 900}
	available := []float64{1700, 1220, 930, 840, 840, 1240, 1240, 850, 840, 1180}
	required := []float64{310, 500, 520, 590, 280, 480, 480, 585, 250, 470}
	var t, h, ta, tr, fuel []float64
	burnt := 0.0
	for leg := 0; leg+1 < len(minutes); leg++ {
		for _, u := range grid(0, 1, 12) {
			t = append(t, 60*(minutes[leg]+u*(minutes[leg+1]-minutes[leg])))
			h = append(h, altitude[leg]+u*(altitude[leg+1]-altitude[leg]))
			ta = append(ta, available[leg+1]-20*u)
			tr = append(tr, required[leg+1]+10*u)
			fuel = append(fuel, 78-burnt-u*0.15*(minutes[leg+1]-minutes[leg]))
		}
		burnt += 0.15 * (minutes[leg+1] - minutes[leg])
	}
	labels := [][2]string{{"taxi", ""}, {"climb", ""}, {"cruise out", "out"}, {"descend", "desc."}, {"loiter", ""}, {"climb", ""}, {"cruise back", "back"}, {"descend", "desc."}, {"reserve", "res."}}
	c := Chart{
		ID: "mission", Title: "Mission", Desc: "Altitude, thrust and fuel along the legs.",
		X: Axis{Label: "time", Format: "hm"}, Width: 820, Height: 420,
		Panels: []Panel{
			{Y: Axis{Label: "pressure altitude", Unit: "m", Zero: true}, Height: 0.8,
				Series: []Series{{Name: "altitude", Unit: "m", X: t, Y: h, Class: "altitude", LabelAt: -1}}},
			{Y: Axis{Label: "thrust", Unit: "N", Zero: true}, Height: 1.2,
				Series: []Series{
					{Name: "available", Unit: "N", X: t, Y: ta, Class: "available", LabelAt: 0.25},
					{Name: "required", Unit: "N", X: t, Y: tr, Class: "required", LabelAt: 0.25},
				},
				Bands: []Band{{X: t, Lower: tr, Upper: ta, Class: "hand"}},
				Flags: []Flag{{22 * 60, 910, "tightest: 380 N in hand, 72 %", "available"}}},
			{Y: Axis{Label: "fuel", Unit: "kg", Zero: true}, Height: 0.7,
				Series: []Series{{Name: "fuel", Unit: "kg", X: t, Y: fuel, Class: "energy", LabelAt: -1, Decimals: 1}}},
		},
	}
	for i, l := range labels {
		c.Spans = append(c.Spans, Span{60 * minutes[i], 60 * minutes[i+1], l[0], l[1]})
	}
	return c
}

func emptyChart() Chart {
	return Chart{
		ID: "empty", Title: "Nothing", Desc: "No level flight.", Height: 160,
		X:      Axis{Label: "true airspeed", Unit: "m/s"},
		Panels: []Panel{{Y: Axis{Label: "thrust", Unit: "N"}, Series: []Series{{Name: "available", X: []float64{1, 2}, Y: []float64{math.NaN(), math.Inf(1)}, Class: "available"}}}},
	}
}

func sampleCharts() []Chart {
	return []Chart{thrustChart(), climbChart(), ceilingChart(), missionChart(), emptyChart()}
}
