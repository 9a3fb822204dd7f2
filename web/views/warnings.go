package views

import (
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// A WarningView is one warning as shown.
type WarningView struct {
	Code, Level, Word, About, Text, Clear string
}

// groupSubjects says which warnings stand in a group of inputs, by its ID.
var groupSubjects = map[string]string{"airframe": "airframe", "weights": "weights", "powerplant-engine": "powerplant", "limits": "limits"}

func warnings(list []study.Warning, sys units.System) []WarningView {
	shown := make([]WarningView, len(list))
	for i, w := range list {
		shown[i] = WarningView{w.Code, string(w.Level), levelWord(w.Level), w.About, sentence(w.Text.In(sys)), w.Clear}
	}
	return shown
}

// concerning picks the warnings about one subject, which they stand beside as well as in the list of all.
func concerning(list []WarningView, about string) []WarningView {
	var some []WarningView
	for _, w := range list {
		if about != "" && w.About == about {
			some = append(some, w)
		}
	}
	return some
}

func levelWord(l study.Level) string {
	switch l {
	case study.Stop:
		return "Stop"
	case study.Caution:
		return "Caution"
	}
	return "Note"
}
