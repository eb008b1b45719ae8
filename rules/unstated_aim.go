package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed unstated_aim.md
var unstatedAimPage string

var unstatedAim = lint.Rule{
	Name:     "unstated-aim",
	Title:    "A request that does not say what it aims at",
	Page:     unstatedAimPage,
	Severity: finding.Information,
	Scope:    lint.OfRequest,
	Need:     lint.Text,
	Question: true,
	Run: func(q *lint.Inquiry) {
		if q.Request.Aim != "" || written(q.Request, "aim") || asksForRequest(q.Conventions, "aim") {
			return // a wrong or an asked-for aim is told by another rule
		}
		q.Report(finding.Finding{At: q.Request.Header, Message: aimQuestion(q.Request.Kind)})
	},
}

func aimQuestion(kind request.Kind) string {
	const question = "No aim is stated: association, effect or prediction? "
	if kind == request.Regression {
		return question + "A regression answers for an effect or a prediction; a mutual association asks for a correlation."
	}
	return question + "A correlation answers for an association; an effect or a prediction asks for a regression."
}
