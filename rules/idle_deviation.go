package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed idle_deviation.md
var idleDeviationPage string

var idleDeviation = lint.Rule{
	Name:        "idle-deviation",
	Title:       "A deviation that answers nothing",
	Page:        idleDeviationPage,
	Severity:    finding.Information,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("idle-deviation"),
}
