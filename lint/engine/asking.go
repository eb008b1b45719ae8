package engine

import (
	"context"
	"encoding/hex"
	"slices"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

// asking is the judgement of one request.
type asking struct {
	*reading
	bound
	c        *evidence.Case // while the rules speak
	why      string         // it cannot be computed
	own      []*deviation   // of this request
	said                    // weighed, and answered by deviations
	rewrites []finding.Rewrite
	proofs   []*proof
	reproven bool // the proofs are those of an earlier edition
	complete bool
	// computable is whether the text says which series to compute from what.
	computable bool
}

// asking prepares the judgement of one request. A request with an error in
// its own text, or with a series that is not found, is not computed: the
// error is told, and nothing that would follow from it.
func (h *hearing) asking(ctx context.Context, i int, d depth) *asking {
	a := &asking{reading: h.reading, bound: h.reading.requests[i], complete: true}
	for _, d := range h.devs {
		if d.index == i {
			a.own = append(a.own, d)
		}
	}
	for _, f := range h.document.findings {
		if a.why == "" && f.Severity == finding.Error && f.Rule != failedRule && a.concerns(f) {
			a.why = f.Message
		}
	}
	if !a.ready {
		a.complete = d != textOnly || h.whole
		return a
	}
	if a.why == "" {
		a.computable = true
		a.c = a.newCase(ctx)
	}
	return a
}

func (a *asking) newCase(ctx context.Context) *evidence.Case {
	return a.ed.engine.store.Case(ctx, evidence.Bound{Asked: a.asked, Series: a.series,
		Roots: a.ed.guard(a.file.root), Settings: a.lab.settings, Glance: a.glance})
}

// concerns reports whether a finding of the document lies in the text of the
// request, its deviations apart.
func (a *asking) concerns(f finding.Finding) bool {
	if f.At.Empty() || !inside(a.asked.At, f.At) {
		return f.Request != "" && f.Request == a.asked.Name && f.File == a.file.file
	}
	return !slices.ContainsFunc(a.deviationSpans(), func(d document.Span) bool { return inside(d, f.At) })
}

func (a *asking) deviationSpans() []document.Span {
	var all []document.Span
	for _, d := range a.asked.Deviations {
		all = append(all, d.At)
	}
	return all
}

// hear asks the rules about the request.
func (a *asking) hear(ctx context.Context) {
	if !a.computable {
		return
	}
	k, known := a.fullKey()
	if before, ok := a.ed.engine.heard.get(k); known && ok {
		a.replay(before)
		a.ed.engine.spoken.put(a.textKey(), before)
		return
	}
	a.said = a.ask(ctx, lint.OfRequest, a.inquiryOf(a.asked.Request, a.c), nil)
	now := spoken{a.clone(), a.asked.At.Start, a.compareData()}
	if ctx.Err() == nil {
		a.ed.engine.spoken.put(a.textKey(), now)
		if known && len(a.broken) == 0 {
			a.ed.engine.heard.put(k, now)
		}
	}
	a.weigh(a.findings, a.own)
}

// fullKey digests everything that bears on what the rules say of the request:
// its text and documents, and the data as they are on disk now. It is unknown
// while the data cannot be read.
func (a *asking) fullKey() (key, bool) {
	data, err := a.c.DataDigest()
	whole := a.textKey()
	text := string(whole[:])
	return digest(text, string(data[:])), err == nil
}

// compareData marks the deviations that were given for other data, and
// returns the digests that no longer hold.
func (a *asking) compareData() []string {
	var changed []string
	for _, d := range a.own {
		if d.Data == "" {
			continue
		}
		frame, err := a.c.Used()
		if err == nil && d.Data != "sha256:"+hex.EncodeToString(frame.Digest[:]) {
			d.changed = true
			changed = append(changed, d.Data)
		}
	}
	return changed
}

// weigh gives every finding its weight and lets deviations answer.
func (r *reading) weigh(findings []finding.Finding, devs []*deviation) {
	for i := range findings {
		f := &findings[i]
		f.Severity = weighted(r.lab.merged, f.Rule, f.Severity)
		r.answer(f, devs)
	}
}

// inquiryOf is what the rules of request scope are given about the request as
// written, or about a candidate in its place.
func (a *asking) inquiryOf(r request.Request, c *evidence.Case) lint.Inquiry {
	asked := *a.asked
	asked.Request = r
	q := a.inquiry()
	q.Request, q.Case = &asked, c
	return q
}
