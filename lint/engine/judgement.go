package engine

import (
	"cmp"
	"context"
	"fmt"
	"path/filepath"
	"slices"
	"strconv"
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
	h, err := ed.heard(ctx, path, everyRequest, d)
	if err != nil {
		return nil, err
	}
	s := h.file
	j := &Judgement{Path: s.path, File: s.file, Root: s.root, Findings: h.findings(), Broken: h.broken(),
		Complete: h.complete, Proved: h.complete && d == withProofs, Requests: len(h.reading.requests), Series: h.countSeries()}
	ed.finish(j)
	return j, nil
}

// everyRequest asks about every request of a document.
const everyRequest = -1

// heard lets the rules speak of all requests of a document, or of one. What
// was proven of an edition is kept with it.
func (ed *Edition) heard(ctx context.Context, path string, only int, d depth) (*hearing, error) {
	if err := ctx.Err(); err != nil {
		return nil, err
	}
	k := digest(filepath.Clean(path), strconv.Itoa(only))
	if h, kept := ed.proven.get(k); kept && d == withProofs {
		return h, nil
	}
	r, err := ed.read(ctx, path, d)
	if err != nil {
		return nil, err
	}
	h := &hearing{reading: r, only: only, complete: true}
	if err := h.run(ctx, d); err != nil {
		return nil, err
	}
	if d == withProofs && len(h.broken()) == 0 {
		ed.proven.put(k, h)
	}
	return h, nil
}

// hearing is one judgement while it is made.
type hearing struct {
	*reading
	document said
	manifest said
	requests []*asking
	only     int // the one request that is asked about, or everyRequest
	complete bool
}

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
		if h.only != everyRequest && i != h.only {
			continue
		}
		h.requests = append(h.requests, h.asking(ctx, i, d))
	}
	err := h.hearRequests(ctx, d)
	if err == nil && d == withProofs {
		err = h.proveAll(ctx)
	}
	if err == nil && h.complete && h.only == everyRequest {
		h.document.add(h.lateDeviations(ctx))
	}
	for _, a := range h.requests {
		a.c = nil // a kept hearing must not keep the data
	}
	return err
}

// hearRequests asks the rules of every request; what is only remembered waits
// for no worker.
func (h *hearing) hearRequests(ctx context.Context, d depth) error {
	var err error
	if d == textOnly {
		for _, a := range h.requests {
			a.recall()
		}
	} else {
		err = h.ed.engine.each(ctx, len(h.requests), func(i int) { h.requests[i].hear(ctx) })
	}
	for _, a := range h.requests {
		h.complete = h.complete && a.complete
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
	q.Idle = h.idle(ctx)
	if cause := shielded(func() { q.Reads = h.ed.engine.store.Reads(ctx, q.Manifest, h.ed.guard(h.file.root)) }); cause != nil {
		q.Rule = &lint.Rule{Name: "unreadable-record"}
		h.manifest = brokenDown(&q, fmt.Sprint(cause))
		return
	}
	h.manifest = h.ask(ctx, lint.OfManifest, q, nil)
	if ctx.Err() == nil {
		h.ed.engine.spoken.put(k, spoken{said: h.manifest})
	}
}

// findings gathers what was said, weighs it and lets the deviations answer.
func (h *hearing) findings() []finding.Finding {
	said := slices.Concat(h.document.findings, h.manifest.findings)
	h.weigh(said, h.devs)
	for _, a := range h.requests {
		said = append(said, a.attached()...)
	}
	return slices.DeleteFunc(said, func(f finding.Finding) bool { return f.Severity == finding.None })
}

func (h *hearing) broken() []string {
	broken := slices.Concat(h.document.broken, h.manifest.broken)
	for _, a := range h.requests {
		broken = append(broken, a.broken...)
	}
	return broken
}

// lateDeviations tells of the deviations what only the data show: those given
// for data that have changed since, and those that answer nothing now that
// every rule has spoken.
func (h *hearing) lateDeviations(ctx context.Context) said {
	used := map[*request.Deviation]bool{}
	for _, f := range h.findings() {
		used[f.Deviation] = true
	}
	q := h.inquiry()
	late := func(d *deviation, rule, message string) {
		q.Problems = append(q.Problems, request.Problem{Rule: rule, At: d.place("from"), Request: d.request, Message: message})
	}
	for _, d := range h.devs {
		switch {
		case d.changed:
			late(d, endedDeviation, "This deviation was given for other data: they have changed since. Renew it for the present data, or answer the finding.")
		case h.takesEffect(d) && !used[d.Deviation]:
			late(d, idleDeviation, "This deviation answers nothing: "+d.From+" does not speak here. Take it out.")
		}
	}
	return h.ask(ctx, lint.OfDocument, q, func(r *lint.Rule) bool { return r.Name == endedDeviation || r.Name == idleDeviation })
}

// order puts findings in their stated order: place, rule; then whatever makes
// it the same on every run.
func order(a, b finding.Finding) int {
	return cmp.Or(
		cmp.Compare(a.At.Start, b.At.Start), cmp.Compare(a.At.End, b.At.End), strings.Compare(a.Rule, b.Rule),
		strings.Compare(a.Request, b.Request), slices.Compare(a.Series, b.Series), strings.Compare(a.Message, b.Message))
}
