// Package result holds what one request, and one series, gives: the values
// that compute, screen, hover and reports show.
package result

import "lagwise/lint/evidence"

// Bound, Test and Critical are evidence's, shown as they are.
type (
	Bound    = evidence.PBound
	Test     = evidence.Test
	Critical = evidence.Critical
)

// Computed is what one request gives for one pair (or its regression).
type Computed struct {
	File        string
	Request     string
	Kind        string     // correlation, regression
	Pair        *[2]string // nil for a regression
	Response    string     // of a regression
	OnLevels    *Outcome
	AsWritten   *Outcome
	Recommended *Outcome // nil: no rewrite is preferred
	Changed     []string // keys in which recommended differs from as written
}

// Outcome is one computed correlation or regression. Pointers are nil where a
// value is undefined; Error then says why.
type Outcome struct {
	On          []string
	Coefficient string // of a correlation
	Inference   string
	Lag         int
	N           int
	EffectiveN  *float64
	Estimate    *float64 // of a regression: of the first predictor
	Interval    *[2]float64
	Statistic   *float64
	DF          *float64
	P           *float64
	PBound      Bound
	Level       float64 // of the interval, 0.95
	Alpha       float64 // of the lab: a p below it is evidence
	From, Until string  // first and last position used, as the axis writes them
	Data        string  // sha256:… of the aligned values
	Detectable  *float64
	Error       string // "" when computed

	// Of a regression.
	Coefficients   []Coefficient
	Estimator      string
	StandardErrors string
	ResidualSD     *float64
	RSquared       *float64
	LogLikelihood  *float64
	AIC, BIC       *float64
	ErrorProcess   *ErrorProcess
	ResidualChecks []Check

	// Approximate is set where the interval is (effective n).
	Approximate bool
	// Cautions are sentences that go with the number.
	Cautions []string
}

// Coefficient is one row of a regression table.
type Coefficient struct {
	Of            string // series, or (constant), (trend), (season 2), …
	Role          string // constant, predictor, trend, season, lagged-response, adjustment, long-run
	Lag           int
	Estimate      *float64
	StandardError *float64
	Statistic     *float64
	DF            *float64
	P             *float64
	Interval      *[2]float64
	EffectiveN    *float64
}

// ErrorProcess is the fitted process of the errors of a GLS.
type ErrorProcess struct {
	Process    string
	Parameters []float64
	Intervals  []*[2]float64 // nil where a limit could not be found
}

// Check is one test on residuals.
type Check struct {
	Test      string
	Order     *int
	Statistic *float64
	DF        []float64
	P         *float64
}

// Screened is what is known of one series of a manifest.
type Screened struct {
	Manifest, Name, Record, Column, Unit string
	Title                                string
	N, Missing                           int
	First, Last                          string
	Step                                 string
	Even                                 bool
	Gaps                                 int
	Mean, SD                             *float64
	Autocorrelation                      []float64
	EffectiveN                           *float64
	Tests                                []Test
	Trend                                *Trend
	Season                               Season
	Break                                Break
	Verdict, VerdictOnDifferences        string
	Cautions                             []string
	Error                                string
	Levels, Differences                  []float64 // for pictures, at most 240 points
}

// Trend is the robust trend of a series.
type Trend struct {
	Per         string // year, step, …
	SenSlope    *float64
	Interval    *[2]float64
	MannKendall MannKendall
}

// MannKendall is the trend test, corrected for autocorrelation.
type MannKendall struct {
	S, Z, P   *float64
	Corrected bool
}

// Season is the test for a season; nil where there is none to test.
type Season struct {
	Steps    *int
	F, P     *float64
	Strength *float64
	Kind     string // "", none, fixed, stochastic
}

// Break is the most likely break; nil where not looked for.
type Break struct {
	At        *string
	Statistic *float64
	P         *float64
}

// SeriesEvidence is what the hover and the text show of one series as a
// request uses it.
type SeriesEvidence struct {
	Name        string
	Verdict     string
	Notes       []string // "KPSS disagrees", "too short to tell", …
	Tests       []Test
	N           int
	EffectiveN  *float64
	Levels      []float64 // at most 240 points, for pictures
	Differences []float64
}

// Explanation is all that is known of one request, for the hover and for the
// text of review.
type Explanation struct {
	File, Request string
	Kind          string // correlation, regression
	Title         string // "correlation of levels", "regression (gls, ar(1)) on first differences"
	From, Until   string
	N             int
	Series        []SeriesEvidence
	Results       []Computed
	Side          []Side // short lines under the finding: what each choice gives
	Preferred     string // title of the preferred rewrite, or ""
	NoPreferred   string // why there is none, or ""
}

// Side is one line of the side-by-side: on levels, on first differences, ….
type Side struct {
	Label   string // "on levels", "on first differences, effective-n"
	Symbol  string // r, rho, tau, slope
	Outcome *Outcome
	Remark  string // "what their drifts share", "year-to-year movement; leaves nothing to object to"
}
