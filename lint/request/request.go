package request

import "lagwise/lint/document"

// Kind is what a request asks for.
type Kind uint8

// The kinds of request.
const (
	Correlation Kind = iota + 1
	Regression
)

// String returns the kind's table name in documents.
func (k Kind) String() string {
	if k == Regression {
		return "regression"
	}
	return "correlation"
}

// Request is one analysis request as a plain value, defaults filled in: what
// is asked, not where it stands. A candidate rewrite is a Request too.
type Request struct {
	Kind      Kind
	Name      string
	Question  string
	Aim       string // association, effect, prediction; "" unstated
	Expected  string // positive, negative, open; "" unstated
	Planned   *bool  // nil unstated
	TimeScale string

	// Of a correlation.
	Between     []string
	Given       []string
	RemoveFrom  string // both, first, second
	Coefficient string // pearson, spearman, kendall
	Inference   string // usual, effective-n, surrogates, modified-t
	Replicates  int

	// Of a regression.
	Response       string
	Predictors     []Predictor
	Estimator      string // ols, gls
	Errors         string // independent, ar(1), …
	Likelihood     string // reml, ml
	StandardErrors string // usual, effective-n, hac
	Trend          bool
	SeasonalTerms  bool
	Form           string // static, dynamic, error-correction

	// Of both.
	On         []Transform            // empty: levels
	OnEach     map[string][]Transform // taken before those of On
	Lag        int
	Lags       *LagWindow
	Every      string
	Aggregate  string // "": by support
	LeastShare float64
	YearStarts string // MM-DD
	Tolerance  string
	Grid       *Grid
	From       string
	Until      string
	Groups     string   // within, each, or "" when GroupList is given
	GroupList  []string // the groups named

	Deviations []Deviation
}

// Predictor is one series on the right-hand side.
type Predictor struct {
	Series string
	Lag    int
}

// LagWindow is the lags to scan, inclusive.
type LagWindow struct{ From, To int }

// Grid is interpolation that was asked for.
type Grid struct {
	Step float64
	By   string
}

// Step names of the transforms of `on`.
const (
	Log                 = "log"
	Anomalies           = "anomalies"
	Detrended           = "detrended"
	FirstDifferences    = "first-differences"
	SeasonalDifferences = "seasonal-differences"
	RatesOfChange       = "rates-of-change"
	Increments          = "increments"
	Prewhitened         = "prewhitened"
	Standardized        = "standardized"
	Differences         = "differences" // differences(K)
	MovingMean          = "moving-mean" // moving-mean(K)
)

// Transform is one step of `on`; K is the argument of differences(K) and
// moving-mean(K), else 0.
type Transform struct {
	Name string
	K    int
}

// Deviation is a documented deviation from the conventions.
type Deviation struct {
	From       string
	Reason     string
	By         string
	AcceptedBy string
	Until      string // YYYY-MM-DD
	Data       string // sha256:…
	Pair       []string
	At         document.Span // the entry of the array of tables
	Keys       map[string]Place
}

// Place is where a key of a table stands.
type Place struct {
	Key       document.Span // the key
	Value     document.Span // the value, delimiters included
	Statement document.Span // first byte of the key to last byte of the value
}

// Asked is a request bound to its place in a document.
type Asked struct {
	Request
	File   string
	Index  int           // place among the requests of the file, from 0
	Header document.Span // [[correlation]], brackets included
	At     document.Span // header to the last statement, deviations included
	Keys   map[string]Place
	Names  map[string][]document.Span // by series: where it is named inside between, given, response, predictors
	// Digest is over the fields that bear on the computing (not name,
	// question, by, …): equal digests give equal evidence.
	Digest [32]byte

	madeUp bool     // the name is not written
	faulty bool     // the request has problems, or its document cannot be read
	under  []string // keys from the root of the tree to the table it was bound in
	tree   *document.Tree
	table  *document.Node // of the request, in tree
}

// Key returns the span of the value of a key when it is written, else of the
// header: the tight place for a finding about that key.
func (a *Asked) Key(name string) document.Span {
	if p, ok := a.Keys[name]; ok {
		return p.Value
	}
	return a.Header
}

// Series lists the series that the request names, in order: between then
// given, or response then predictors; without repeats.
func (r *Request) Series() []string {
	var all []string
	if r.Kind == Regression {
		all = append(all, r.Response)
		for _, p := range r.Predictors {
			all = append(all, p.Series)
		}
	} else {
		all = append(append(all, r.Between...), r.Given...)
	}
	seen := map[string]bool{}
	kept := all[:0]
	for _, s := range all {
		if s != "" && !seen[s] {
			seen[s] = true
			kept = append(kept, s)
		}
	}
	return kept
}

// Columns lists what a computation needs, one column each: the series of a
// correlation; the response and every predictor, with its lag, of a
// regression. A series stands twice when it is a predictor at two lags.
func (r *Request) Columns() []Predictor {
	if r.Kind == Regression {
		return append([]Predictor{{Series: r.Response}}, r.Predictors...)
	}
	var all []Predictor
	for _, name := range r.Series() {
		all = append(all, Predictor{Series: name})
	}
	return all
}

// Whole reports whether the request names all that it takes to compute
// anything: two series to correlate, or a response and a predictor. One that
// is still being typed does not.
func (r *Request) Whole() bool {
	if r.Kind == Regression {
		return r.Response != "" && len(r.Predictors) > 0
	}
	return len(r.Between) >= 2
}

// Pairs lists every pair of `between`, in its order.
func (r *Request) Pairs() [][2]string {
	var pairs [][2]string
	for i, a := range r.Between {
		for _, b := range r.Between[i+1:] {
			pairs = append(pairs, [2]string{a, b})
		}
	}
	return pairs
}
