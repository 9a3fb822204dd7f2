package views

import (
	"slices"
	"strings"
	"testing"

	"legwright/internal/perf/mission"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
)

func TestDifferences(t *testing.T) {
	plant := func(s *project.Spec) *powerplant.PistonPropeller {
		return s.Variants[0].Aircraft.Powerplant.Model.(*powerplant.PistonPropeller)
	}
	const a = "“A · 60 kW, climb propeller”, "
	for _, c := range []struct {
		name   string
		change func(*project.Spec)
		sys    units.System
		want   []string
	}{
		{"nothing", func(*project.Spec) {}, units.Metric, nil},
		{"a number, in both systems", func(s *project.Spec) { s.Strips[0].Length = 500 }, units.Metric, []string{"Strip “Sorrel Down 08” | Strip length | 600 m → 500 m"}},
		{"", func(s *project.Spec) { s.Strips[0].Length = 500 }, units.Aviation, []string{"Strip “Sorrel Down 08” | Strip length | 1968.504 ft → 1640.42 ft"}},
		{"beyond the digits shown", func(s *project.Spec) { s.Strips[0].Length *= 1 + 1e-12 }, units.Metric, nil},
		{"a choice and what it makes idle", func(s *project.Spec) {
			plant(s).Fuel.FuelGiven = powerplant.ByMass
		}, units.Metric, []string{a + "powerplant, fuel | Fuel aboard given as | volume → mass", a + "powerplant, fuel | Fuel aboard | 88 L → –", a + "powerplant, fuel | Fuel aboard | – → 63.36 kg"}},
		{"a table", func(s *project.Spec) {
			r := plant(s).Engine.PowerCurve
			r[1][1] = 40e3
			plant(s).Engine.PowerCurve = r[:5]
		}, units.Metric, []string{a + "powerplant, engine | Full-throttle power | 6 rows; row 2: 1900 · 39; row 6: 2850 · 60.9 → 5 rows; row 2: 1900 · 40"}},
		{"a basis", func(s *project.Spec) {
			s.Variants[0].Basis["airframe.cd_min"] = project.Basis{Kind: project.Measured, PlusMinus: 0.001, Note: "flown"}
		}, units.Metric, []string{a + "airframe | Basis of minimum drag coefficient | estimated ± 0.003, “from similar aircraft” → measured ± 0.001, “flown”"}},
		{"an item gone, the bases of the others stay theirs", func(s *project.Spec) {
			v := &s.Variants[0]
			v.Aircraft.Weights.Items = slices.Delete(v.Aircraft.Weights.Items, 0, 1)
			v.Basis["weights.items[1].mass"] = project.Basis{Kind: project.Estimated}
		}, units.Metric, []string{a + "weights | Item “Pilot” | there: mass 86 kg → removed"}},
		{"a configuration", func(s *project.Spec) { s.Variants[0].Aircraft.Airframe.TakeOff.CLMax = 1.7 }, units.Metric, []string{a + "airframe, take-off | CLmax | 1.65 → 1.7"}},
		{"a leg between, one renamed", func(s *project.Spec) {
			s.Legs[0].Name = "Warm up"
			l := mission.NewLeg(mission.Loiter, "Look at the lake")
			s.Legs = slices.Insert(s.Legs, 5, l)
		}, units.Metric, []string{"Leg “Warm up” | Name | “Start and taxi” → “Warm up”", "| Leg “Look at the lake” | – → added: kind of leg loiter"}},
		{"a requirement", func(s *project.Spec) { s.Requirements[1].Limit = 3 }, units.Metric, []string{"Requirement “Best rate of climb” | Limit | 2.5 m/s → 3 m/s"}},
		{"a variant", func(s *project.Spec) { s.Variants = s.Variants[:1] }, units.Metric, []string{"| Variant “B · 74 kW, climb propeller” | there → removed"}},
		{"a name", func(s *project.Spec) { s.Name = "Over the hill" }, units.Metric, []string{"| Project | “Sorrel Down to the lake and back” → “Over the hill”"}},
	} {
		now := project.Demo()
		c.change(now)
		var got []string
		for _, r := range differences(project.Demo(), now, c.sys) {
			got = append(got, strings.TrimSpace(r.Part+" | "+r.Label+" | "+r.Then+" → "+r.Now))
		}
		ok := len(got) == len(c.want)
		for i := 0; ok && i < len(got); i++ {
			ok = strings.HasPrefix(got[i], c.want[i])
		}
		if !ok {
			t.Errorf("%s:\n%s\nwant\n%s", c.name, strings.Join(got, "\n"), strings.Join(c.want, "\n"))
		}
	}
}

// TestBasesFollowTheirItems: bases are kept by place; what is compared is the basis of the same item.
func TestBasesFollowTheirItems(t *testing.T) {
	basis := func(kind string) project.Basis { return project.Basis{Kind: kind} }
	then, now := project.Demo(), project.Demo()
	then.Variants[0].Basis["weights.items[0].mass"] = basis(project.Maker)
	then.Variants[0].Basis["weights.items[1].mass"] = basis(project.Calculated)
	then.Variants[0].Basis["weights.items[2].mass"] = basis(project.Measured)
	w := &now.Variants[0].Aircraft.Weights
	w.Items = w.Items[1:]
	now.Variants[0].Basis["weights.items[0].mass"] = basis(project.Calculated)
	now.Variants[0].Basis["weights.items[1].mass"] = basis(project.Estimated)
	rows := differences(then, now, units.Metric)
	if len(rows) != 2 || rows[1].Label != "Basis of mass" || !strings.HasSuffix(rows[1].Part, "item “Baggage”") || rows[1].Then != "measured" || rows[1].Now != "estimated" {
		t.Errorf("%+v", rows)
	}
}
