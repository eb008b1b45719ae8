package evidence

import (
	"context"
	"fmt"

	"lagwise/lint/dataset"
	"lagwise/lint/request"
	"lagwise/stats/regression"
	"lagwise/stats/residual"
	"lagwise/stats/series"
)

// Term is one column of a regression, the constant first.
type Term struct {
	Of   string // series, or (constant), (trend), (season 2), …
	Role string // constant, predictor, trend, season
	Lag  int
}

// Fit is the regression that a request asks for, with the checks of its
// residuals. It is shared: never modify it.
type Fit struct {
	Terms  []Term
	Design regression.Design
	Fit    *regression.Fit    // with the standard errors that the request asks for
	GLS    *regression.GLSFit // nil for least squares
	// Residuals are the normalized residuals of a GLS, else the residuals.
	Residuals []float64
	LjungBox  *series.Portmanteau
	// Godfrey is the Breusch-Godfrey test of least squares, nil for a GLS.
	Godfrey *residual.LM
	// Autocorrelated is whether the residual check rejects at the lab's alpha.
	Autocorrelated bool
}

// Fit returns the regression of the request, computed once a case.
func (c *Case) Fit() (*Fit, error) {
	c.mu.Lock()
	got := c.fit
	c.mu.Unlock()
	if got != nil {
		return got.fit, got.err
	}
	fit, err := c.regressed()
	c.note(err)
	if err == nil || !passing(err) {
		c.mu.Lock()
		c.fit = &fitted{fit, err}
		c.mu.Unlock()
	}
	return fit, err
}

func (c *Case) regressed() (*Fit, error) {
	if c.req.Form != "" && c.req.Form != "static" {
		return nil, &Unserved{"form", fmt.Sprintf("form = %q is not computed by this version; static is", c.req.Form)}
	}
	frame, err := c.Used()
	if err != nil {
		return nil, err
	}
	order := 0
	if c.req.Estimator == "gls" {
		process, known := request.ParseErrors(c.req.Errors)
		if !known || process.Kind != "ar" {
			return nil, &Unserved{"errors", fmt.Sprintf("errors = %q is not computed by this version; ar(p) is", c.req.Errors)}
		}
		order = process.P
	}
	k := keyOf("fit", frame.Digest, frame.Names, frame.Season, frame.Removed, c.req.Predictors, c.req.Trend, c.req.SeasonalTerms,
		order, c.req.Likelihood, c.req.StandardErrors, c.Settings.Alpha)
	return remember(c.ctx, c.store.derived, k, func(context.Context) (*Fit, int64, error) {
		f := &Fit{}
		f.design(frame, &c.req)
		err := f.estimate(order, &c.req)
		if err == nil {
			f.check(frame, order, c.Settings.Alpha)
		}
		return f, int64(8 * (len(f.Terms) + 6) * len(frame.Positions)), err
	})
}

// design lays out the columns: predictors as written, trend, season.
func (f *Fit) design(frame *dataset.Frame, req *request.Request) {
	f.Terms = []Term{{Of: "(constant)", Role: "constant"}}
	f.Design = regression.Design{Y: frame.Columns[0], Runs: frame.Runs, Removed: frame.Removed}
	for i, p := range req.Predictors {
		f.add(Term{Of: p.Series, Role: "predictor", Lag: p.Lag}, frame.Columns[i+1])
	}
	if req.Trend {
		t := make([]float64, len(frame.Positions))
		for i, at := range frame.Positions {
			t[i] = at - frame.Positions[0]
		}
		f.add(Term{Of: "(trend)", Role: "trend"}, t)
	}
	if req.SeasonalTerms && frame.Season > 1 {
		for place := 1; place < frame.Season; place++ {
			dummy := make([]float64, len(frame.Step))
			for i, step := range frame.Step {
				if placeIn(step, frame.Season) == place {
					dummy[i] = 1
				}
			}
			f.add(Term{Of: fmt.Sprintf("(season %d)", place+1), Role: "season"}, dummy)
		}
	}
}

func (f *Fit) add(t Term, x []float64) {
	f.Terms = append(f.Terms, t)
	f.Design.X = append(f.Design.X, x)
}

func (f *Fit) estimate(order int, req *request.Request) error {
	const level = 0.95
	var err error
	if order > 0 {
		f.GLS, err = regression.GLS(f.Design, order, req.Likelihood != "ml", level)
		if err == nil {
			f.Fit, f.Residuals = &f.GLS.Fit, f.GLS.Normalized
		}
		return err
	}
	if f.Fit, err = regression.OLS(f.Design, level); err != nil {
		return err
	}
	f.Residuals = f.Fit.Residuals
	switch req.StandardErrors {
	case "effective-n":
		f.Fit, err = f.Fit.WithEffectiveN(f.Design, level)
	case "hac":
		f.Fit, err = f.Fit.WithCosineHAC(f.Design, level)
	}
	return err
}

// check looks for autocorrelation in what the fit leaves: Breusch-Godfrey
// after least squares, Ljung-Box with the fitted degrees taken off after GLS.
func (f *Fit) check(frame *dataset.Frame, order int, alpha float64) {
	n := len(f.Residuals)
	if lags := max(min(10, n/5), order+1); lags < n {
		if lb, err := series.LjungBox(runsOf(f.Residuals, frame.Runs), lags, order); err == nil {
			f.LjungBox = &lb
			f.Autocorrelated = lb.P < alpha
		}
	}
	if order > 0 {
		return
	}
	if lags := min(max(2, frame.Season), n/5); lags >= 1 {
		if bg, err := residual.BreuschGodfrey(f.Design, f.Fit, lags); err == nil {
			f.Godfrey = &bg
			f.Autocorrelated = bg.P < alpha
		}
	}
}

func runsOf(x []float64, ends []int) series.Runs {
	return column{values: x, runs: ends}.stretches()
}

// Persistence is the partial autocorrelation of the errors of a GLS that tells
// how near they are to a unit root, with its profile interval: the one whose
// interval reaches highest. For AR(1) it is the parameter itself.
func (f *Fit) Persistence() (value float64, interval [2]float64) {
	interval[1] = -1
	for k, i := range f.GLS.Intervals {
		if i[1] > interval[1] {
			value, interval = f.GLS.Partial[k], i
		}
	}
	return value, interval
}
