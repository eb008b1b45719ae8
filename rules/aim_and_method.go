package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed aim_and_method.md
var aimAndMethodPage string

var aimAndMethod = lint.Rule{
	Name:     "aim-and-method",
	Title:    "An aim that calls for the other kind of request",
	Page:     aimAndMethodPage,
	Severity: finding.Warning,
	Scope:    lint.OfRequest,
	Need:     lint.Text,
	Question: true,
	Run:      tellAimAndMethod,
}

func tellAimAndMethod(q *lint.Inquiry) {
	r := q.Request
	var message string
	switch {
	case r.Kind == request.Correlation && (r.Aim == "effect" || r.Aim == "prediction"):
		message = fmt.Sprintf("The aim is %s, and a correlation has no direction: is a regression meant, with %s as the response?",
			withArticle(r.Aim), list(r.Between, "or"))
	case r.Kind == request.Regression && r.Aim == "association":
		message = fmt.Sprintf("The aim is an association, and a regression makes %s the response: is a correlation meant?", r.Response)
	default:
		return
	}
	q.Report(finding.Finding{At: r.Key("aim"), Series: r.Series(), Message: message})
}

func withArticle(aim string) string {
	if aim == "effect" {
		return "an effect"
	}
	return "a " + aim
}
