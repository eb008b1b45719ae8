package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed ambiguous_series.md
var ambiguousSeriesPage string

var ambiguousSeries = lint.Rule{
	Name:        "ambiguous-series",
	Title:       "A series name that fits two manifests",
	Page:        ambiguousSeriesPage,
	Severity:    finding.Error,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("ambiguous-series"),
}
