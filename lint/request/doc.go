// Package request holds the documents' one schema, and the typed manifests,
// analyses and conventions that a tree of TOML text is bound to.
//
// Binding is tolerant: it never fails. What is wrong is returned as problems,
// each in the name of the rule that tells it and at the tightest place; a
// value that is wrong costs only itself, its default stands, and the rest is
// bound. Every key is checked against Schema, which also feeds completion,
// hover and the reference pages. Rewrite goes the other way: from a typed
// request to the fewest edits of the text that say the same.
package request

import "strings"

// Doc is a kind of document.
type Doc uint8

// The kinds of document.
const (
	NoDoc Doc = iota
	ManifestDoc
	AnalysisDoc
	ConventionsDoc
)

// String returns the schema's name of the document's root table.
func (d Doc) String() string {
	switch d {
	case ManifestDoc:
		return "manifest"
	case AnalysisDoc:
		return "analysis"
	case ConventionsDoc:
		return "conventions"
	}
	return ""
}

var docSuffixes = []struct {
	suffix string
	doc    Doc
}{
	{".series.toml", ManifestDoc},
	{".analysis.toml", AnalysisDoc},
	{".conventions.toml", ConventionsDoc},
}

// DocumentKind returns the kind of the document at a path (either slash), by
// the ending of its name; NoDoc for any other file. A name that is nothing
// but the ending (".series.toml") is a hidden file, not a document.
func DocumentKind(path string) Doc {
	base := path[strings.LastIndexAny(path, `/\`)+1:]
	for _, d := range docSuffixes {
		if len(base) > len(d.suffix) && strings.HasSuffix(base, d.suffix) {
			return d.doc
		}
	}
	return NoDoc
}

// documentName returns NAME of NAME.series.toml.
func documentName(path string) string {
	base := path[strings.LastIndexAny(path, `/\`)+1:]
	for _, d := range docSuffixes {
		if name, ok := strings.CutSuffix(base, d.suffix); ok {
			return name
		}
	}
	return base
}
