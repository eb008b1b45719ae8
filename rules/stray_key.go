package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed stray_key.md
var strayKeyPage string

var strayKey = lint.Rule{
	Name:     "stray-key",
	Title:    "A key that the schema does not know",
	Page:     strayKeyPage,
	Severity: finding.Warning,
	Scope:    lint.OfDocument,
	Need:     lint.Text,
	Run:      fromProblems("stray-key"),
}
