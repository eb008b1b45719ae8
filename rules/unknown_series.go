package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed unknown_series.md
var unknownSeriesPage string

var unknownSeries = lint.Rule{
	Name:        "unknown-series",
	Title:       "A series that no manifest declares",
	Page:        unknownSeriesPage,
	Severity:    finding.Error,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("unknown-series"),
}
