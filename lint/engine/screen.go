package engine

import (
	"context"
	"fmt"
	"path/filepath"
	"strings"

	"lagwise/lint/request"
	"lagwise/lint/result"
)

// Screen says what is known of every series of a manifest, or of a bare data
// file, of which every numeric column is a series.
func (ed *Edition) Screen(ctx context.Context, path string) ([]result.Screened, error) {
	path = filepath.Clean(path)
	root := ed.Root(path)
	var m *request.Manifest
	switch request.DocumentKind(path) {
	case request.ManifestDoc:
		s := ed.snapshot(path)
		if s.err != nil {
			return nil, s.err
		}
		m = s.manifest().Manifest
	case request.NoDoc:
		m = bare(ed.rel(root, path))
	default:
		return nil, fmt.Errorf("%s has no series of its own: screen takes manifests and data files", path)
	}
	var all []result.Screened
	var err error
	if cause := shielded(func() { all, err = result.Screen(ctx, ed.engine.store, m, ed.guard(root), ed.lab(path).settings) }); cause != nil {
		return nil, fmt.Errorf("screening %s broke down: %v; please report it with the documents", m.File, cause)
	}
	return all, err
}

// bare is the manifest of a data file that has none.
func bare(file string) *request.Manifest {
	base := filepath.Base(file)
	name, _, _ := strings.Cut(base, ".")
	return &request.Manifest{File: file, Name: name, Records: []*request.Record{{Name: name, File: base, HeaderRows: 1}}}
}
