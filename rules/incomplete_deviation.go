package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed incomplete_deviation.md
var incompleteDeviationPage string

var incompleteDeviation = lint.Rule{
	Name:        "incomplete-deviation",
	Title:       "A deviation without what the lab asks for",
	Page:        incompleteDeviationPage,
	Severity:    finding.Warning,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("incomplete-deviation"),
}
