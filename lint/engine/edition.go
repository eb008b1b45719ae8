package engine

import (
	"fmt"
	"os"
	"path/filepath"
	"strings"

	"lagwise/lint/dataset"
	"lagwise/lint/document"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

// Edition is an immutable state of a workspace: open texts over the disk.
type Edition struct {
	engine  *Engine
	folders []string
	open    map[string]*snapshot
	disk    *disk
	labs    memo[*lab] // by folder
	proven  remembered[*hearing]
}

// with returns an edition in which the text lies over the file.
func (ed *Edition) with(path string, text []byte) *Edition {
	next := &Edition{engine: ed.engine, folders: ed.folders, open: map[string]*snapshot{}, disk: ed.disk}
	for p, s := range ed.open {
		next.open[p] = s
	}
	next.open[path] = next.overlaid(path, text, 0)
	return next
}

func (ed *Edition) overlaid(path string, text []byte, version int32) *snapshot {
	root := ed.Root(path)
	s := newSnapshot(path, root, ed.rel(root, path), text, nil)
	s.open, s.version = true, version
	return s
}

// snapshot returns the document as this edition has it; never nil.
func (ed *Edition) snapshot(path string) *snapshot {
	path = filepath.Clean(path)
	if s, ok := ed.open[path]; ok {
		return s
	}
	return ed.disk.files.get(path, func() *snapshot {
		root := ed.Root(path)
		file := ed.rel(root, path)
		guard := ed.guard(root)
		if root == "" { // it may be read itself, and nothing beside it
			guard = dataset.NewRoots(filepath.Dir(path), nil)
		}
		text, err := readDocument(guard, path)
		return newSnapshot(path, root, file, text, err)
	})
}

// exists reports whether a document stands at the path, open or on disk.
func (ed *Edition) exists(path string) bool {
	if _, ok := ed.open[path]; ok {
		return true
	}
	info, err := os.Stat(path)
	return err == nil && !info.IsDir()
}

// guard returns what may be read below a root.
func (ed *Edition) guard(root string) *dataset.Roots {
	return ed.disk.guards.get(root, func() *dataset.Roots {
		return dataset.NewRoots(root, ed.engine.options.DataRoots)
	})
}

// rel is how findings name a file: relative to its root, with /.
func (ed *Edition) rel(root, path string) string {
	if root == "" {
		return filepath.Base(path)
	}
	return ed.guard(root).Rel(path)
}

// Root returns the root of a document: the nearest folder at or above it that
// holds .git, else the folder of the workspace that it stands in, else its
// own; "" when only the home folder or the root of a file system is left.
func (ed *Edition) Root(path string) string {
	path = filepath.Clean(path)
	folder := filepath.Dir(path)
	return ed.disk.roots.get(folder, func() string {
		under := ""
		for _, f := range ed.folders {
			if within(f, path) && len(f) > len(under) {
				under = f
			}
		}
		if under == "" {
			under = folder
		}
		return dataset.FindRoot(path, under)
	})
}

// within reports whether a path is the folder or stands below it.
func within(folder, path string) bool {
	rel, err := filepath.Rel(folder, path)
	return err == nil && rel != ".." && !strings.HasPrefix(rel, ".."+string(filepath.Separator))
}

// Version returns the version of an open document.
func (ed *Edition) Version(path string) (int32, bool) {
	if s, ok := ed.open[filepath.Clean(path)]; ok {
		return s.version, true
	}
	return 0, false
}

// Text returns the text of a document; it must not be changed.
func (ed *Edition) Text(path string) ([]byte, error) {
	s := ed.snapshot(path)
	return s.text, s.err
}

// Tree returns the tree of a document, of the empty text when there is none.
func (ed *Edition) Tree(path string) *document.Tree { return ed.snapshot(path).tree() }

// Lines converts between bytes and positions of a document.
func (ed *Edition) Lines(path string) *document.Lines { return ed.snapshot(path).lines() }

// Analysis returns the typed analysis, nil when the path is of another kind.
func (ed *Edition) Analysis(path string) *request.Analysis {
	if s := ed.snapshot(path); s.kind == request.AnalysisDoc {
		return s.analysis().Analysis
	}
	return nil
}

// Manifest returns the typed manifest, nil when the path is of another kind.
func (ed *Edition) Manifest(path string) *request.Manifest {
	if s := ed.snapshot(path); s.kind == request.ManifestDoc {
		return s.manifest().Manifest
	}
	return nil
}

// Requests returns the requests of an analysis in their order.
func (ed *Edition) Requests(path string) []*request.Asked {
	if a := ed.Analysis(path); a != nil {
		return a.Requests
	}
	return nil
}

// HoldAt returns the severity at which a review of the document fails.
func (ed *Edition) HoldAt(path string) finding.Severity {
	if s, ok := finding.ParseSeverity(ed.lab(path).merged.Review.HoldAt); ok {
		return s
	}
	return finding.Warning
}

// asked returns one request of a document.
func (ed *Edition) asked(path string, index int) (*request.Asked, error) {
	all := ed.Requests(path)
	if index < 0 || index >= len(all) {
		return nil, fmt.Errorf("%s has no request number %d", ed.snapshot(path).file, index+1)
	}
	return all[index], nil
}
