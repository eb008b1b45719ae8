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
	s := ed.snapshot(path)
	lab := ed.lab(s.path)
	var m *request.Manifest
	switch {
	case s.kind == request.ManifestDoc && s.err != nil:
		return nil, s.err
	case s.kind == request.ManifestDoc:
		m = s.manifest().Manifest
	case s.kind == request.NoDoc:
		m = bare(s.file)
	default:
		return nil, fmt.Errorf("%s has no series of its own: screen takes manifests and data files", s.file)
	}
	return result.Screen(ctx, ed.engine.store, m, ed.guard(s.root), lab.settings)
}

// bare is the manifest of a data file that has none.
func bare(file string) *request.Manifest {
	base := filepath.Base(file)
	name, _, _ := strings.Cut(base, ".")
	return &request.Manifest{File: file, Name: name, Records: []*request.Record{{Name: name, File: base, HeaderRows: 1}}}
}
