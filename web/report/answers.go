package report

import (
	"fmt"
	"math"
	"slices"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// requirements holds each requirement against its figure, under the conditions that it sets.
func (r *Report) requirements() Table {
	t := Table{Columns: []Column{words("Requirement"), words("Bound"), anyOf("Limit"), anyOf("Predicted"), anyOf("Margin"), unitOf("Unit"), words("Answer"), words("Holds at")}}
	clauses := slices.ContainsFunc(r.Study.Requirements, func(v study.Verdict) bool { return v.Requirement.Clause != "" })
	if clauses {
		t.Columns = append(t.Columns, words("From"))
	}
	for i := range r.Study.Requirements {
		v := &r.Study.Requirements[i]
		if v.Figure == nil {
			continue
		}
		q := v.Figure.Quantity
		bound := "at most"
		if v.Requirement.Bound == project.AtLeast {
			bound = "at least"
		}
		row := []Cell{say(v.Figure.Label), say(bound), of(q, v.Requirement.Limit), of(q, v.Figure.Value), of(differenceOf(q), v.Margin()), of(q, 0), say("missed"), say(v.Figure.Where.In(r.sys()))}
		switch {
		case !v.Judged():
			row[3], row[4], row[6] = Cell{word: "none", quantity: q, why: sentence(v.Reason.In(r.sys()))}, Cell{word: "none", quantity: q}, say("not judged")
		case v.Met:
			row[6] = say("met")
		}
		if clauses {
			row = append(row, say(v.Requirement.Clause))
		}
		t.Rows = append(t.Rows, row)
	}
	if len(t.Rows) == 0 {
		t.Reason = "The project has no requirements."
	}
	return t
}

// figures lists every figure.
func (r *Report) figures() Table {
	t := Table{Note: "At the start mass and on the project's day, unless the last column says otherwise.",
		Columns: []Column{words("Figure"), anyOf("Predicted"), unitOf("Unit"), pure("Placeholders under it", 0), words("Holds at")}}
	for i := range r.Study.Figures {
		f := &r.Study.Figures[i]
		predicted := of(f.Quantity, f.Value)
		if !f.Has() {
			predicted = Cell{word: "none", quantity: f.Quantity, why: sentence(f.Label + ": " + f.Reason.In(r.sys()))}
		}
		t.Rows = append(t.Rows, []Cell{say(f.Label), predicted, of(f.Quantity, 0), value(float64(len(r.Study.Unsure(f)))), say(f.Where.In(r.sys()))})
	}
	return t
}

// swings moves each driver down and up; the greatest effect stands first.
func (r *Report) swings() []study.Swing {
	drivers := r.Study.Drivers()
	list := make([]study.Swing, len(drivers))
	spread(len(drivers), func(i int) { list[i] = r.Study.Swing(drivers[i]) })
	study.Rank(list)
	return list
}

// sensitivity is every swing, each input moved alone.
func (r *Report) sensitivity() Table {
	t := Table{Note: r.swingNote(), Columns: []Column{words("Input"), words("±"), anyOf("Low"), anyOf("High"), unitOf("Unit"),
		num("In hand, low", units.Fraction), num("In hand, high", units.Fraction)}}
	watched := r.Study.Watched()
	if watched != nil {
		t.Columns = append(t.Columns, num(watched.Figure.Label+", low", watched.Figure.Quantity), num(watched.Figure.Label+", high", watched.Figure.Quantity))
	}
	for _, w := range r.swings() {
		q := w.Quantity
		row := []Cell{say(r.inputName(w.Path, w.Label)), say(bandWords(&w, r.sys())), of(q, w.Low.Input), of(q, w.High.Input), of(q, 0), r.hand(&w.Low), r.hand(&w.High)}
		if watched != nil {
			row = append(row, r.watchedCell(&w.Low, watched), r.watchedCell(&w.High, watched))
		}
		t.Rows = append(t.Rows, row)
	}
	if len(t.Rows) == 0 {
		t.Reason = "No input of the aircraft has a stated ±, and none is an estimate or a placeholder."
	}
	return t
}

// swingNote says how the inputs are moved and what for.
func (r *Report) swingNote() string {
	text := fmt.Sprintf("One input moved at a time, the others as they are: by its stated ±, or else an estimate by ±%s and a placeholder by ±%s of its value (common practice, no source). ",
		percent(study.AssumedShare(project.Estimated)), percent(study.AssumedShare(project.Placeholder)))
	hand := r.Study.Figure("thrust_in_hand")
	if hand.Has() {
		text += "Thrust in hand at the tightest point is now " + r.sys().Format(units.Fraction, hand.Value) + ". "
	}
	w := r.Study.Watched()
	if w == nil {
		return text + "No requirement can be judged, so none is watched."
	}
	kind := "the one met by least"
	if !w.Met {
		kind = "the one missed by most"
	}
	return text + fmt.Sprintf("The requirement watched is %s: %s, now %s.", kind, lowerFirst(w.Figure.Label), r.sys().Format(w.Figure.Quantity, w.Figure.Value))
}

// bandWords says by how much an input is moved and why by that.
func bandWords(w *study.Swing, sys units.System) string {
	if w.Stated {
		return "±\u00a0" + units.Plain(w.Half/sys.Step(w.Quantity, 1)) + symbolAfter(sys, w.Quantity) + ", stated"
	}
	return "±\u00a0" + percent(study.AssumedShare(w.Basis)) + ", " + project.BasisLabel(w.Basis)
}

func symbolAfter(sys units.System, q units.Quantity) string {
	if sym := sys.Unit(q).Symbol; sym != "" {
		return "\u00a0" + sym
	}
	return ""
}

func (r *Report) hand(o *study.Outcome) Cell {
	if c, out := r.left(o); out {
		return c
	}
	if !o.HasHand {
		return Cell{word: "none", why: "With that input no leg is flown, so there is no thrust in hand."}
	}
	return value(o.Hand)
}

func (r *Report) watchedCell(o *study.Outcome, w *study.Verdict) Cell {
	if c, out := r.left(o); out {
		return c
	}
	if !o.HasValue {
		return Cell{word: "none", why: fmt.Sprintf("With that input there is no answer to “%s”.", lowerFirst(w.Figure.Label))}
	}
	return value(o.Value)
}

// left is the cell of an end that the document does not take.
func (r *Report) left(o *study.Outcome) (Cell, bool) {
	if o.Err == nil {
		return Cell{}, false
	}
	return r.none("refused", o.Err), true
}

// percent writes a share in whole per cent.
func percent(share float64) string { return units.Fixed(math.Round(100*share), 0) + "\u00a0%" }
