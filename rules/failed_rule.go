package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed failed_rule.md
var failedRulePage string

// failedRule is told by whatever runs the rules; it stands in the catalogue
// for its page and its weight.
var failedRule = lint.Rule{
	Name:        "failed-rule",
	Title:       "A rule that broke down",
	Page:        failedRulePage,
	Severity:    finding.Error,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         func(*lint.Inquiry) {},
}
