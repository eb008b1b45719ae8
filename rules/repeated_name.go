package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed repeated_name.md
var repeatedNamePage string

var repeatedName = lint.Rule{
	Name:        "repeated-name",
	Title:       "A name that stands twice",
	Page:        repeatedNamePage,
	Severity:    finding.Error,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("repeated-name"),
}
