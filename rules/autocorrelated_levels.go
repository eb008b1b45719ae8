package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed autocorrelated_levels.md
var autocorrelatedLevelsPage string

var autocorrelatedLevels = lint.Rule{
	Name:     "autocorrelated-levels",
	Title:    "A correlation of values that resemble their neighbours",
	Page:     autocorrelatedLevelsPage,
	Severity: finding.Warning,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Mendable: true,
	Run: func(q *lint.Inquiry) {
		r := q.Case.Req()
		_, tail := evidence.SplitOn(r.On)
		if r.Kind != request.Correlation || r.Inference != "usual" || len(tail) > 0 || drifts(q) || seasonal(q) {
			return
		}
		reportDependence(q, "Neighbouring values resemble each other")
	},
}
