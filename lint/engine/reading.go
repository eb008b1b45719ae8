package engine

import (
	"context"
	"fmt"
	"slices"

	"lagwise/lint"
	"lagwise/lint/dataset"
	"lagwise/lint/evidence"
	"lagwise/lint/request"
)

// depth is how far an answer may go.
type depth uint8

const (
	textOnly   depth = iota // the documents, and what is remembered of the data
	withData                // every rule speaks
	withProofs              // and every candidate is proven
)

// reading is what is known of one document before any rule has spoken.
type reading struct {
	ed       *Edition
	file     *snapshot
	lab      *lab
	problems []request.Problem
	requests []bound // of an analysis
	whole    bool    // all series of all manifests are known
	around   string  // digest of the documents that bear on every request
	devs     []*deviation
	glance   *evidence.Glance // at the data, the same for all requests
}

// read binds a document to its surroundings. The error is that of a document
// that cannot be read; one that is too large is a problem, told as a finding.
func (ed *Edition) read(ctx context.Context, path string, d depth) (*reading, error) {
	if request.DocumentKind(path) == request.NoDoc {
		return nil, noDocument(path)
	}
	if err := ed.givenConventions(); err != nil {
		return nil, err
	}
	s := ed.snapshot(path)
	r := &reading{ed: ed, file: s, lab: ed.lab(s.path), glance: evidence.NewGlance()}
	if s.err != nil {
		if !isTooLarge(s.err) {
			return nil, s.err
		}
		r.problems = []request.Problem{{Rule: string(dataset.ReachedLimit), Message: fmt.Sprintf(
			"%s is larger than the %d MB that a document may have. Split it into several documents, and keep data in data files.",
			s.file, documentBytes>>20)}}
		return r, nil
	}
	r.problems = slices.Clone(s.bindProblems())
	switch s.kind {
	case request.AnalysisDoc:
		r.bindRequests(ctx, d)
	case request.ConventionsDoc:
		r.problems = append(r.problems, ed.conventionsProblems(s)...)
	}
	r.devs = s.deviations()
	for _, d := range r.devs {
		r.problems = append(r.problems, r.deviationProblems(d)...)
	}
	return r, nil
}

func (r *reading) bindRequests(ctx context.Context, d depth) {
	sources, problems := r.ed.sources(ctx, r.file, d)
	texts := []string{r.lab.digest}
	for _, src := range sources {
		texts = append(texts, src.file.path, string(src.file.text))
	}
	sum := digest(texts...)
	r.around = string(sum[:])
	r.problems = append(r.problems, problems...)
	binder := newBinder(sources, len(problems) > 0)
	r.whole = binder.whole
	for _, asked := range r.file.analysis().Requests {
		b, problems := binder.bind(asked)
		r.requests = append(r.requests, b)
		r.problems = append(r.problems, problems...)
	}
}

// inquiry is what every rule about this document is given.
func (r *reading) inquiry() lint.Inquiry {
	return lint.Inquiry{File: r.file.file, Tree: r.file.tree(), Conventions: r.lab.merged}
}

// countSeries counts the series that the document is about.
func (r *reading) countSeries() int {
	if r.file.kind == request.ManifestDoc {
		return len(r.file.manifest().Series)
	}
	seen := map[string]bool{}
	for _, b := range r.requests {
		for _, name := range b.asked.Series() {
			seen[name] = true
		}
	}
	return len(seen)
}

// idle lists the declared series of the manifest that no analysis below its
// root uses; none when there is no analysis at all.
func (r *reading) idle(ctx context.Context) []string {
	if r.file.root == "" {
		return nil
	}
	found := map[string]bool{}
	r.ed.walk(ctx, r.file.root, found)
	used, analyses := map[string]bool{}, 0
	for path := range found {
		if request.DocumentKind(path) == request.AnalysisDoc {
			analyses++
			r.usedBy(r.ed.snapshot(path), used)
		}
	}
	if analyses == 0 {
		return nil
	}
	m := r.file.manifest()
	var idle []string
	for _, s := range m.Series {
		if !used[s.Name] && !used[m.Name+":"+s.Name] {
			idle = append(idle, s.Name)
		}
	}
	return idle
}

// usedBy adds the names of the series that an analysis takes from this
// manifest.
func (r *reading) usedBy(s *snapshot, used map[string]bool) {
	if s.err != nil || !r.ed.takes(s, r.file.path) {
		return
	}
	for _, asked := range s.analysis().Requests {
		for _, name := range asked.Series() {
			used[name] = true
		}
	}
}

// takes reports whether an analysis takes a manifest.
func (ed *Edition) takes(analysis *snapshot, manifest string) bool {
	if analysis.analysis().Manifests == nil {
		return slices.Contains(ed.nearestManifests(analysis), manifest)
	}
	return slices.ContainsFunc(analysis.analysis().Manifests, func(written string) bool {
		path, err := ed.resolve(analysis, written)
		return err == nil && path == manifest
	})
}
