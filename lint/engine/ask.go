package engine

import (
	"context"
	"errors"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
)

// said is what some rules said of one inquiry.
type said struct {
	findings []finding.Finding
	broken   []string // rules that broke down, and on what
}

func (s *said) add(o said) {
	s.findings = append(s.findings, o.findings...)
	s.broken = append(s.broken, o.broken...)
}

// ask puts one inquiry to every rule of a scope that wants to know it, in the
// order of the catalogue. Rules that are weighted none are not asked.
func (r *reading) ask(ctx context.Context, scope lint.Scope, template lint.Inquiry, wanted func(*lint.Rule) bool) said {
	var all said
	for _, rule := range r.ed.engine.rules {
		if !rule.Scope.Has(scope) || wanted != nil && !wanted(rule) || ctx.Err() != nil {
			continue
		}
		if weighted(r.lab.merged, rule.Name, rule.Severity) != finding.None {
			all.add(askOne(ctx, rule, template))
		}
	}
	return all
}

// askOne runs one rule. What breaks down in it is told in its place, and what
// it had said until then is dropped: half an answer is none.
func askOne(ctx context.Context, rule *lint.Rule, template lint.Inquiry) (s said) {
	q := template
	q.Rule = rule
	defer func() {
		if cause := recover(); cause != nil {
			s = brokenDown(&q, fmt.Sprint(cause))
		}
	}()
	rule.Run(&q)
	if err := q.Failure(); err != nil && ctx.Err() == nil {
		var broken *evidence.Broken
		if errors.As(err, &broken) {
			return brokenDown(&q, fmt.Sprint(broken.Cause))
		}
		return brokenDown(&q, err.Error())
	}
	return said{findings: q.Findings()}
}

// brokenDown words that a rule could not finish.
func brokenDown(q *lint.Inquiry, cause string) said {
	f := finding.Finding{Rule: failedRule, Severity: finding.Error, File: q.File}
	on := q.File
	if q.Request != nil {
		f.At, f.Request = q.Request.Header, q.Request.Name
		on = q.Request.Name
	}
	if q.Manifest != nil && len(q.Manifest.Records) > 0 {
		f.At = q.Manifest.Records[0].Header
	}
	f.Message = fmt.Sprintf("The rule %s broke down on %s (%s): what it would say is not known. Please report it with the documents.", q.Rule.Name, on, cause)
	return said{findings: []finding.Finding{f}, broken: []string{fmt.Sprintf("%s on %s in %s: %s", q.Rule.Name, on, q.File, cause)}}
}

// inside reports whether one span lies in another.
func inside(outer, inner document.Span) bool {
	return outer.Start <= inner.Start && inner.End <= outer.End
}
