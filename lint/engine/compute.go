package engine

import (
	"context"
	"fmt"
	"path/filepath"
	"slices"
	"strconv"

	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/result"
)

// ProveRequest returns the rewrites of one request, each proven.
func (ed *Edition) ProveRequest(ctx context.Context, path string, index int) ([]finding.Rewrite, error) {
	a, err := ed.request(ctx, path, index)
	if err != nil {
		return nil, err
	}
	return ed.located(a.file.root, a.rewrites), nil
}

// Explain gathers all that is known of one request.
func (ed *Edition) Explain(ctx context.Context, path string, index int) (*result.Explanation, error) {
	a, err := ed.request(ctx, path, index)
	if err != nil {
		return nil, err
	}
	if !a.computable {
		return &result.Explanation{File: a.file.file, Request: a.asked.Name, Kind: a.asked.Kind.String(), NoPreferred: a.uncomputable()}, nil
	}
	c, p := a.newCase(ctx), a.preferred()
	var leaves []string
	if p != nil {
		leaves = p.leaves
	}
	var e *result.Explanation
	if cause := shielded(func() { e, err = result.Explain(c, p.in(c), leaves) }); cause != nil {
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
	h, err := ed.heard(ctx, path, everyRequest, withProofs)
	if err != nil {
		return nil, err
	}
	each := make([][]result.Computed, len(h.requests))
	failures := make([]error, len(h.requests))
	err = ed.engine.each(ctx, len(h.requests), func(i int) { each[i], failures[i] = h.requests[i].compute(ctx) })
	for _, failure := range failures {
		if err == nil {
			err = failure
		}
	}
	return slices.Concat(each...), err
}

func (a *asking) compute(ctx context.Context) ([]result.Computed, error) {
	if !a.computable {
		return a.notComputed(), nil
	}
	c, p := a.newCase(ctx), a.preferred()
	var both []result.Computed
	var err error
	if cause := shielded(func() { both, err = result.Compare(c, p.in(c)) }); cause != nil {
		return nil, a.brokeDown(cause)
	}
	for i := range both {
		a.settle(&both[i], p)
	}
	return both, err
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

// in is the case of a proof beside the one as written; nil when there is none.
func (p *proof) in(c *evidence.Case) *evidence.Case {
	if p == nil {
		return nil
	}
	return c.With(p.Request)
}

// notComputed says of every pair why it has no result.
func (a *asking) notComputed() []result.Computed {
	why := func() *result.Outcome { return &result.Outcome{Error: a.uncomputable()} }
	one := result.Computed{File: a.file.file, Request: a.asked.Name, Kind: a.asked.Kind.String()}
	var pairs []result.Computed
	for _, pair := range a.asked.Pairs() {
		c := one
		c.Pair, c.OnLevels, c.AsWritten = &pair, why(), why()
		pairs = append(pairs, c)
	}
	if len(pairs) > 0 {
		return pairs
	}
	one.OnLevels, one.AsWritten = why(), why()
	return []result.Computed{one}
}

// uncomputable says why a request is not computed: the first error about it.
func (a *asking) uncomputable() string {
	if a.why != "" {
		return a.why
	}
	return "The request cannot be computed: not all of its series were found."
}

// request returns the proven judgement of one request of a document.
func (ed *Edition) request(ctx context.Context, path string, index int) (*asking, error) {
	if _, err := ed.asked(path, index); err != nil {
		return nil, err
	}
	if h, kept := ed.proven.get(digest(filepath.Clean(path), strconv.Itoa(everyRequest))); kept {
		return h.requests[index], nil
	}
	h, err := ed.heard(ctx, path, index, withProofs)
	if err != nil {
		return nil, err
	}
	return h.requests[0], nil
}
