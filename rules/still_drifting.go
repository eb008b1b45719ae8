package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
)

//go:embed still_drifting.md
var stillDriftingPage string

var stillDrifting = lint.Rule{
	Name:     "still-drifting",
	Title:    "Differences that still drift",
	Page:     stillDriftingPage,
	Severity: finding.Error,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Mendable: true,
	Run: func(q *lint.Inquiry) {
		if !differenced(q) {
			return
		}
		f := place(q, "on")
		for i, name := range q.Case.Names() {
			p, err := q.Case.UsedProfile(i)
			if err != nil {
				return
			}
			if p.Verdict == evidence.DifferenceStationary {
				f.Series = append(f.Series, name)
				f.Evidence = append(f.Evidence, shown(name, p.Tests)...)
			}
		}
		if len(f.Series) == 0 {
			return
		}
		f.Message = fmt.Sprintf("The differences of %s still drift, so what is related is drift once more. A second difference asks whether the changes of pace go together.", list(f.Series, "and"))
		q.Report(f)
	},
}
