package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed wrong_value.md
var wrongValuePage string

var wrongValue = lint.Rule{
	Name:        "wrong-value",
	Title:       "A value that its key does not allow",
	Page:        wrongValuePage,
	Severity:    finding.Error,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("wrong-value"),
}
