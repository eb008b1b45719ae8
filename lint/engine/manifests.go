package engine

import (
	"context"
	"errors"
	"fmt"
	"path/filepath"

	"lagwise/lint/document"
	"lagwise/lint/request"
)

// source is one manifest as an analysis uses it.
type source struct {
	file     *snapshot
	manifest *request.Manifest
	series   []*request.Series
	// whole is false when the series are not all known: the manifest does
	// not parse, or its data, which name them, could not be read.
	whole bool
}

// sources returns the manifests of an analysis: those it lists, else those in
// its folder, else those in the nearest folder above that has some. The
// problems say which cannot be had.
func (ed *Edition) sources(ctx context.Context, s *snapshot, d depth) ([]source, []request.Problem) {
	a := s.analysis()
	if a.Manifests == nil {
		return ed.foundSources(ctx, s, d)
	}
	var all []source
	var problems []request.Problem
	for i, written := range a.Manifests {
		path, err := ed.resolve(s, written)
		if err == nil && request.DocumentKind(path) == request.ManifestDoc && ed.exists(path) {
			all = append(all, ed.source(ctx, ed.snapshot(path), d))
			continue
		}
		at := document.Span{}
		if i < len(a.Places) {
			at = a.Places[i]
		}
		problems = append(problems, request.Problem{Rule: "missing-manifest", At: at, Message: noManifest(written, err)})
	}
	return all, problems
}

func noManifest(written string, err error) string {
	switch {
	case err != nil:
		return fmt.Sprintf("The manifest cannot be taken: %s", sentence(err.Error()))
	case request.DocumentKind(written) != request.ManifestDoc:
		return fmt.Sprintf("%q is no manifest: manifests are named NAME.series.toml.", written)
	}
	return fmt.Sprintf("There is no manifest at %q, seen from the folder of this analysis. Correct the path, or write it: [record.NAME] with file = \"…\" is enough to begin.", written)
}

func (ed *Edition) foundSources(ctx context.Context, s *snapshot, d depth) ([]source, []request.Problem) {
	var all []source
	for _, path := range ed.nearestManifests(s) {
		all = append(all, ed.source(ctx, ed.snapshot(path), d))
	}
	if len(all) > 0 || len(s.analysis().Requests) == 0 {
		return all, nil
	}
	return nil, []request.Problem{{Rule: "missing-manifest", At: s.analysis().Requests[0].Header,
		Message: "There is no manifest in the folder of this analysis, or in any above it below the root. Write one, NAME.series.toml with [record.NAME] and file = \"…\", or name one in `manifests`."}}
}

// nearestManifests returns the manifests of the nearest folder that has some.
func (ed *Edition) nearestManifests(s *snapshot) []string {
	for _, folder := range upward(filepath.Dir(s.path), s.root) {
		if found := ed.documentsIn(folder, request.ManifestDoc); len(found) > 0 {
			return found
		}
	}
	return nil
}

// source reads one manifest. Without [series.…] every numeric column of its
// data is a series, so the data are read.
func (ed *Edition) source(ctx context.Context, s *snapshot, d depth) source {
	m := s.manifest()
	src := source{file: s, manifest: m.Manifest, series: m.Series, whole: s.err == nil && s.tree().Valid()}
	if len(m.Series) > 0 || s.err != nil {
		return src
	}
	for _, r := range m.Records {
		implied, err := ed.implied(ctx, s, r, d)
		src.series = append(src.series, implied...)
		src.whole = src.whole && err == nil
	}
	return src
}

// implied makes a series of every numeric column of a record that is neither
// its axis nor its groups.
func (ed *Edition) implied(ctx context.Context, s *snapshot, r *request.Record, d depth) ([]*request.Series, error) {
	key := digest(s.path, string(s.text), r.Name)
	if d == textOnly {
		series, known := ed.engine.headers.get(key)
		if !known {
			return nil, errUnread
		}
		return series, nil
	}
	record, err := ed.engine.data.Record(ctx, ed.guard(s.root), filepath.Dir(s.path), r)
	if err != nil {
		return nil, err
	}
	var all []*request.Series
	for _, c := range record.Columns {
		axis := record.Axis != nil && c.Name == record.Axis.Column
		if c.Numeric && !axis && c.Name != r.Group {
			all = append(all, r.Implicit(c.Name))
		}
	}
	ed.engine.headers.put(key, all)
	return all, nil
}

// errUnread says that data were not read because nothing may be computed.
var errUnread = errors.New("the data were not read yet")

func (s source) folder() string { return filepath.Dir(s.file.path) }
