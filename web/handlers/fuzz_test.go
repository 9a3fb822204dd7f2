package handlers

import (
	"bytes"
	"net/url"
	"strings"
	"testing"

	"legwright/internal/perf/project"
)

// Whatever a form holds, the answer is a sound page that says what was taken,
// and the stored document can be read and built. One site takes all bodies, so
// that the fields of one meet what another has made of the project.
func FuzzEditForm(f *testing.F) {
	for _, body := range []string{
		"revision=1&variants[0].aircraft.weights.empty=120+lb",
		"revision=1&system=aviation&variants[0].aircraft.weights.empty=1%2C234&legs[3].kind=taxi",
		"revision=-9&system=cubits&action=remove-item+0&variants[0].aircraft.weights.items[0].mass=NaN",
		"revision=99999999999999999999&action=move-leg-up+999999999999999999999",
		"action=remove-leg+-1&name=%00%ff%3Cscript%3E&variants[0].name=%ed%a0%80",
		"basis:variants[0].aircraft.weights.empty=measured&basis:variants[9].aircraft.weights.empty=x&basis:=&basis:name=measured",
		"variants[0].aircraft.airframe.drag_given=table&variants[0].aircraft.airframe.polar=1+2%0d%0a0+1e999%0a%0a%23",
		"variants[0].aircraft.powerplant.kind=rubber&variants[0].aircraft.powerplant.values.propeller.kind=constant-speed",
		"display=small&day.given=temperature&day.temperature=-500+C&strips[0].name=&legs[1].strip=zz",
		"requirements[0].figure=nothing&requirements[0].limit=1e300&action=add-requirement",
		"page=requirements&action=add-preset+vla&requirements[0].figure=turn_load&requirements[0].turn_given=given&requirements[0].turn_speed=9e9&requirements[1].mass_given=given&requirements[1].mass=1e-9",
		"page=requirements&action=add-requirement+no_such&requirements[0].strip_given=named&requirements[0].strip=%00&requirements[0].clause=%ed%a0%80&requirements[1].altitude_given=altitude&requirements[1].altitude=25000",
		"requirements[0].figure=climb_rate&requirements[0].limit=0&requirements[0].bound=%3D",
		"name=+&note=" + strings.Repeat("x", 2001) + "&variants[0].id=q&format=2",
		"legs[0].name=%f0%9f%9b%a9&legs[0].time=1h&%zz=1;a=b&=&&&===",
		"action=add-leg&action=remove-leg+0&legs[0].time=1+min&legs[0].time=2+min",
		"technique.take_off_factor=0x10&strips[0].slope=1e-320&variants[0].aircraft.airframe.span=1e-9&variants[0].aircraft.weights.max_take_off=99999",
	} {
		f.Add(body, true)
		f.Add(body, false)
	}
	v := visit(f)
	f.Fuzz(func(t *testing.T, body string, swaps bool) {
		v.t, v.at = t, nil
		v.log.Reset()
		header := []string{"Content-Type", "application/x-www-form-urlencoded"}
		if swaps {
			header = append(header, "HX-Request", "true")
		}
		before := v.document(1)
		v.send("POST", "/projects/1/variants/a", strings.NewReader(body), header...)
		if v.log.Len() > 0 || v.reply.Code >= 500 {
			t.Fatalf("status %d, log %s", v.reply.Code, v.log)
		}
		if v.page != nil {
			if err := checkForm(v.reply.Body.String(), body); err != nil {
				t.Fatal(err)
			}
		}
		after := v.document(1)
		if _, err := project.Decode(after); err != nil {
			t.Fatalf("what was saved cannot be read: %v", err)
		}
		if v.reply.Code == 400 && !bytes.Equal(before, after) {
			t.Fatal("refused as a whole but saved")
		}
	})
}

// checkForm is checkPage but for wrecks that the form itself may have brought.
func checkForm(page, body string) error {
	typed, err := url.QueryUnescape(body)
	if err != nil {
		typed = body
	}
	for _, bad := range wrecks {
		if strings.Contains(typed, strings.TrimSpace(bad)) || strings.Contains(typed, "<") {
			page = strings.ReplaceAll(page, bad, "")
		}
	}
	return checkPage(page)
}
