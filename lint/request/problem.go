package request

import "lagwise/lint/document"

// Problem is something that reading a document found, in the name of the
// rule that tells it.
type Problem struct {
	Rule    string // unreadable-document, stray-key, wrong-value, absent-field, repeated-name, …
	At      document.Span
	Message string // what is wrong and what is allowed, one or two sentences
	Detail  string
	Request string         // name of the request it concerns, or empty
	Nearest *document.Edit // replaces the wrong word by the nearest right one
	Related []RelatedPlace // e.g. the first of two equal names
}

// RelatedPlace is another place of the same or another document.
type RelatedPlace struct {
	File    string // "" is the same document
	At      document.Span
	Message string
}
