package study

import (
	"errors"
	"math"
	"slices"

	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/propeller"
	"legwright/internal/perf/units"
)

// staticSpeedShare is the least engine speed at rest over the rated speed that
// passes without remark: common practice, no source.
const staticSpeedShare = 0.85

// plantCautions gathers what the curves show, and then what the study says of
// the powerplant beside it; a study's warning of the same code is the less exact one.
func (s *Study) plantCautions(p *Plant) []Warning {
	var list []Warning
	for _, check := range []func(*Plant) *Warning{s.cautionThin, s.cautionTips, s.cautionRest, s.cautionThrottled, s.cautionEnds, s.cautionPoints, s.cautionCurve} {
		if w := check(p); w != nil {
			w.About = "powerplant"
			list = append(list, *w)
		}
	}
	for _, w := range s.Warnings {
		same := func(have Warning) bool { return have.Code == w.Code }
		if w.About == "powerplant" && !slices.ContainsFunc(list, same) {
			list = append(list, w)
		}
	}
	return list
}

// from says a speed, and whether level flight does not reach it.
func (s *Study) from(tas float64) units.Arg {
	text := s.Project.Spec.System().Format(units.Speed, tas)
	if b := s.Speeds.LevelMax; b.Err == nil && tas > b.TAS*(1+1e-9) {
		text += ", in a dive"
	}
	return units.Text(text)
}

// cautionThin is air in which even full setting only idles.
func (s *Study) cautionThin(p *Plant) *Warning {
	r := &p.Runs[p.View]
	if rest := r.Points[0]; rest.Err != nil || rest.Out.Limits&powerplant.Idling == 0 {
		return nil
	}
	return &Warning{Code: "no-power", Level: Caution, Clear: "Choose a lower altitude for the curves.",
		Text: units.Say("at {} and full setting the engine makes no power", units.Of(units.Altitude, r.Air.PressureAltitude))}
}

// cautionTips names the gravest tip Mach number of the runs, that of the view first.
func (s *Study) cautionTips(p *Plant) *Warning {
	runs := append([]PlantRun{p.Runs[p.View]}, p.Runs...)
	const clear = "A smaller diameter or a lower speed of rotation."
	for i := range runs {
		if o := runs[i].FastTips; o.Found {
			return &Warning{Code: "tip-mach", Level: Stop, Clear: clear,
				Text: units.Say("from {}, at {}, the propeller tips pass Mach 0.90: the thrust shown leaves compressibility out and is not to be relied on",
					s.from(o.TAS), units.Of(units.Altitude, runs[i].Air.PressureAltitude))}
		}
	}
	for i := range runs {
		if o := runs[i].Tips; o.Found {
			return &Warning{Code: "tip-mach", Level: Caution, Clear: clear,
				Text: units.Say("from {}, at {}, the propeller tips pass Mach 0.82: efficiency falls and noise rises beyond",
					s.from(o.TAS), units.Of(units.Altitude, runs[i].Air.PressureAltitude))}
		}
	}
	return nil
}

// cautionRest is a propeller that holds the engine down at rest.
func (s *Study) cautionRest(p *Plant) *Warning {
	if p.Curves == nil || s.staticErr != nil || s.Static.Shaft.EngineSpeed <= 0 || p.Curves.Propeller().Governed > 0 {
		return nil
	}
	rated := p.Curves.Engine().RatedSpeed
	share := s.Static.Shaft.EngineSpeed / rated
	if share >= staticSpeedShare {
		return nil
	}
	return &Warning{Code: "static-power", Level: Caution, Clear: "Less propeller pitch or diameter, or count on the power that it leaves.",
		Text: units.Say("at rest the engine turns {}, {} below the {} of its rated power: with this propeller it cannot make that power at take-off; it makes {} of it, height and heat included",
			units.Of(units.Rotation, s.Static.Shaft.EngineSpeed), units.Of(units.Fraction, 1-share), units.Of(units.Rotation, rated), units.Of(units.Fraction, s.Static.Fraction))}
}

// cautionThrottled is a fixed pitch that would overspeed the engine.
func (s *Study) cautionThrottled(p *Plant) *Warning {
	r := &p.Runs[p.View]
	if p.Curves == nil || !r.Throttled.Found {
		return nil
	}
	w := &Warning{Code: "throttled", Level: Caution, Clear: "More pitch, or mind the tachometer: nothing in the aircraft does it for the pilot."}
	w.Text = units.Say("from {}, full throttle would drive the engine past its {}: the curves hold the throttle back there",
		s.from(r.Throttled.TAS), units.Of(units.Rotation, p.Curves.Engine().Greatest))
	return w
}

// cautionEnds is a speed beyond which the powerplant has no answer, or a table without a row at rest.
func (s *Study) cautionEnds(p *Plant) *Warning {
	r := &p.Runs[p.View]
	if !r.Ends.Found {
		return nil
	}
	i := slices.IndexFunc(r.Points, func(pt PlantPoint) bool { return pt.Err != nil })
	reason := units.Nest(units.Explain(r.Points[i].Err))
	w := &Warning{Code: "table-ends", Level: Caution, Clear: "Add rows to the propeller table."}
	var outside *propeller.RangeError
	switch {
	case r.Ends.TAS == 0:
		w.Text = units.Say("there is no answer at rest: {}", reason)
	case errors.As(r.Points[i].Err, &outside):
		w.Text = units.Say("from {}, no allowed speed of rotation keeps the propeller inside its table, whose power is known to an advance ratio of {}; nothing is drawn beyond",
			s.from(r.Ends.TAS), units.Of(units.Coefficient, roundTo(outside.High, 1000)))
	default:
		w.Text = units.Say("from {} there is no answer: {}", units.Of(units.Speed, r.Ends.TAS), reason)
	}
	return w
}

// cautionPoints is the table of points, each of which may lie where the powerplant has no answer.
func (s *Study) cautionPoints(p *Plant) *Warning {
	for _, o := range p.Table {
		var outside *propeller.RangeError
		if errors.As(o.Err, &outside) {
			return &Warning{Code: "point-outside", Level: Caution, Clear: "Add rows to the propeller table.",
				Text: units.Say("{}: {}", units.Text(o.Name), units.Nest(units.Explain(o.Err)))}
		}
	}
	return nil
}

// cautionCurve is a point below the first row of the power table.
func (s *Study) cautionCurve(p *Plant) *Warning {
	if p.Curves == nil {
		return nil
	}
	least, name := math.Inf(1), ""
	for _, o := range p.Table {
		if o.Err == nil && o.Out.Limits&powerplant.Extrapolated != 0 && o.Out.Shaft.EngineSpeed < least {
			least, name = o.Out.Shaft.EngineSpeed, o.Name
		}
	}
	if name == "" {
		return nil
	}
	return &Warning{Code: "power-curve", Level: Caution, Clear: "Add a row to the power table.",
		Text: units.Say("{} lies at {}, below the first row of the power table, {}: torque is taken as constant below", units.Text("“"+name+"”"),
			units.Of(units.Rotation, least), units.Of(units.Rotation, p.Curves.Engine().Lowest))}
}
