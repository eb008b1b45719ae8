package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed ended_deviation.md
var endedDeviationPage string

var endedDeviation = lint.Rule{
	Name:        "ended-deviation",
	Title:       "A deviation that has ended",
	Page:        endedDeviationPage,
	Severity:    finding.Error,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("ended-deviation"),
}
