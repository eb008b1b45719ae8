package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed circular_conventions.md
var circularConventionsPage string

var circularConventions = lint.Rule{
	Name:        "circular-conventions",
	Title:       "Conventions that build on themselves",
	Page:        circularConventionsPage,
	Severity:    finding.Error,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("circular-conventions"),
}
