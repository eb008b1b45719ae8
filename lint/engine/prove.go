package engine

import (
	"context"
	"fmt"
	"slices"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/finding"
	"lagwise/lint/procedure"
	"lagwise/lint/request"
	"lagwise/lint/result"
)

// The rules that the engine knows by name.
const (
	// shortRecord may be brought on by a rewrite that is clean all the same:
	// where only the values lost to differencing do.
	shortRecord = "short-record"
	// unacceptedMethod keeps a rewrite from being offered.
	unacceptedMethod = "unaccepted-method"
)

// proof is one candidate, computed, and what the rules say of it.
type proof struct {
	procedure.Candidate
	edits    []document.Edit
	outcomes []*result.Outcome
	findings []finding.Finding // of request scope, weighed and answered
	leaves   []string          // rules at warning or above that still speak
	clean    bool
	broken   string
	worst    finding.Severity // of the rules that a rewrite can answer; None when they are silent
}

// proveAll proves the candidates of every request, each on any worker.
func (h *hearing) proveAll(ctx context.Context) error {
	err := h.ed.engine.each(ctx, len(h.requests), func(i int) { h.requests[i].propose() })
	if err != nil {
		return err
	}
	type task struct {
		a *asking
		i int
	}
	var tasks []task
	for _, a := range h.requests {
		if a.reproven {
			continue
		}
		for i := range a.proofs {
			tasks = append(tasks, task{a, i})
		}
	}
	err = h.ed.engine.each(ctx, len(tasks), func(i int) { tasks[i].a.prove(ctx, tasks[i].i) })
	for _, a := range h.requests {
		a.conclude()
		if err == nil && ctx.Err() == nil {
			a.keepProofs()
		}
	}
	return err
}

// propose asks the procedure for candidates, when something speaks that a
// rewrite can answer and no deviation does.
func (a *asking) propose() {
	if !a.computable || a.mended() == finding.None && !a.asks() {
		return
	}
	k, known := a.fullKey()
	if before, ok := a.ed.engine.proven.get(k); known && ok {
		a.reprove(before)
		return
	}
	var candidates []procedure.Candidate
	var err error
	if cause := shielded(func() { candidates, err = a.ed.engine.candidates(a.c) }); cause != nil {
		a.broken = append(a.broken, fmt.Sprintf("the procedure on %s in %s: %v", a.asked.Name, a.file.file, cause))
		return
	}
	if err != nil {
		return // what keeps the procedure from the data keeps the rules too, and they say so
	}
	for _, c := range candidates {
		edits := request.Rewrite(a.file.tree(), a.asked, &c.Request)
		if len(edits) > 0 {
			a.proofs = append(a.proofs, &proof{Candidate: c, edits: edits})
		}
	}
}

// reprove takes over what was proven of the same text and data; only the edits
// are made anew, because the request may have moved.
func (a *asking) reprove(before []*proof) {
	a.reproven = true
	for _, p := range before {
		again := *p
		again.edits = request.Rewrite(a.file.tree(), a.asked, &p.Request)
		if len(again.edits) > 0 {
			a.proofs = append(a.proofs, &again)
		}
	}
}

// mended is the worst severity of what speaks now and a rewrite can answer.
func (a *asking) mended() finding.Severity { return a.worstMendable(a.findings) }

func (a *asking) worstMendable(findings []finding.Finding) finding.Severity {
	worst := finding.None
	for _, f := range findings {
		rule := a.ed.engine.byName[f.Rule]
		if rule != nil && rule.Mendable && !rule.Question && f.Deviation == nil && f.Severity < worst {
			worst = f.Severity
		}
	}
	return worst
}

// asks reports whether a rule speaks that only another question answers.
func (a *asking) asks() bool {
	return slices.ContainsFunc(a.findings, func(f finding.Finding) bool {
		rule := a.ed.engine.byName[f.Rule]
		return rule != nil && rule.Question && f.Deviation == nil
	})
}

// prove computes one candidate and lets the rules speak of it. A candidate
// that cannot be computed, or that the lab does not accept, keeps no outcome
// and is not offered.
func (a *asking) prove(ctx context.Context, i int) {
	p := a.proofs[i]
	c := a.c.With(p.Request)
	var outcomes []*result.Outcome
	var err error
	if cause := shielded(func() { outcomes, err = a.ed.engine.outcomes(c) }); cause != nil {
		p.broken = fmt.Sprintf("computing %q for %s in %s: %v", p.Title, a.asked.Name, a.file.file, cause)
		return
	}
	if err != nil || !computed(outcomes) {
		return
	}
	s := a.ask(ctx, lint.OfRequest, a.inquiryOf(p.Request, c), nil)
	if ctx.Err() != nil || len(s.broken) > 0 {
		return
	}
	raw := slices.Clone(s.findings)
	a.weigh(s.findings, a.own)
	left := a.leaves(s.findings)
	if slices.Contains(left, unacceptedMethod) {
		return
	}
	p.outcomes, p.findings, p.leaves = outcomes, s.findings, left
	p.clean = a.isClean(s.findings, raw)
	p.worst = a.worstMendable(s.findings)
}

func computed(outcomes []*result.Outcome) bool {
	for _, o := range outcomes {
		if o == nil || o.Error != "" {
			return false
		}
	}
	return len(outcomes) > 0
}

// leaves lists the rules at warning or above that speak, in the order of the
// catalogue.
func (a *asking) leaves(findings []finding.Finding) []string {
	left := []string{}
	for _, f := range findings {
		if f.Severity.AtLeast(finding.Warning) && f.Deviation == nil && !slices.Contains(left, f.Rule) {
			left = append(left, f.Rule)
		}
	}
	slices.SortFunc(left, func(x, y string) int { return a.ed.engine.place(x) - a.ed.engine.place(y) })
	return left
}

// isClean reports whether nothing is left to object to, except what was there
// before and no rewrite mends, and a record that only differencing made short:
// one that was long enough as written and can still be judged. raw are the
// findings before they were weighed.
func (a *asking) isClean(findings, raw []finding.Finding) bool {
	for i, f := range findings {
		if !f.Severity.AtLeast(finding.Warning) || f.Deviation != nil {
			continue
		}
		rule, before := a.ed.engine.byName[f.Rule], a.speaks(f.Rule)
		unmendable := before && rule != nil && !rule.Mendable
		shortened := f.Rule == shortRecord && !before && raw[i].Severity != finding.Error
		if !unmendable && !shortened {
			return false
		}
	}
	return true
}

// speaks reports whether a rule speaks of the request as written.
func (a *asking) speaks(rule string) bool {
	return slices.ContainsFunc(a.findings, func(f finding.Finding) bool { return f.Rule == rule })
}
