package handlers

import (
	"fmt"
	"net/url"
	"testing"
)

// BenchmarkEdit is one change of one field, from the request to the finished fragment, with a real database.
func BenchmarkEdit(b *testing.B) {
	v := visit(b)
	v.blind = true
	for n := 0; b.Loop(); n++ {
		v.at = nil
		v.post("/projects/1/variants/a", url.Values{"variants[0].aircraft.weights.empty": {fmt.Sprint(290 + n%20)}, "system": {"metric"}}, "HX-Request", "true")
		if v.reply.Code != 200 {
			b.Fatal(v.reply.Code, v.reply.Body)
		}
	}
	b.ReportMetric(float64(b.Elapsed().Milliseconds())/float64(b.N), "ms/edit")
}

// BenchmarkBench is one look at the whole page.
func BenchmarkBench(b *testing.B) {
	v := visit(b)
	v.blind = true
	for b.Loop() {
		v.at = nil
		v.get("/projects/1/variants/a")
		if v.reply.Code != 200 {
			b.Fatal(v.reply.Code)
		}
	}
	b.ReportMetric(float64(b.Elapsed().Milliseconds())/float64(b.N), "ms/page")
}
