package charts

import (
	"fmt"
	"math"

	"legwright/internal/perf/runway"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// airborne names the segments that are flown; pauses those at one speed on the ground.
var (
	airborne = map[string]bool{"transition": true, "climb": true, "approach": true, "flare": true}
	pauses   = map[string]bool{"rotation": true, "free roll": true}
)

// StripDrawing draws a take-off or landing on its strip.
func StripDrawing(f *study.Field, sys units.System) Drawing {
	p := &f.Present
	m := measureOf(sys, units.FieldLength, 0)
	d := Drawing{ID: "strip-" + verb(f), Unit: m.unit.Symbol, Decimals: max(m.decimals, 1), Length: m.of(p.Place.Strip.Length), Screen: math.NaN(),
		End: "end of strip " + m.label(p.Place.Strip.Length), GoesOn: "strip goes on to " + m.label(p.Place.Strip.Length),
		Note: fieldWords(f, sys) + "."}
	d.Pieces = pieces(p.Run.Segments, m)
	if p.Err != nil {
		d.Said = "No " + verb(f) + ": " + reason(sys, p.Err) + "."
		d.Title = sentenceCase(verb(f)) + " on " + p.Place.Strip.Name + ": none."
		d.Desc = d.Said
		if !f.Landing && len(d.Pieces) > 0 {
			d.Marks = []Mark{{m.of(p.Run.Ground), "lift-off " + speedLabel(sys, p.Run.Speed)}}
			d.Along, d.Heights = []float64{0, m.of(p.Run.Ground)}, []float64{0, 0}
		} else {
			d.Pieces = nil
		}
		return d
	}
	for _, q := range p.Run.Path {
		d.Along, d.Heights = append(d.Along, m.of(q.X)), append(d.Heights, m.of(q.Height))
	}
	d.Factored = m.of(p.Run.Factored)
	d.FactoredLabel = fmt.Sprintf("with safety factor × %s: %s, %s", units.Plain(f.Factor), m.label(p.Run.Factored), margin(m, p.Run.Factored, p.Place.Strip.Length))
	if p.Run.Total > p.Place.Strip.Length {
		d.Past = m.label(p.Run.Total-p.Place.Strip.Length) + " past the end"
	}
	d.addMarks(f, m, sys)
	d.Title = fmt.Sprintf("%s on %s to scale: %s of %s.", sentenceCase(verb(f)), p.Place.Strip.Name, m.prose(p.Run.Total), m.prose(p.Place.Strip.Length))
	d.Desc = runWords(f, m, sys)
	return d
}

// pieces joins what is flown into one piece.
func pieces(segments []runway.Segment, m measure) []Piece {
	var list []Piece
	at := 0.0
	for _, s := range segments {
		name, class := s.Name, "roll"
		switch {
		case airborne[s.Name]:
			name, class = "airborne", "air"
		case pauses[s.Name]:
			class = "pause"
		}
		to := at + s.Distance
		if n := len(list); n > 0 && class == "air" && list[n-1].Class == "air" {
			list[n-1].To = m.of(to)
		} else {
			list = append(list, Piece{From: m.of(at), To: m.of(to), Name: name, Class: class})
		}
		at = to
	}
	kept := list[:0]
	for _, p := range list {
		if p.To > p.From {
			p.Label = p.Name + " " + readNumber(p.To-p.From, m.decimals) + "\u00a0" + m.unit.Symbol
			kept = append(kept, p)
		}
	}
	return kept
}

// addMarks marks the speeds at the obstacle and where the wheels leave or meet the ground.
func (d *Drawing) addMarks(f *study.Field, m measure, sys units.System) {
	p := &f.Present
	over, wheels := p.Run.Total, p.Run.Ground
	if f.Landing {
		over, wheels = 0, p.Run.Total-p.Run.Ground
	}
	name := "lift-off "
	if f.Landing {
		name = "touchdown "
	}
	d.Marks = append(d.Marks, Mark{m.of(wheels), name + speedLabel(sys, p.Run.Speed)})
	if h := p.Place.Strip.Obstacle; h > 0 {
		d.Screen = m.of(over)
		d.Marks = append(d.Marks, Mark{m.of(over), "over " + measureOf(sys, units.Height, 0).label(h) + " at " + speedLabel(sys, p.Run.Screen)})
	}
}

func speedLabel(sys units.System, v float64) string { return measureOf(sys, units.Speed, 0).label(v) }

func verb(f *study.Field) string {
	if f.Landing {
		return "landing"
	}
	return "take-off"
}

func sentenceCase(text string) string { return string(text[0]&^0x20) + text[1:] }

// margin says how far inside or past the end of the strip a distance ends.
func margin(m measure, distance, length float64) string {
	if distance > length {
		return m.label(distance-length) + " past the end"
	}
	return m.label(length-distance) + " inside"
}

// fieldWords says the condition of a take-off or landing.
func fieldWords(f *study.Field, sys units.System) string {
	p := &f.Present
	text := massWords(sys, p.Mass) + ", " + dayWords(sys, f.Deviation) + " at " + measureOf(sys, units.Altitude, 0).prose(p.Place.Air.PressureAltitude) + ", " + p.Place.Surface.Label
	wind := measureOf(sys, units.Speed, 0)
	switch v := p.Place.HeadWind; {
	case v > 0:
		text += ", " + wind.prose(v) + " head wind"
	case v < 0:
		text += ", " + wind.prose(-v) + " tail wind"
	default:
		text += ", calm"
	}
	slope := units.Fixed(math.Abs(100*p.Place.Strip.Slope), 1) + "\u00a0%"
	switch v := p.Place.Strip.Slope; {
	case v > 0:
		text += ", " + slope + " uphill"
	case v < 0:
		text += ", " + slope + " downhill"
	default:
		text += ", level"
	}
	return text
}

// runWords describes the drawing to those who do not see it.
func runWords(f *study.Field, m measure, sys units.System) string {
	p := &f.Present
	text := sentenceCase(verb(f)) + " at " + fieldWords(f, sys) + ". "
	for _, piece := range pieces(p.Run.Segments, m) {
		text += fmt.Sprintf("%s from %s to %s. ", sentenceCase(piece.Name), units.Fixed(piece.From, m.decimals), units.Fixed(piece.To, m.decimals)+"\u00a0"+m.unit.Symbol)
	}
	where := "inside the strip of "
	if p.Run.Total > p.Place.Strip.Length {
		where = "past the end of the strip of "
	}
	return text + fmt.Sprintf("It ends %s%s; with the safety factor %s it takes %s.", where, m.prose(p.Place.Strip.Length), units.Plain(f.Factor), m.prose(p.Run.Factored))
}
