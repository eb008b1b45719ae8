package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/finding"
	"lagwise/lint/request"
	"lagwise/lint/result"
)

//go:embed near_unit_root_errors.md
var nearUnitRootErrorsPage string

var nearUnitRootErrors = lint.Rule{
	Name:     "near-unit-root-errors",
	Title:    "GLS whose error parameter is near 1",
	Page:     nearUnitRootErrorsPage,
	Severity: finding.Warning,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Mendable: true,
	Run: func(q *lint.Inquiry) {
		r := q.Case.Req()
		if r.Kind != request.Regression || r.Estimator != "gls" {
			return
		}
		fit, err := q.Case.Fit()
		if err != nil || fit.GLS == nil {
			return
		}
		persistence, interval := fit.Persistence()
		if interval[1] < q.Case.Settings.Limit("near-unit-root", 0.98) && !fit.GLS.Boundary {
			return
		}
		f := place(q, "errors")
		f.Series = q.Case.Names()
		f.Message = fmt.Sprintf("The persistence of the errors is %s (%s to %s): near 1, first differences say the same with fewer assumptions.",
			result.Coef(persistence), result.Coef(interval[0]), result.Coef(interval[1]))
		q.Report(f)
	},
}
