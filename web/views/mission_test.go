package views

import (
	"context"
	"fmt"
	"strings"
	"testing"

	"legwright/internal/perf/mission"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
)

// missionText is the page of the demo, changed, as it is written.
func missionText(t *testing.T, change func(*project.Spec)) (Mission, string) {
	t.Helper()
	s := plantStudy(t, func(s *project.Spec, _ *powerplant.PistonPropeller) { change(s) }, nil)
	m := NewMission(s, State{ProjectID: 1, Page: "mission", Revision: 1})
	var b strings.Builder
	if err := MissionPage(m).Render(context.Background(), &b); err != nil {
		t.Fatal(err)
	}
	return m, b.String()
}

// TestMissionPage: every case is a whole page that says what it must and holds no missing number.
func TestMissionPage(t *testing.T) {
	add := func(kind string, change func(*mission.Leg)) func(*project.Spec) {
		return func(s *project.Spec) {
			l := mission.NewLeg(kind, "New one")
			if change != nil {
				change(&l)
			}
			s.Legs = append(s.Legs, l)
		}
	}
	for name, c := range map[string]struct {
		change func(*project.Spec)
		want   []string
	}{
		"demo":            {func(*project.Spec) {}, []string{"Flies the mission, with", `id="mission-shares"`, `id="mission-shares-narrow"`, "30.0\u00a0min of 30.0\u00a0min flown in reserve legs", "at the end, 2700\u00a0m"}},
		"no legs":         {func(s *project.Spec) { s.Legs = nil }, []string{"The mission has no legs.", "No leg was flown.", "No leg is flown, so none takes time or fuel.", "Add a leg at the end"}},
		"no reserve":      {func(s *project.Spec) { s.Legs = s.Legs[:8] }, []string{"The mission keeps no reserve."}},
		"ends early":      {func(s *project.Spec) { s.Legs[2].Altitude = 9000 }, []string{"The mission ends here: it climbs no further than", "Not reached.", "up to where it ends", "Left where it ends"}},
		"contingency":     {add(mission.Contingency, nil), []string{"Keeps 1.4\u00a0kg: 5.0\u00a0% of the trip’s", "the greater of 5\u00a0% of the trip and 5.0\u00a0min of holding at 1000\u00a0m", "To be kept by contingencies"}},
		"too much kept":   {add(mission.Contingency, func(l *mission.Leg) { l.Share = 1; l.Time = 5 * 3600 }), []string{"Flies the mission but does not keep the reserve.", "Not met: ", "that must be kept"}},
		"dropped":         {add(mission.Drop, func(l *mission.Leg) { l.Payload = 40 }), []string{"−40.0\u00a0kg, "}},
		"overweight":      {add(mission.PickUp, func(l *mission.Leg) { l.Payload = 400 }), []string{"above the designer&#39;s greatest take-off mass"}},
		"alternate":       {add(mission.Alternate, nil), []string{"100.0\u00a0km at 1000\u00a0m"}},
		"short alternate": {add(mission.Alternate, func(l *mission.Leg) { l.Altitude, l.Distance = 3000, 5e3 }), []string{"the altitude is too high for so short a way"}},
		"turns":           {add(mission.Turns, func(l *mission.Leg) { l.Path, l.Load, l.Turns = mission.ByLoad, 7, 0 }), []string{"is flown at a load factor of 7, beyond the limit of"}},
		"aviation":        {func(s *project.Spec) { s.Display = string(units.Aviation) }, []string{"lbf", "NM"}},
	} {
		m, text := missionText(t, c.change)
		for _, bad := range []string{"NaN", "Inf", "%!", "&lt;nil&gt;", "  ·"} {
			if strings.Contains(text, bad) {
				t.Errorf("%s: holds %q", name, bad)
			}
		}
		plain := strings.ReplaceAll(text, "&#39;s", "’s")
		for _, want := range c.want {
			if !strings.Contains(text, want) && !strings.Contains(plain, want) {
				t.Errorf("%s: lacks %q", name, want)
			}
		}
		for _, g := range []Grid{m.Legs, m.Parts} {
			for _, r := range g.Rows {
				if len(r) != len(g.Head) {
					t.Errorf("%s: %d cells under %d heads", name, len(r), len(g.Head))
				}
			}
		}
	}
}

// TestAccount: what is taken, kept and left adds up to what was usable at the start.
func TestAccount(t *testing.T) {
	m, _ := missionText(t, func(s *project.Spec) {
		s.Legs = append(s.Legs, mission.NewLeg(mission.Contingency, ""), mission.NewLeg(mission.Alternate, ""))
	})
	sum := 0.0
	for i, r := range m.Account {
		var v float64
		if _, err := fmt.Sscanf(r.Value, "%g", &v); err != nil {
			t.Fatalf("%+v", r)
		}
		if i == 0 {
			v = -v
		}
		sum += v
	}
	if len(m.Account) != 5 || sum < -0.21 || sum > 0.21 { // five numbers rounded to 0.1 kg
		t.Errorf("%v kg is unaccounted for in %+v", sum, m.Account)
	}
}

// TestLegCardButtons: the first leg goes no earlier and the last no later, and each button names its leg.
func TestLegCardButtons(t *testing.T) {
	m, _ := missionText(t, func(*project.Spec) {})
	for i, c := range m.Cards {
		var ids []string
		for _, b := range c.Buttons {
			ids = append(ids, strings.TrimPrefix(b.ID, c.ID+"-"))
			if !strings.HasPrefix(b.Name, b.Label) || !strings.Contains(b.Name, fmt.Sprintf("leg %d, ", i+1)) || !strings.HasSuffix(b.Action, fmt.Sprintf(" %d", i)) {
				t.Errorf("button %+v of card %d", b, i)
			}
		}
		want := "up down duplicate insert remove"
		switch i {
		case 0:
			want = "down duplicate insert remove"
		case len(m.Cards) - 1:
			want = "up duplicate insert remove"
		}
		if got := strings.Join(ids, " "); got != want {
			t.Errorf("card %d has %s", i, got)
		}
	}
	if len(m.Adds) != len(mission.KindOptions()) {
		t.Errorf("%d kinds can be added", len(m.Adds))
	}
}
