package input_test

import (
	"slices"
	"testing"

	"legwright/internal/perf/input"
)

type tank struct {
	Given  string  `json:"given"`
	Volume float64 `json:"volume"`
	told   *[]string
}

func (k *tank) Convert(choice, from string) { *k.told = append(*k.told, "tank "+choice+" "+from) }

type craft struct {
	Tanks []tank `json:"tanks"`
	Main  tank   `json:"main"`
	Part  any    `json:"part"`
	told  *[]string
}

func (c *craft) Convert(choice, from string) { *c.told = append(*c.told, "craft "+choice+" "+from) }

func TestConvert(t *testing.T) {
	var told []string
	c := &craft{Tanks: []tank{{told: &told}, {told: &told}}, Main: tank{told: &told}, Part: &tank{told: &told}, told: &told}
	for _, test := range []struct {
		path string
		want []string
	}{
		{"main.given", []string{"tank given a", "craft main.given a"}},
		{"tanks[1].given", []string{"tank given a", "craft tanks[1].given a"}},
		{"part.given", []string{"tank given a", "craft part.given a"}},
		{"tanks[2].given", []string{"craft tanks[2].given a"}},
		{"nowhere.given", []string{"craft nowhere.given a"}},
	} {
		told = nil
		input.Convert(c, test.path, "a")
		if !slices.Equal(told, test.want) {
			t.Errorf("%s: told %q, want %q", test.path, told, test.want)
		}
	}
}
