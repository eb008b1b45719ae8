package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed reached_limit.md
var reachedLimitPage string

var reachedLimit = lint.Rule{
	Name:        "reached-limit",
	Title:       "A limit of the tool that a document or its data exceed",
	Page:        reachedLimitPage,
	Severity:    finding.Error,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("reached-limit"),
}
