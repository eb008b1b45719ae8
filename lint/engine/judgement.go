package engine

import (
	"cmp"
	"context"
	"slices"
	"strings"

	"lagwise/lint"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

// Judgement is everything that is said of one document.
type Judgement struct {
	Path     string
	File     string // relative to the root, with /
	Root     string
	Findings []finding.Finding // ordered: place, rule
	// Complete is whether every rule has spoken; Proved whether every
	// candidate was proven as well.
	Complete, Proved bool
	Broken           []string // rules that broke down, and on what
	Requests, Series int
}

// Known returns what is known without computing anything: the findings of the
// text, and those about the data that an earlier judgement of the same text
// of a request made. Places are those of this edition.
func (ed *Edition) Known(path string) *Judgement {
	j, err := ed.judge(context.Background(), path, textOnly)
	if err != nil {
		s := ed.snapshot(path)
		return &Judgement{Path: s.path, File: s.file, Root: s.root}
	}
	return j
}

// Judge lets every rule speak. The error is that of the context, or of a
// document that cannot be read.
func (ed *Edition) Judge(ctx context.Context, path string) (*Judgement, error) {
	return ed.judge(ctx, path, withData)
}

// Prove lets every rule speak, and computes every candidate rewrite.
func (ed *Edition) Prove(ctx context.Context, path string) (*Judgement, error) {
	return ed.judge(ctx, path, withProofs)
}

func (ed *Edition) judge(ctx context.Context, path string, d depth) (*Judgement, error) {
	if err := ctx.Err(); err != nil {
		return nil, err
	}
	r, err := ed.read(ctx, path, d)
	if err != nil {
		return nil, err
	}
	h := newHearing(r)
	if err := h.run(ctx, d); err != nil {
		return nil, err
	}
	s := r.file
	j := &Judgement{Path: s.path, File: s.file, Root: s.root, Findings: h.findings(), Broken: h.broken(),
		Complete: h.complete, Proved: h.complete && d == withProofs, Requests: len(r.requests), Series: r.countSeries()}
	ed.finish(j)
	return j, nil
}

// hearing is one judgement while it is made.
type hearing struct {
	*reading
	document said
	manifest said
	requests []*asking
	only     int // the one request that is asked about; -1: all
	complete bool
}

func newHearing(r *reading) *hearing { return &hearing{reading: r, only: -1, complete: true} }

// run asks the rules: of the document first, because what makes a request
// unreadable keeps the statistical rules off it.
func (h *hearing) run(ctx context.Context, d depth) error {
	q := h.inquiry()
	q.Problems = h.problems
	if h.file.kind == request.ManifestDoc {
		q.Manifest = h.file.manifest().Manifest
	}
	h.document = h.ask(ctx, lint.OfDocument, q, nil)
	if h.file.kind == request.ManifestDoc && h.file.err == nil {
		h.hearManifest(ctx, d)
	}
	for i := range h.reading.requests {
		if h.only >= 0 && i != h.only {
			continue
		}
		h.requests = append(h.requests, h.asking(ctx, i, d))
	}
	err := h.ed.engine.each(ctx, len(h.requests), func(i int) { h.requests[i].hear(ctx, d) })
	if err == nil && d == withProofs {
		err = h.proveAll(ctx)
	}
	for _, a := range h.requests {
		h.complete = h.complete && a.complete
	}
	if h.complete && err == nil && h.only < 0 {
		h.document.add(h.idleDeviations(ctx))
	}
	return err
}

// hearManifest asks the rules about the data of a manifest, or remembers what
// they said.
func (h *hearing) hearManifest(ctx context.Context, d depth) {
	k := digest("manifest", h.file.path, string(h.file.text), h.lab.digest)
	if d == textOnly {
		before, known := h.ed.engine.spoken.get(k)
		h.manifest, h.complete = before.said, known
		return
	}
	q := h.inquiry()
	q.Manifest = h.file.manifest().Manifest
	q.Reads = h.ed.engine.store.Reads(ctx, q.Manifest, h.ed.guard(h.file.root))
	q.Idle = h.idle(ctx)
	h.manifest = h.ask(ctx, lint.OfManifest, q, nil)
	if ctx.Err() == nil {
		h.ed.engine.spoken.put(k, spoken{said: h.manifest})
	}
}

// findings gathers what was said, weighs it and lets the deviations answer.
func (h *hearing) findings() []finding.Finding {
	all := slices.Concat(h.document.findings, h.manifest.findings)
	h.weigh(all)
	for _, a := range h.requests {
		all = append(all, a.attached()...)
	}
	return slices.DeleteFunc(all, func(f finding.Finding) bool { return f.Severity == finding.None })
}

// answer lets the first deviation that speaks of a finding answer it.
func (r *reading) answer(f *finding.Finding) {
	for _, d := range r.deviations() {
		if r.takesEffect(d) && d.answers(f) {
			f.Deviation = d.Deviation
			return
		}
	}
}

func (h *hearing) broken() []string {
	all := slices.Concat(h.document.broken, h.manifest.broken)
	for _, a := range h.requests {
		all = append(all, a.broken...)
	}
	return all
}

// idleDeviations tells which deviations answer nothing now that every rule
// has spoken.
func (h *hearing) idleDeviations(ctx context.Context) said {
	used := map[*request.Deviation]bool{}
	for _, f := range h.findings() {
		used[f.Deviation] = true
	}
	q := h.inquiry()
	for _, d := range h.deviations() {
		if h.takesEffect(d) && !used[d.Deviation] {
			q.Problems = append(q.Problems, request.Problem{Rule: "idle-deviation", At: d.place("from"), Request: d.request,
				Message: "This deviation answers nothing: " + d.From + " does not speak here. Take it out."})
		}
	}
	return h.ask(ctx, lint.OfDocument, q, func(r *lint.Rule) bool { return r.Name == "idle-deviation" })
}

// order puts findings in their stated order: place, rule; then whatever makes
// it the same on every run.
func order(a, b finding.Finding) int {
	return cmp.Or(
		cmp.Compare(a.At.Start, b.At.Start), cmp.Compare(a.At.End, b.At.End), strings.Compare(a.Rule, b.Rule),
		strings.Compare(a.Request, b.Request), slices.Compare(a.Series, b.Series), strings.Compare(a.Message, b.Message))
}
