package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed one_sided_drift.md
var oneSidedDriftPage string

var oneSidedDrift = lint.Rule{
	Name:     "one-sided-drift",
	Title:    "A correlation in which one series drifts",
	Page:     oneSidedDriftPage,
	Severity: finding.Warning,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Mendable: true,
	Run: func(q *lint.Inquiry) {
		if q.Case.Req().Kind != request.Correlation || differenced(q) {
			return
		}
		seen, ok := drifting(q)
		if !ok || len(seen.names) != 1 {
			return
		}
		pairs, columns := pairsWith(q, func(i, j int) bool { return seen.columns[i] || seen.columns[j] })
		f := place(q, "on")
		f.Pairs, f.Series, f.Evidence = pairs, seen.names, seen.tests
		if len(pairs) == 0 {
			f.Message = fmt.Sprintf("%s, which is controlled for, drifts and the others do not: the usual p-value does not hold.", seen.names[0])
		} else {
			f.Message = fmt.Sprintf("%s drifts, so the usual p-value of %s does not hold.", seen.names[0], coefficient(q, columns[0]))
		}
		q.Report(f)
	},
}
