package project

import (
	"encoding/json"
	"reflect"
)

// Format is the number of the document format that this program writes.
const Format = 2

// firstFormat is the oldest format that Decode reads.
const firstFormat = 1

// added lists the fields that format 1 did not have, by path without indices, each with
// the JSON value that stands for what a document of that format meant.
var added = map[string]string{
	"requirements.altitude_given": `"strip"`, "requirements.altitude": `0`,
	"requirements.day_given": `"project"`, "requirements.isa_deviation": `0`,
	"requirements.mass_given": `"as-flown"`, "requirements.mass": `600`,
	"requirements.configuration": `"clean"`,
	"requirements.strip_given":   `"mission"`, "requirements.strip": `""`,
	"requirements.distance": `"unfactored"`, "requirements.airspeed": `"true"`,
	"requirements.turn_given": `"best"`, "requirements.turn_speed": `35`,
	"requirements.power": `0.75`, "requirements.climb_to": `3000`, "requirements.kept": `0`,
	"requirements.clause": `""`, "requirements.note": `""`,
	"variants.aircraft.airframe.drag_area":            "0",
	"variants.aircraft.airframe.glide_ratio":          "0",
	"variants.aircraft.airframe.glide_speed":          "0",
	"variants.aircraft.airframe.glide_mass":           "0",
	"variants.aircraft.airframe.leakage":              "0",
	"variants.aircraft.airframe.unlisted":             "0",
	"variants.aircraft.airframe.friction_tas":         "0",
	"variants.aircraft.airframe.friction_alt":         "0",
	"variants.aircraft.airframe.components":           "[]",
	"variants.aircraft.airframe.clean.lift_given":     `"cl-max"`,
	"variants.aircraft.airframe.clean.stall_speed":    "0",
	"variants.aircraft.airframe.clean.stall_mass":     "0",
	"variants.aircraft.airframe.take_off.lift_given":  `"cl-max"`,
	"variants.aircraft.airframe.take_off.stall_speed": "0",
	"variants.aircraft.airframe.take_off.stall_mass":  "0",
	"variants.aircraft.airframe.landing.lift_given":   `"cl-max"`,
	"variants.aircraft.airframe.landing.stall_speed":  "0",
	"variants.aircraft.airframe.landing.stall_mass":   "0",
	"variants.aircraft.limits": `{"rule": "none", "factors_given": "rule", "positive": 3.8, "negative": -1.5, "negative_dive": 0, "speeds_given": "rule", "cruise": 60, "dive": 84,
		"gust_cruise": 15.24, "gust_dive": 7.62, "negative_cl": -0.8, "chord_given": "area", "chord": 1.3, "slope_given": "estimate", "slope": 5}`,
	"legs.turns": "1", "legs.heading": "3.141592653589793", "legs.bank": "0.5235987755982988", "legs.load_factor": "2", "legs.payload": "10", "legs.share": "0.05",

	"variants.aircraft.weights.growth":                    `0`,
	"variants.aircraft.weights.zero_fuel_given":           `"none"`,
	"variants.aircraft.weights.max_zero_fuel":             `0`,
	"variants.aircraft.powerplant.values.fuel.kind":       `"own"`,
	"variants.aircraft.powerplant.values.fuel.fuel_given": `"volume"`,
	"variants.aircraft.powerplant.values.fuel.mass":       `0`,
}

// formatOf is the number of the format that the document states, 0 where it states none that Decode reads.
func (t jsonText) formatOf() int {
	if t.first(t.whole()) != '{' {
		return 0
	}
	members, _ := t.members(t.whole(), maxItems)
	for _, m := range members {
		if m.key != "format" || !numeric(t.first(m.span)) {
			continue
		}
		for n := firstFormat; n <= Format; n++ {
			if x, ok := t.number(m.span); ok && x == float64(n) {
				return n
			}
		}
	}
	return 0
}

// adopt gives a field that an older document could not have the value that it meant.
func (d *decoder) adopt(f *node, dst reflect.Value) bool {
	if d.format == 0 || d.format == Format || f.adopted == "" {
		return false
	}
	if err := json.Unmarshal([]byte(f.adopted), dst.Addr().Interface()); err != nil {
		panic("project: the value for older documents of " + f.name + ": " + err.Error())
	}
	return true
}
