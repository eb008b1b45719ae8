package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed shared_drift.md
var sharedDriftPage string

var sharedDrift = lint.Rule{
	Name:     "shared-drift",
	Title:    "A correlation of series that drift",
	Page:     sharedDriftPage,
	Severity: finding.Error,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Mendable: true,
	Run: func(q *lint.Inquiry) {
		if q.Case.Req().Kind != request.Correlation || differenced(q) {
			return
		}
		seen, ok := drifting(q)
		if !ok || len(seen.names) < 2 {
			return
		}
		pairs, columns := pairsWith(q, func(i, j int) bool { return seen.columns[i] && seen.columns[j] })
		if len(pairs) == 0 { // a controlled series drifts with one of the pair
			pairs, columns = pairsWith(q, func(i, j int) bool { return seen.columns[i] || seen.columns[j] })
		}
		f := place(q, "on")
		f.Pairs, f.Series, f.Evidence = pairs, seen.names, seen.tests
		f.Message = sharedDriftMessage(q, seen, pairs, columns)
		q.Report(f)
	},
}

func sharedDriftMessage(q *lint.Inquiry, seen driftSeen, pairs [][2]string, columns [][2]int) string {
	if len(pairs) == 0 {
		return fmt.Sprintf("%s drift, so what the correlation controls for is drift as well.", list(seen.names, "and"))
	}
	r := coefficient(q, columns[0])
	if seen.tooShort {
		rows, _ := q.Case.Rows()
		return fmt.Sprintf("%d values are too few to tell whether the series drift, so %s is no evidence that they change together.", rows, r)
	}
	if len(pairs) == 1 && len(seen.names) == 2 && seen.columns[columns[0][0]] && seen.columns[columns[0][1]] {
		return fmt.Sprintf("Both series drift, so %s is no evidence that they change together.", r)
	}
	if len(pairs) == 1 {
		return fmt.Sprintf("%s drift, so %s is no evidence that %s change together.", list(seen.names, "and"), r, pairWords(pairs))
	}
	return fmt.Sprintf("%s drift, so their correlations (%s: %s) are no evidence that they change together.", few(seen.names), pairWords(pairs[:1]), r)
}
