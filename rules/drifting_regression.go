package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
	"lagwise/lint/result"
)

//go:embed drifting_regression.md
var driftingRegressionPage string

var driftingRegression = lint.Rule{
	Name:     "drifting-regression",
	Title:    "A regression of series that drift",
	Page:     driftingRegressionPage,
	Severity: finding.Error,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Mendable: true,
	Run: func(q *lint.Inquiry) {
		r := q.Case.Req()
		if r.Kind != request.Regression || differenced(q) || evidence.Prewhitens(r.On) {
			return
		}
		seen, ok := drifting(q)
		if !ok || len(seen.names) == 0 {
			return
		}
		if r.Estimator == "gls" && r.Trend && seen.trends {
			return // the trend term and the error process answer a line
		}
		f := place(q, "on")
		f.Series, f.Evidence = seen.names, seen.tests
		f.Message = driftingMessage(q, seen)
		q.Report(f)
	},
}

func driftingMessage(q *lint.Inquiry, seen driftSeen) string {
	slope := "the slope"
	if fit, err := q.Case.Fit(); err == nil && len(fit.Fit.Coefficients) > 1 {
		slope = fmt.Sprintf("a slope of %s (%s)", result.Number(fit.Fit.Coefficients[1]), result.P(fit.Fit.P[1], ""))
	}
	if seen.tooShort {
		rows, _ := q.Case.Rows()
		return fmt.Sprintf("%d values are too few to tell whether the series drift, so %s is no evidence of a relation.", rows, slope)
	}
	return fmt.Sprintf("%s %s, so %s is no evidence of a relation.", list(seen.names, "and"), agree(len(seen.names), "drifts", "drift"), slope)
}
