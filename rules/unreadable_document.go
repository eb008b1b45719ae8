package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed unreadable_document.md
var unreadableDocumentPage string

var unreadableDocument = lint.Rule{
	Name:        "unreadable-document",
	Title:       "A document that is not valid TOML",
	Page:        unreadableDocumentPage,
	Severity:    finding.Error,
	Scope:       lint.OfDocument,
	Need:        lint.Text,
	NoDeviation: true,
	Run:         fromProblems("unreadable-document"),
}
