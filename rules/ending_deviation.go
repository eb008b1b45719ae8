package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed ending_deviation.md
var endingDeviationPage string

var endingDeviation = lint.Rule{
	Name:        "ending-deviation",
	Title:       "A deviation that ends within thirty days",
	Page:        endingDeviationPage,
	Severity:    finding.Information,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("ending-deviation"),
}
