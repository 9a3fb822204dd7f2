package browsertest

import "testing"

// TestServerGone: when the program has ended, the page must not say saved, and what was typed stays until it can be sent.
func TestServerGone(t *testing.T) {
	p, s := bench(t)
	s.stop()
	p.typed(field(baggage), "33")
	p.swapped(func() { p.press(tabKey) })
	has(t, p.text("#saved"), "not saved")
	if got := p.value(field(baggage)); got != "33" {
		t.Errorf("the field shows %q", got)
	}
	p.forget()
}
