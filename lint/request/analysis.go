package request

import "lagwise/lint/document"

// Analysis is the typed content of NAME.analysis.toml.
type Analysis struct {
	File      string
	Title     string
	Manifests []string        // as written; nil: found
	Places    []document.Span // of each entry of Manifests
	Requests  []*Asked
	Tree      *document.Tree
}

// Conventions is the typed content of NAME.conventions.toml. Values that are
// not given are zero: Merge lays one over another key by key.
type Conventions struct {
	File     string
	BuildsOn []string
	Places   []document.Span // of each entry of BuildsOn
	Review   Review
	AskedFor AskedFor
	Accepted Accepted
	Weight   map[string]string // rule -> severity name
	Limits   map[string]float64
	Tests    TestSettings
	Keys     map[string]Place // dotted path -> place, e.g. "weight.shared-drift"
	Tree     *document.Tree
}

// Review is [review].
type Review struct {
	Exclude         []string
	Final           []string
	HoldAt          string
	Alpha           *float64
	LeastN          map[string]int // correlation, regression
	LeastEffectiveN *float64
}

// AskedFor is [asked-for].
type AskedFor struct {
	Request          []string
	Series           []string
	Deviation        []string
	DeviationLongest string
}

// Accepted is [accepted-methods]; a nil list accepts all.
type Accepted struct {
	Coefficient      []string
	Estimator        []string
	On               []string
	AlwaysDifference *bool
}

// TestSettings is [test-settings].
type TestSettings struct {
	ADFLags       string // aic, bic, general-to-specific or a number; "": aic
	KPSSBandwidth string // newey-west or a number; "": newey-west
	LeastNVerdict int    // 0: 20
	Family        string // holm, benjamini-hochberg; "": holm
}
