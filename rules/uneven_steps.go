package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed uneven_steps.md
var unevenStepsPage string

var unevenSteps = lint.Rule{
	Name:     "uneven-steps",
	Title:    "Differences over steps of different length",
	Page:     unevenStepsPage,
	Severity: finding.Warning,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Mendable: true,
	Run: func(q *lint.Inquiry) {
		step := ""
		for _, t := range q.Case.Req().On {
			switch t.Name {
			case request.FirstDifferences, request.SeasonalDifferences, request.Differences:
				step = t.String()
			}
		}
		frame, err := q.Case.Levels()
		if step == "" || err != nil || frame.Even {
			return
		}
		f := place(q, "on")
		f.Series = q.Case.Names()
		f.Message = fmt.Sprintf("The steps are uneven, so %s mix long steps with short ones. Rates of change divide each by its step.", step)
		q.Report(f)
	},
}
