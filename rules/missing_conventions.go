package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed missing_conventions.md
var missingConventionsPage string

var missingConventions = lint.Rule{
	Name:        "missing-conventions",
	Title:       "Conventions that cannot be found",
	Page:        missingConventionsPage,
	Severity:    finding.Error,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("missing-conventions"),
}
