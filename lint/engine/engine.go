package engine

import (
	"runtime"

	"lagwise/lint"
	"lagwise/lint/dataset"
	"lagwise/lint/evidence"
	"lagwise/lint/procedure"
	"lagwise/lint/request"
	"lagwise/lint/result"
)

// evidenceBytes bounds the evidence that is remembered.
const evidenceBytes = 256 << 20

// Options is what a driver decides. The zero value reviews with no rules.
type Options struct {
	Rules       []lint.Rule
	Workers     int            // 0: one a processor
	OnDate      string         // YYYY-MM-DD, the day deviations are judged on; "": none has ended
	DataRoots   []string       // folders outside the root that data may stand in
	Conventions string         // replaces the search for conventions
	Limits      dataset.Limits // zero: the defaults
	Version     string
}

// Engine is what all workspaces of one process share: the rules, and what is
// remembered.
type Engine struct {
	options Options
	rules   []*lint.Rule // in the order of the catalogue
	byName  map[string]*lint.Rule
	data    *dataset.Store
	store   *evidence.Store
	slots   chan struct{} // one for each inquiry that may run at a time

	// What the procedure proposes and what a request gives; tests put their
	// own in the place.
	candidates func(*evidence.Case) ([]procedure.Candidate, error)
	outcomes   func(*evidence.Case) ([]*result.Outcome, error)

	headers remembered[[]*request.Series]
	spoken  remembered[spoken]   // by text: what is known at once
	heard   remembered[spoken]   // by text and data: what need not be asked again
	proven  remembered[[]*proof] // by text and data: what need not be proven again
}

// New returns an engine.
func New(o Options) *Engine {
	if o.Workers <= 0 {
		o.Workers = runtime.GOMAXPROCS(0)
	}
	if o.Limits == (dataset.Limits{}) {
		o.Limits = dataset.DefaultLimits()
	}
	e := &Engine{options: o, byName: map[string]*lint.Rule{}, slots: make(chan struct{}, o.Workers),
		candidates: procedure.Candidates, outcomes: result.Outcomes}
	for _, r := range o.Rules {
		rule := r
		e.rules = append(e.rules, &rule)
		e.byName[r.Name] = &rule
	}
	e.data = dataset.NewStore(o.Limits)
	e.store = evidence.NewStore(e.data, evidenceBytes)
	return e
}

// Options returns what the engine was made with, defaults filled in.
func (e *Engine) Options() Options { return e.options }
