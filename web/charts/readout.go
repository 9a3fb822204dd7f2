package charts

import (
	"encoding/json"
	"math"
	"slices"
	"strconv"
)

// sig is a number with 5 significant digits in JSON; what cannot be drawn is null.
type sig float64

func (v sig) MarshalJSON() ([]byte, error) {
	f := float64(v)
	if !usable(f) {
		return []byte("null"), nil
	}
	return strconv.AppendFloat(nil, f, 'g', 5, 64), nil
}

// The script reads these; the one-letter names keep a page with many charts small.
type (
	readPlot struct {
		X      readAxis     `json:"x"`
		Panels []readPanel  `json:"k"`
		Xs     [][]sig      `json:"v"` // the distinct x of the series
		Series []readSeries `json:"s"`
		Spans  []readSpan   `json:"w,omitempty"`
	}
	readAxis struct {
		Name     string  `json:"n"`
		Unit     string  `json:"u,omitempty"`
		Min      float64 `json:"a"`
		Max      float64 `json:"b"`
		From     pixel   `json:"p"` // of Min in the viewBox
		To       pixel   `json:"q"`
		Format   string  `json:"f,omitempty"`
		Decimals int     `json:"d"`
	}
	readPanel struct {
		Min  float64 `json:"a"`
		Max  float64 `json:"b"`
		From pixel   `json:"p"`
		To   pixel   `json:"q"`
	}
	readSeries struct {
		Name     string `json:"n"`
		Unit     string `json:"u,omitempty"`
		Class    string `json:"c"`
		Panel    int    `json:"k"`
		X        int    `json:"v"` // index into Xs
		Y        []sig  `json:"y"`
		Decimals int    `json:"d"`
	}
	readSpan struct {
		From sig    `json:"a"`
		To   sig    `json:"b"`
		Name string `json:"n"`
	}
)

// pixel is a viewBox coordinate with two decimals in JSON.
type pixel float64

func (v pixel) MarshalJSON() ([]byte, error) { return appendCoord(nil, float64(v)), nil }

// readout returns the JSON for the script, or nothing for a chart without data.
func (f *frame) readout() string {
	h := f.chart.Height
	out := readPlot{X: readAxis{
		Name: f.xName(), Unit: f.chart.X.Unit, Min: f.x.min, Max: f.x.max,
		From: pixel(f.x.from), To: pixel(f.x.to),
		Format: f.chart.X.Format, Decimals: decimalsFor((f.x.max - f.x.min) / 100),
	}}
	for k, p := range f.panels {
		out.Panels = append(out.Panels, readPanel{p.y.min, p.y.max, pixel(h - p.y.from), pixel(h - p.y.to)})
		for i, s := range p.spec.Series {
			if len(p.data[i]) == 0 {
				continue
			}
			xs, ys := sigs(p.data[i])
			class := s.Class
			if class != "none" {
				class = paintToken(s.Class, "").class
			}
			out.Series = append(out.Series, readSeries{
				Name: s.Name, Unit: s.Unit, Class: class, Panel: k, X: out.indexOf(xs), Y: ys, Decimals: max(s.Decimals, 0),
			})
		}
	}
	if len(out.Series) == 0 {
		return ""
	}
	for _, s := range f.chart.Spans {
		if usable(s.From) && usable(s.To) {
			out.Spans = append(out.Spans, readSpan{sig(s.From), sig(s.To), s.Label})
		}
	}
	b, err := json.Marshal(out)
	if err != nil {
		panic("charts: " + err.Error()) // only strings and usable numbers are marshalled
	}
	return string(b)
}

func (f *frame) xName() string {
	if f.chart.XFirst != "" {
		return f.chart.XFirst
	}
	return f.chart.X.Label
}

// sigs flattens a curve; a null between its runs keeps the gap.
func sigs(c curve) (xs, ys []sig) {
	for i, run := range c {
		if i > 0 {
			xs, ys = append(xs, sig(run[0].x)), append(ys, sig(math.NaN()))
		}
		for _, p := range run {
			xs, ys = append(xs, sig(p.x)), append(ys, sig(p.y))
		}
	}
	return xs, ys
}

func (r *readPlot) indexOf(xs []sig) int {
	for i, have := range r.Xs {
		if slices.Equal(have, xs) {
			return i
		}
	}
	r.Xs = append(r.Xs, xs)
	return len(r.Xs) - 1
}
