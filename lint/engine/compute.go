package engine

import (
	"context"
	"fmt"
	"slices"

	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/result"
)

// ProveRequest returns the rewrites of one request, each proven.
func (ed *Edition) ProveRequest(ctx context.Context, path string, index int) ([]finding.Rewrite, error) {
	a, err := ed.proven(ctx, path, index)
	if err != nil {
		return nil, err
	}
	return ed.located(a.file.root, a.rewrites), nil
}

// Explain gathers all that is known of one request.
func (ed *Edition) Explain(ctx context.Context, path string, index int) (*result.Explanation, error) {
	a, err := ed.proven(ctx, path, index)
	if err != nil {
		return nil, err
	}
	if a.c == nil {
		return &result.Explanation{File: a.file.file, Request: a.asked.Name, Kind: a.asked.Kind.String(), NoPreferred: a.uncomputable()}, nil
	}
	better, p := a.recommended()
	var leaves []string
	if p != nil {
		leaves = p.leaves
	}
	var e *result.Explanation
	if cause := shielded(func() { e, err = result.Explain(a.c, better, leaves) }); cause != nil {
		return nil, a.brokeDown(cause)
	}
	if err != nil {
		return nil, err
	}
	for i := range e.Results {
		a.settle(&e.Results[i], p)
	}
	switch {
	case p != nil:
		e.Preferred = a.titleOf(p)
	case a.mended() != finding.None:
		e.NoPreferred = a.whyNone()
	}
	return e, nil
}

// Compute returns what every request of a document gives: on levels, as
// written, and as the preferred rewrite would have it. A request that cannot
// be computed has outcomes whose Error says why.
func (ed *Edition) Compute(ctx context.Context, path string) ([]result.Computed, error) {
	h, err := ed.heard(ctx, path, -1)
	if err != nil {
		return nil, err
	}
	each := make([][]result.Computed, len(h.requests))
	failures := make([]error, len(h.requests))
	err = ed.engine.each(ctx, len(h.requests), func(i int) { each[i], failures[i] = h.requests[i].compute() })
	for _, failure := range failures {
		if err == nil {
			err = failure
		}
	}
	return slices.Concat(each...), err
}

func (a *asking) compute() ([]result.Computed, error) {
	if a.c == nil {
		return a.notComputed(), nil
	}
	better, p := a.recommended()
	var all []result.Computed
	var err error
	if cause := shielded(func() { all, err = result.Compare(a.c, better) }); cause != nil {
		return nil, a.brokeDown(cause)
	}
	for i := range all {
		a.settle(&all[i], p)
	}
	return all, err
}

func (a *asking) brokeDown(cause any) error {
	return fmt.Errorf("computing %s in %s broke down: %v; please report it with the documents", a.asked.Name, a.file.file, cause)
}

// settle takes the recommendation away where something asks for a rewrite and
// none is preferred.
func (a *asking) settle(c *result.Computed, p *proof) {
	if p == nil && a.mended() != finding.None {
		c.Recommended = nil
	}
}

// recommended is the case of the preferred rewrite, nil when there is none.
func (a *asking) recommended() (*evidence.Case, *proof) {
	if p := a.preferred(); p != nil {
		return a.c.With(p.Request), p
	}
	return nil, nil
}

// notComputed says of every pair why it has no result.
func (a *asking) notComputed() []result.Computed {
	why := func() *result.Outcome { return &result.Outcome{Error: a.uncomputable()} }
	one := result.Computed{File: a.file.file, Request: a.asked.Name, Kind: a.asked.Kind.String()}
	var all []result.Computed
	for _, pair := range a.asked.Pairs() {
		c := one
		c.Pair, c.OnLevels, c.AsWritten = &pair, why(), why()
		all = append(all, c)
	}
	if len(all) == 0 {
		one.OnLevels, one.AsWritten = why(), why()
		all = append(all, one)
	}
	return all
}

// uncomputable says why a request is not computed: the first error about it.
func (a *asking) uncomputable() string {
	if a.why != "" {
		return a.why
	}
	return "The request cannot be computed: not all of its series were found."
}

// proven hears one request of a document and proves its candidates.
func (ed *Edition) proven(ctx context.Context, path string, index int) (*asking, error) {
	if _, err := ed.asked(path, index); err != nil {
		return nil, err
	}
	h, err := ed.heard(ctx, path, index)
	if err != nil {
		return nil, err
	}
	return h.requests[0], nil
}

// heard makes the judgement of all requests of a document, or of one.
func (ed *Edition) heard(ctx context.Context, path string, only int) (*hearing, error) {
	if err := ctx.Err(); err != nil {
		return nil, err
	}
	r, err := ed.read(ctx, path, withProofs)
	if err != nil {
		return nil, err
	}
	h := newHearing(r)
	h.only = only
	return h, h.run(ctx, withProofs)
}
