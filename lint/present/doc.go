// Package present renders values of finding, result and evidence: text for a
// terminal, JSON, CSV and Markdown for other programs, the hover for editors.
//
// It decides nothing and computes nothing. Text that comes out of documents
// and data is data in every rendering: control and bidirectional characters
// are shown by their number, long names are cut, Markdown is escaped.
package present
