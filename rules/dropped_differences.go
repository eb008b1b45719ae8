package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed dropped_differences.md
var droppedDifferencesPage string

var droppedDifferences = lint.Rule{
	Name:     "dropped-differences",
	Title:    "Differences that a gap costs",
	Page:     droppedDifferencesPage,
	Severity: finding.Information,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Run: func(q *lint.Inquiry) {
		if !differenced(q) {
			return
		}
		before, err := q.Case.Base()
		if err != nil {
			return
		}
		after, err := q.Case.Used()
		gaps := len(before.Runs) - 1
		if err != nil || gaps < 1 {
			return
		}
		f := place(q, "on")
		f.Series = q.Case.Names()
		f.Message = fmt.Sprintf("%s in the record: no difference is taken across one, so %d values give %d.",
			count(gaps, "gap stands", "gaps stand"), len(before.Positions), len(after.Positions))
		q.Report(f)
	},
}
