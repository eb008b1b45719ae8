// Package lint holds the contract of a rule: what a rule is, and what it is
// given. A rule is a value without state; it sees the world only through its
// Inquiry: the document, the request, evidence on demand, and a way to
// report. It opens no file, knows no clock and computes no statistic, and
// that is what makes unsaved text, remembering and cancelling work.
package lint

import (
	"lagwise/lint/finding"
)

// Need says what a rule has to know before it can speak.
type Need uint8

// The needs.
const (
	Text Need = iota + 1 // the documents alone
	Data                 // the data that they name
)

// String returns the word used by `grounds`.
func (n Need) String() string {
	if n == Data {
		return "data"
	}
	return "text"
}

// Scope says what a rule is asked about, one inquiry each. A rule about data
// may be asked twice, in the manifest that names them and in each request that
// uses them: OfManifest | OfRequest.
type Scope uint8

// The scopes.
const (
	OfDocument Scope = 1 << iota // every document: its text and keys
	OfManifest                   // a manifest and the data it names
	OfRequest                    // one request of an analysis, on its data
)

// Has reports whether the rule is asked about the other scope.
func (s Scope) Has(other Scope) bool { return s&other != 0 }

// Rule is one rule of the catalogue.
type Rule struct {
	Name     string // a noun phrase with the searchable term
	Title    string // one line
	Page     string // Markdown: what, why, how, offers, deviation, references
	Severity finding.Severity
	Scope    Scope
	Need     Need
	// Mendable is whether a rewrite of the request can answer the rule.
	Mendable bool
	// NoDeviation is set where no deviation may answer the rule: unreadable
	// documents and data admit none.
	NoDeviation bool
	// Question is set where the rewrites that answer the rule change what is
	// asked, so none is ever preferred.
	Question bool
	Run      func(*Inquiry)
}
