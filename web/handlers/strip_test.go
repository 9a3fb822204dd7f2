package handlers

import (
	"strings"
	"testing"
)

// TestStripPage: the strip follows the view of the query, keeps what it does not
// understand beside the reason, and hands the view on to the other pages.
func TestStripPage(t *testing.T) {
	v := visit(t)
	const at = "/projects/1/variants/a/strip"
	headline := func(query string, code int) string {
		t.Helper()
		v.at = nil
		v.get(at + query)
		if v.reply.Code != code {
			t.Fatalf("%s: status %d, want %d", query, v.reply.Code, code)
		}
		if err := checkPage(v.reply.Body.String()); err != nil {
			t.Errorf("%s: %v", query, err)
		}
		return text(one(v.page, "h1"))
	}
	if got := headline("", 200); !strings.HasPrefix(got, "The take-off fits only without its safety factor") {
		t.Errorf("headline %q", got)
	}
	if got := headline("?mass=480", 200); !strings.HasPrefix(got, "The take-off and the landing fit") {
		t.Errorf("light: headline %q", got)
	}
	if got := headline("?altitude=5500", 200); !strings.HasPrefix(got, "The take-off is not possible") {
		t.Errorf("high: headline %q", got)
	}
	if href := attr(one(v.page, ".sections a"), "href"); !strings.HasSuffix(href, "?altitude=5500") {
		t.Errorf("the bench is at %s", href)
	}
	headline("?mass=heavy", 422)
	if field := one(v.page, "#view-mass"); attr(field, "value") != "heavy" || one(v.page, "#view-form .error") == nil {
		t.Error("what was typed is gone, or nothing says why it was not taken")
	}
}
