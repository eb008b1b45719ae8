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

//go:embed leftover_autocorrelation.md
var leftoverAutocorrelationPage string

var leftoverAutocorrelation = lint.Rule{
	Name:     "leftover-autocorrelation",
	Title:    "Autocorrelation that the request leaves and does not count",
	Page:     leftoverAutocorrelationPage,
	Severity: finding.Warning,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Mendable: true,
	Run: func(q *lint.Inquiry) {
		r := q.Case.Req()
		_, tail := evidence.SplitOn(r.On)
		switch {
		case drifts(q):
		case r.Kind == request.Correlation && r.Inference == "usual" && len(tail) > 0:
			reportDependence(q, afterWords(r.On)+" still carry autocorrelation")
		case r.Kind == request.Regression && r.StandardErrors == "usual" && (len(tail) > 0 || r.Estimator == "gls"):
			reportResiduals(q)
		}
	},
}

// afterWords names the values after the transforms, to begin a sentence.
func afterWords(on []request.Transform) string {
	switch {
	case evidence.Prewhitens(on):
		return "The prewhitened values"
	case evidence.Differences(on):
		return "The differences"
	}
	return "The transformed values"
}

// reportResiduals speaks of a fit whose residuals carry autocorrelation.
func reportResiduals(q *lint.Inquiry) {
	fit, err := q.Case.Fit()
	if err != nil || !fit.Autocorrelated {
		return
	}
	f := place(q, "errors")
	f.Series = q.Case.Names()
	if g := fit.Godfrey; g != nil {
		order := g.DF
		f.Evidence = append(f.Evidence, finding.Evidence{About: "residuals", Test: "Breusch-Godfrey", Null: "no autocorrelation",
			Lags: &order, Statistic: &g.Statistic, P: &g.P, N: fit.Fit.N})
		f.Message = fmt.Sprintf("The residuals carry autocorrelation (Breusch-Godfrey, order %d: %s), so the usual standard errors do not hold.", order, result.P(g.P, ""))
	} else if l := fit.LjungBox; l != nil {
		lags := l.Lags
		f.Evidence = append(f.Evidence, finding.Evidence{About: "normalized residuals", Test: "Ljung-Box", Null: "no autocorrelation",
			Lags: &lags, Statistic: &l.Statistic, P: &l.P, N: l.N})
		f.Message = fmt.Sprintf("The normalized residuals still carry autocorrelation (Ljung-Box, %d lags: %s): %s errors do not describe them.", lags, result.P(l.P, ""), q.Case.Req().Errors)
	}
	q.Report(f)
}
