package units

import (
	"errors"
	"fmt"
	"io"
	"testing"
)

func TestMessage(t *testing.T) {
	climb := Say("{} climbs at {}, not {}", Text("It"), Of(ClimbRate, 2.54), Of(ClimbRate, 3.048))
	for _, c := range []struct {
		m    Message
		sys  System
		want string
	}{
		{climb, Metric, "It climbs at 2.54\u00a0m/s, not 3.05\u00a0m/s"},
		{climb, Aviation, "It climbs at 500\u00a0ft/min, not 600\u00a0ft/min"},
		{Say("no argument"), Metric, "no argument"},
		{Say("{} {}", Text("{}"), Of(Speed, 10)), Metric, "{} 10.0\u00a0m/s"},
		{Say("fewer places", Of(Speed, 1)), Metric, "fewer places"},
		{Say("end {}", Of(Fraction, 0.5)), Small, "end 50.0\u00a0%"},
	} {
		if got := c.m.In(c.sys); got != c.want {
			t.Errorf("%q in %s: %q, want %q", c.m.Format, c.sys, got, c.want)
		}
	}
	if climb.Empty() || !(Message{}).Empty() {
		t.Error("only the zero message is empty")
	}
}

func TestErrorf(t *testing.T) {
	inner := Errorf(io.EOF, "the run of {} ends", Of(FieldLength, 304.8))
	outer := fmt.Errorf("leg 2: %w", inner)
	if inner.Error() != "the run of 305\u00a0m ends" || !errors.Is(outer, io.EOF) {
		t.Errorf("%q, wrapping %v", inner, errors.Unwrap(inner))
	}
	if got := Explain(outer).In(Aviation); got != "the run of 1000\u00a0ft ends" {
		t.Errorf("explained as %q", got)
	}
	if got := Explain(errors.Join(io.ErrClosedPipe, outer)).In(Metric); got != "the run of 305\u00a0m ends" {
		t.Errorf("a joined error explained as %q", got)
	}
	if got := Explain(io.EOF).In(Aviation); got != "EOF" {
		t.Errorf("a plain error explained as %q", got)
	}
	if !Explain(nil).Empty() {
		t.Error("no error needs no explanation")
	}
}

// TestNestedMessages: a message inside another is read in the units of the outer one, and an empty text stays empty.
func TestNestedMessages(t *testing.T) {
	m := Say("it ends: {}{}", Nest(Say("no higher than {}", Of(Altitude, 3048))), Text(""))
	for sys, want := range map[System]string{Metric: "it ends: no higher than 3048\u00a0m", Aviation: "it ends: no higher than 10\u202f000\u00a0ft"} {
		if got := m.In(sys); got != want {
			t.Errorf("%s: %q, want %q", sys, got, want)
		}
	}
}

func TestNumbersOfAMessage(t *testing.T) {
	m := Say("{} of {}: {}", Of(Mass, 650), Text("the limit"), Nest(Say("{} more", Of(Force, 3))))
	got := m.Numbers()
	if len(got) != 2 || got[0] != Of(Mass, 650) || got[1] != Of(Force, 3) {
		t.Errorf("%+v", got)
	}
}
