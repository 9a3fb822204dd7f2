package handlers

import (
	"github.com/a-h/templ"

	"legwright/internal/perf/study"
	"legwright/web/views"
)

func plant(st *study.Study, f views.Frame) templ.Component {
	return views.PlantPage(views.NewPlant(st, f))
}
