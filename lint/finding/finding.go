// Package finding holds what a rule says about a document: values only, no
// rendering.
package finding

import (
	"lagwise/lint/document"
	"lagwise/lint/request"
)

// Severity is how much a finding weighs. The zero value is invalid.
type Severity uint8

// The severities, heaviest first. None turns a rule off.
const (
	Unset Severity = iota
	Error
	Warning
	Information
	Hint
	None
)

// Finding is one thing that one rule says about one request, series or
// document.
type Finding struct {
	Rule     string
	Severity Severity
	File     string         // relative to the root, with /
	At       document.Span  // tight: the word that is wrong
	Range    document.Range // At in lines and UTF-16 characters; filled by the engine
	Request  string         // name of the request, or empty
	Pairs    [][2]string    // the pairs concerned, in the order of between
	Series   []string       // the series concerned
	Message  string         // one or two sentences with their number
	Detail   string         // more, for the hover
	Evidence []Evidence
	Rewrites []Rewrite
	Related  []Related
	// Deviation answers this finding; it is listed and does not hold.
	Deviation   *request.Deviation
	Fingerprint string // digest of rule, file, request and series; filled by the engine
}

// Evidence is one test that a finding rests on. Pointers are nil where the
// test has no such number.
type Evidence struct {
	About     string   `json:"about"`
	Test      string   `json:"test"`
	Null      string   `json:"null"`
	Terms     string   `json:"terms,omitempty"`
	Lags      *int     `json:"lags,omitempty"`
	Bandwidth *int     `json:"bandwidth,omitempty"`
	Statistic *float64 `json:"statistic"`
	P         *float64 `json:"p"`
	PBound    *string  `json:"p-bound"` // "at-most", "at-least" or nil
	N         int      `json:"n"`
}

// Rewrite is a change of one request that was computed before it is offered.
type Rewrite struct {
	Title     string
	Preferred bool
	Question  bool     // it changes the question that is asked; never preferred
	Leaves    []string // rules at warning or above that would still speak
	Gives     Gives
	Edits     []Edit
}

// Gives is what the rewritten request yields.
type Gives struct {
	Estimate *float64 `json:"estimate"`
	P        *float64 `json:"p"`
	N        int      `json:"n"`
}

// Edit is one text edit of a rewrite.
type Edit struct {
	File  string
	At    document.Span
	Range document.Range
	Text  string
}

// Related is another place that a finding speaks of.
type Related struct {
	File    string
	At      document.Span
	Range   document.Range
	Message string
}
