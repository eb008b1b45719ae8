package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/finding"
	"lagwise/lint/result"
)

//go:embed over_differencing.md
var overDifferencingPage string

var overDifferencing = lint.Rule{
	Name:     "over-differencing",
	Title:    "Differences of series that held a level or a line",
	Page:     overDifferencingPage,
	Severity: finding.Warning,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Mendable: true,
	Run: func(q *lint.Inquiry) {
		if !differenced(q) || q.Case.Settings.AlwaysDifference {
			return
		}
		f := place(q, "on")
		var lag float64
		for i, name := range q.Case.Names() {
			p, err := q.Case.BaseProfile(i)
			if err != nil || p.Verdict.Walks() {
				return // one that walks has to be differenced, and all are treated alike
			}
			if p.Overdifferenced() {
				if len(f.Series) == 0 {
					lag = p.Differenced.R
				}
				f.Series = append(f.Series, name)
				f.Evidence = append(f.Evidence, shown(name, p.Tests)...)
			}
		}
		if len(f.Series) == 0 {
			return
		}
		f.Message = fmt.Sprintf("%s held a level or a line before differencing, and the differences of %s have a lag-1 autocorrelation of %s: differencing adds noise here and costs power.",
			list(f.Series, "and"), f.Series[0], result.Coef(lag))
		q.Report(f)
	},
}
