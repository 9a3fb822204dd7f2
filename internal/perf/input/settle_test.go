package input_test

import (
	"testing"

	"legwright/internal/perf/input"
)

// A hull is a document in which what one choice offers depends on another.
type hull struct {
	Kind string `json:"kind"`
	Rule string `json:"rule"`
}

func (h *hull) Inputs() []input.Entry {
	rules := []input.Option{{Value: "deep"}, {Value: "shallow"}}
	if h.Kind == "wing" {
		rules = []input.Option{{Value: "flat"}, {Value: "steep"}, {Value: "deep"}}
	}
	return []input.Entry{input.Pick("kind", "Kind", &h.Kind, input.Option{Value: "float"}, input.Option{Value: "wing"}), input.Pick("rule", "Rule", &h.Rule, rules...).If(h.Kind != "")}
}

func TestSettle(t *testing.T) {
	for _, c := range []struct{ before, after hull }{
		{hull{"wing", "shallow"}, hull{"wing", "flat"}},
		{hull{"wing", "deep"}, hull{"wing", "deep"}},
		{hull{"float", "flat"}, hull{"float", "deep"}},
		{hull{"raft", "flat"}, hull{"float", "deep"}},
	} {
		h := c.before
		if input.Settle(&h); h != c.after {
			t.Errorf("%v settles to %v, want %v", c.before, h, c.after)
		}
	}
}
