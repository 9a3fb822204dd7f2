package handlers

import (
	"strings"
	"testing"

	"legwright/internal/perf/loads"
	"legwright/internal/perf/project"
)

func TestClimbPage(t *testing.T) {
	v := visit(t)
	v.get("/projects/1/variants/a/climb")
	if v.reply.Code != 200 {
		t.Fatal(v.reply.Code)
	}
	if err := checkPage(v.reply.Body.String()); err != nil {
		t.Error(err)
	}
	for id, want := range map[string]string{"#climb-lead": "service ceiling", "#bounds": "Absolute ceiling", "#turn-facts": "4.80", "#ceilings-section": "Greatest take-off",
		"#glide-section": "The propeller is taken to", "#turns-section": "structural limit is the one that was entered", "#envelope-data": "never exceed, m/s",
		"#structure-lead": "Designed to CS-VLA", "#structure-facts": "per radian", "#structure-section": "a licensed person", "#structure-data": "gust up"} {
		if n := one(v.page, id); n == nil || !strings.Contains(text(n), want) {
			t.Errorf("%s does not say %q", id, want)
		}
	}
	if n := len(all(v.page, "#turns-section tbody tr")); n < 5 {
		t.Errorf("%d rows of turns", n)
	}
}

// The form sends the condition in the address; what is not understood stays in its field, is said, and the rest holds.
func TestClimbPageCondition(t *testing.T) {
	v := visit(t)
	v.get("/projects/1/variants/b/climb?altitude=2000&isa=warm&mass=600")
	if v.reply.Code != 422 {
		t.Errorf("status %d for a deviation that is no number", v.reply.Code)
	}
	if n := one(v.page, "#view-isa"); attr(n, "value") != "warm" || attr(n, "aria-invalid") != "true" {
		t.Errorf("the deviation reads %q", attr(n, "value"))
	}
	if n := one(v.page, "#view-form .error"); n == nil || !strings.Contains(text(n), "warm") {
		t.Error("nothing is said of it")
	}
	if got := text(one(v.page, "#climb-lead")); !strings.Contains(got, "at 2000 m") {
		t.Errorf("answers %q", got)
	}
	for _, tab := range all(v.page, ".sections a") {
		if !strings.Contains(attr(tab, "href"), "altitude=2000") {
			t.Errorf("the condition is lost on the way to %s", attr(tab, "href"))
		}
	}
}

func TestClimbPageOfOddAircraft(t *testing.T) {
	v := visit(t)
	heavy := project.Demo()
	heavy.Variants[0].Aircraft.Weights.Empty, heavy.Display = 2500, "aviation"
	flimsy := project.Demo()
	flimsy.Variants[0].Aircraft.Airframe.NeverExceed, flimsy.Display = 12, "small"
	v.keep(heavy)
	v.keep(flimsy)
	for _, address := range []string{"/projects/2/variants/a/climb", "/projects/3/variants/a/climb", "/projects/1/variants/a/climb?mass=0.05", "/projects/1/variants/a/climb?altitude=25000",
		"/projects/1/variants/a/climb?altitude=-500&isa=60&config=landing", "/projects/1/variants/b/climb?mass=100000"} {
		v.at = nil
		v.get(address)
		if v.reply.Code != 200 {
			t.Errorf("%s: status %d", address, v.reply.Code)
		}
		if err := checkPage(v.reply.Body.String()); err != nil {
			t.Errorf("%s: %v", address, err)
		}
	}
}

// Without structural limits the page makes none up, and leads to where they are entered.
func TestClimbPageWithoutLimits(t *testing.T) {
	v := visit(t)
	bare := project.Demo()
	bare.Variants[0].Aircraft.Limits = loads.Unentered()
	v.keep(bare)
	v.get("/projects/2/variants/a/climb")
	if err := checkPage(v.reply.Body.String()); err != nil || v.reply.Code != 200 {
		t.Fatal(v.reply.Code, err)
	}
	for id, want := range map[string]string{"#turn-facts": "not entered", "#turns-section": "structural limit is not entered", "#structure-lead": "not entered"} {
		if n := one(v.page, id); n == nil || !strings.Contains(text(n), want) {
			t.Errorf("%s does not say %q", id, want)
		}
	}
	if n := all(v.page, "#structure-section svg"); len(n) != 0 {
		t.Error("an envelope is drawn")
	}
	link := one(v.page, "#structure-section a")
	address, field, _ := strings.Cut(attr(link, "href"), "#")
	v.get(address)
	if one(v.page, "#"+field) == nil {
		t.Errorf("the bench has no %q", field)
	}
}
