package engine

import (
	"fmt"
	"slices"
	"strings"

	"lagwise/lint/finding"
	"lagwise/lint/request"
)

// conclude makes the proven candidates rewrites: in their order, at most one
// of them preferred.
func (a *asking) conclude() {
	for _, p := range a.proofs {
		if p.broken != "" {
			a.broken = append(a.broken, p.broken)
		}
	}
	a.proofs = slices.DeleteFunc(a.proofs, func(p *proof) bool { return p.outcomes == nil })
	preferred := a.preferred()
	for _, p := range a.proofs {
		a.rewrites = append(a.rewrites, a.rewrite(p, p == preferred))
	}
}

// keepProofs remembers the proofs for the next edition; those of a request of
// which something broke down are made again.
func (a *asking) keepProofs() {
	if !a.computable || a.reproven || len(a.broken) > 0 {
		return
	}
	if k, known := a.fullKey(); known {
		a.ed.engine.proven.put(k, a.proofs)
	}
}

// preferred is the first clean proof; if none is clean, the first that lowers
// the worst of what a rewrite can answer; nil when none does, or when nothing
// asks for a rewrite. A rewrite that asks another question is never preferred.
func (a *asking) preferred() *proof {
	now := a.mended()
	if now == finding.None {
		return nil
	}
	for _, p := range a.proofs {
		if p.clean && !p.Question && a.helps(p) {
			return p
		}
	}
	for _, p := range a.proofs {
		if p.worst > now && !p.Question {
			return p
		}
	}
	return nil
}

// helps reports whether a proof answers any finding of the request.
func (a *asking) helps(p *proof) bool {
	return slices.ContainsFunc(a.findings, func(f finding.Finding) bool { return a.answersFinding(p, f) })
}

// answersFinding reports whether the rule no longer speaks after a rewrite.
func (a *asking) answersFinding(p *proof, f finding.Finding) bool {
	rule := a.ed.engine.byName[f.Rule]
	if rule == nil || !rule.Mendable && !p.Question || f.Deviation != nil {
		return false
	}
	return !slices.ContainsFunc(p.findings, func(g finding.Finding) bool { return g.Rule == f.Rule })
}

func (a *asking) rewrite(p *proof, preferred bool) finding.Rewrite {
	r := finding.Rewrite{Title: a.titleOf(p), Preferred: preferred, Question: p.Question, Leaves: p.leaves}
	first := p.outcomes[0]
	r.Gives = finding.Gives{Estimate: first.Estimate, P: first.P, N: first.N}
	for _, e := range p.edits {
		r.Edits = append(r.Edits, finding.Edit{File: a.file.file, At: e.At, Text: e.Text})
	}
	return r
}

// titleOf says what a rewrite does, what it gives and what remains.
func (a *asking) titleOf(p *proof) string {
	title := p.Title
	if !onlyWords(request.Changed(&a.asked.Request, &p.Request)) || p.Request.Kind != a.asked.Kind {
		if n := len(p.outcomes); n > 1 {
			title += fmt.Sprintf(", for all %d pairs", n)
		}
		title += ": " + gives(p.outcomes[0])
		if n := len(p.outcomes); n > 1 {
			pair := p.Request.Pairs()[0]
			title += fmt.Sprintf(" for %s and %s", pair[0], pair[1])
		}
	}
	if len(p.leaves) > 0 && !p.clean {
		title += "; leaves " + strings.Join(p.leaves, ", ")
	}
	return title
}

// onlyWords reports whether a change bears on no number.
func onlyWords(changed []string) bool {
	return len(changed) > 0 && !slices.ContainsFunc(changed, func(key string) bool { return key != "aim" })
}

// attached returns the findings of the request, each with the rewrites that
// answer it.
func (a *asking) attached() []finding.Finding {
	all := slices.Clone(a.findings)
	unanswered := len(a.proofs) > 0 && a.preferred() == nil && a.mended() != finding.None
	for i := range all {
		f := &all[i]
		for k, p := range a.proofs {
			if a.answersFinding(p, *f) {
				f.Rewrites = append(slices.Clip(f.Rewrites), a.rewrites[k])
			}
		}
		rule := a.ed.engine.byName[f.Rule]
		if unanswered && rule != nil && rule.Mendable && f.Deviation == nil {
			f.Detail = strings.TrimSpace(f.Detail + " " + a.whyNone())
		}
	}
	return all
}

// whyNone says why no rewrite is preferred.
func (a *asking) whyNone() string {
	if len(a.proofs) == 0 {
		return "No rewrite could be computed on these data."
	}
	best := a.proofs[0]
	for _, p := range a.proofs {
		if !p.Question && p.worst > best.worst {
			best = p
		}
	}
	if len(best.leaves) == 0 {
		return "No rewrite is preferred: each of them asks another question."
	}
	return fmt.Sprintf("No rewrite is preferred: the best of %d still leaves %s.", len(a.proofs), strings.Join(best.leaves, ", "))
}
