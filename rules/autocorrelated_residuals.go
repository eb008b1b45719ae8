package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed autocorrelated_residuals.md
var autocorrelatedResidualsPage string

var autocorrelatedResiduals = lint.Rule{
	Name:     "autocorrelated-residuals",
	Title:    "A regression with usual errors and autocorrelated residuals",
	Page:     autocorrelatedResidualsPage,
	Severity: finding.Warning,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Mendable: true,
	Run: func(q *lint.Inquiry) {
		r := q.Case.Req()
		_, tail := evidence.SplitOn(r.On)
		if r.Kind == request.Regression && r.Estimator == "ols" && r.StandardErrors == "usual" && len(tail) == 0 && !drifts(q) {
			reportResiduals(q)
		}
	},
}
