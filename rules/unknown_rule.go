package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed unknown_rule.md
var unknownRulePage string

var unknownRule = lint.Rule{
	Name:        "unknown-rule",
	Title:       "A rule name that the catalogue does not hold",
	Page:        unknownRulePage,
	Severity:    finding.Error,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("unknown-rule"),
}
