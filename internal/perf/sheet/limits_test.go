package sheet_test

import (
	"strings"
	"testing"
	"time"

	"legwright/internal/perf/sheet"
)

// TestLargest: the largest texts that are taken are read in a second or so. The bound is
// for machines with other work: what grows with the square of the size takes minutes.
func TestLargest(t *testing.T) {
	for name, text := range map[string]string{
		"cells": strings.Repeat(strings.TrimSuffix(strings.Repeat("1,", 52), ",")+"\n", 10000), "quotes": "1,2\n" + strings.Repeat(`"`, 1e6), "digits": strings.Repeat("1", 1e6) + ";2\n",
		"blanks": strings.Repeat(" ", 1e6) + "1;2\n", "groups": strings.Repeat("1.234", 2e5) + ";2\n", "comments": strings.Repeat("#\n", 5e5) + "1;2\n", "brackets": strings.Repeat("(", 1e6) + ";a\n1;2\n",
	} {
		start := time.Now()
		decoded, _, err := sheet.Decode([]byte(text)[:min(len(text), sheet.MaxBytes)])
		if err != nil {
			t.Fatal(name, err)
		}
		s, err := sheet.Read(decoded, sheet.Settings{})
		if err == nil {
			b := &s.Blocks[0]
			b.Families()
			b.Fill(powers(), b.Guess(powers(), sheet.Mapping{Settings: s.Settings}))
		}
		if took := time.Since(start); took > 30*time.Second {
			t.Errorf("%s took %v (%v)", name, took, err)
		} else {
			t.Log(name, took, err)
		}
	}
}
