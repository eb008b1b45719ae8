package engine

import (
	"context"
	"path/filepath"
	"slices"

	"lagwise/lint/request"
)

// Reaches lists the absolute paths that a document depends on, itself
// included, sorted: manifests, data files, conventions; those that are missing
// too. Manifests and conventions that could come or go in the folders above are
// not listed; DependsOn counts them.
func (ed *Edition) Reaches(path string) []string {
	s := ed.snapshot(path)
	all := append([]string{s.path}, ed.lab(s.path).reaches...)
	all = append(all, ed.basesOf(s)...)
	switch s.kind {
	case request.ManifestDoc:
		all = append(all, ed.filesOf(s)...)
	case request.AnalysisDoc:
		for _, written := range s.analysis().Manifests {
			if p, err := ed.resolve(s, written); err == nil {
				all = append(all, p)
			}
		}
		sources, _ := ed.sources(context.Background(), s, textOnly)
		for _, src := range sources {
			all = append(append(all, src.file.path), ed.filesOf(src.file)...)
		}
	}
	slices.Sort(all)
	return slices.Compact(all)
}

// filesOf lists the data files of a manifest.
func (ed *Edition) filesOf(s *snapshot) []string {
	var all []string
	for _, rec := range s.manifest().Records {
		if p, err := ed.resolve(s, rec.File); err == nil {
			all = append(all, p)
		}
	}
	return all
}

// basesOf lists what conventions build on, there or not.
func (ed *Edition) basesOf(s *snapshot) []string {
	if s.kind != request.ConventionsDoc {
		return nil
	}
	var all []string
	for _, written := range s.conventions().BuildsOn {
		all = append(all, filepath.Join(filepath.Dir(s.path), filepath.FromSlash(written)))
	}
	return all
}

// DependsOn reports whether a change of any of the paths may change what is
// said of a document: what it reaches, and manifests and conventions that come
// or go in its folder or above it.
func (ed *Edition) DependsOn(path string, changed ...string) bool {
	s := ed.snapshot(path)
	reaches := ed.Reaches(path)
	folders := upward(filepath.Dir(s.path), s.root)
	for _, c := range clean(changed) {
		kind := request.DocumentKind(c)
		found := kind == request.ConventionsDoc || kind == request.ManifestDoc && s.kind == request.AnalysisDoc
		if slices.Contains(reaches, c) || found && slices.Contains(folders, filepath.Dir(c)) {
			return true
		}
	}
	return false
}
