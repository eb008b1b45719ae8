package engine

import (
	"sync"

	"lagwise/lint/document"
	"lagwise/lint/request"
)

// documentBytes is the largest document that is read.
const documentBytes = 64 << 20

// snapshot is one text of one document. Its tree and its typed content are
// made when first asked for, and once.
type snapshot struct {
	path, root string
	file       string // relative to the root, with /
	kind       request.Doc
	text       []byte
	err        error // why there is no text
	open       bool
	version    int32

	tree        func() *document.Tree
	lines       func() *document.Lines
	manifest    func() boundManifest
	analysis    func() boundAnalysis
	conventions func() boundConventions
}

type boundManifest struct {
	*request.Manifest
	problems []request.Problem
}

type boundAnalysis struct {
	*request.Analysis
	problems []request.Problem
}

type boundConventions struct {
	*request.Conventions
	problems []request.Problem
}

func newSnapshot(path, root, file string, text []byte, err error) *snapshot {
	s := &snapshot{path: path, root: root, file: file, kind: request.DocumentKind(path), text: text, err: err}
	if err == nil && len(text) > documentBytes {
		s.text, s.err = nil, tooLarge()
	}
	s.tree = sync.OnceValue(func() *document.Tree { return document.Parse(s.text) })
	s.lines = sync.OnceValue(func() *document.Lines { return document.NewLines(s.text) })
	s.manifest = sync.OnceValue(func() boundManifest {
		m, problems := request.BindManifest(file, s.tree())
		return boundManifest{m, problems}
	})
	s.analysis = sync.OnceValue(func() boundAnalysis {
		a, problems := request.BindAnalysis(file, s.tree())
		return boundAnalysis{a, problems}
	})
	s.conventions = sync.OnceValue(func() boundConventions {
		c, problems := request.BindConventions(file, s.tree())
		return boundConventions{c, problems}
	})
	return s
}

// bindProblems is what parsing and binding the text alone found.
func (s *snapshot) bindProblems() []request.Problem {
	switch s.kind {
	case request.ManifestDoc:
		return s.manifest().problems
	case request.AnalysisDoc:
		return s.analysis().problems
	case request.ConventionsDoc:
		return s.conventions().problems
	}
	return nil
}
