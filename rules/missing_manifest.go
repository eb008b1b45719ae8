package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed missing_manifest.md
var missingManifestPage string

var missingManifest = lint.Rule{
	Name:        "missing-manifest",
	Title:       "A manifest that cannot be found",
	Page:        missingManifestPage,
	Severity:    finding.Error,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("missing-manifest"),
}
