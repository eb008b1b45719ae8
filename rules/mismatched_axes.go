package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
)

//go:embed mismatched_axes.md
var mismatchedAxesPage string

var mismatchedAxes = lint.Rule{
	Name:        "mismatched-axes",
	Title:       "Series whose axes do not meet",
	Page:        mismatchedAxesPage,
	Severity:    finding.Error,
	Scope:       lint.OfRequest,
	Need:        lint.Data,
	Mendable:    true,
	NoDeviation: true,
	Run: func(q *lint.Inquiry) {
		_, err := q.Case.Levels()
		m, mismatched := evidence.IsMismatch(err)
		if !mismatched {
			return
		}
		f := finding.Finding{At: subject(q.Request), Message: m.Message}
		for _, name := range []string{m.A, m.B} {
			if name != "" {
				f.Series = append(f.Series, name)
			}
		}
		q.Report(f)
	},
}
