package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
)

//go:embed outside_root.md
var outsideRootPage string

var outsideRoot = lint.Rule{
	Name:        "outside-root",
	Title:       "A data file outside the root",
	Page:        outsideRootPage,
	Severity:    finding.Error,
	Scope:       lint.OfManifest,
	Need:        lint.Data,
	NoDeviation: true,
	Run:         fromTrouble(evidence.OutsideRoot),
}
