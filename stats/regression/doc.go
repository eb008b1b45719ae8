// Package regression fits linear regressions of one measured series on others:
// least squares with usual, effective-n and autocorrelation-robust standard
// errors, and generalised least squares with autoregressive errors by exact
// likelihood.
//
// Columns are scaled by powers of two, centred (when there is a constant) and
// orthogonalised twice; all that follows works on that orthonormal basis, so
// that neither offsets nor units nor moderate collinearity cost digits.
package regression

import (
	"fmt"

	"lagwise/stats"
)

// Design is a response and its predictors, complete rows only.
type Design struct {
	Y          []float64
	X          [][]float64 // columns, without the constant
	NoConstant bool
	Runs       []int // end index of each stretch without a gap; nil means one
	// Removed is the number of terms that transforms have taken off the series
	// before (season s - 1, trend 1): they cost degrees of freedom.
	Removed int
}

// RunEnds are the ends of the stretches: Runs, or all rows as one.
func (d Design) RunEnds() []int {
	if d.Runs == nil {
		return []int{len(d.Y)}
	}
	return d.Runs
}

// Fit is a fitted regression. Slices of coefficients have the constant first
// unless the design has none.
type Fit struct {
	Coefficients, SE, T, P, Lower, Upper []float64
	DF                                   []float64   // of each coefficient; 0 where it is not judged
	EffectiveN                           []float64   // of each coefficient; nil unless by effective n
	Covariance                           [][]float64 // of the coefficients
	Sigma                                float64     // standard deviation of the errors
	RSS                                  float64
	R2, AdjustedR2                       float64 // about zero without a constant
	F, FP                                float64 // all slopes zero; 0 and 1 where there is no joint test
	FDF                                  [2]float64
	LogLik, AIC, BIC                     float64 // sigma counts as a parameter
	N, K                                 int     // rows; coefficients, the constant counted
	Fitted, Residuals                    []float64

	basis   *basis
	errors  []float64   // residuals in scaled units
	own     []float64   // coefficients in the scaled units of the basis
	ownSE   []float64   // and their standard errors
	related [][]float64 // correlations of the coefficients, free of their units
	wald    waldRule
}

// WithoutSigma are AIC and BIC when sigma does not count as a parameter.
func (f *Fit) WithoutSigma() (aic, bic float64) {
	return f.AIC - 2, f.BIC - logOf(f.N)
}

// check panics on shapes that a programmer must not pass, and refuses what no
// line can be fitted to.
func (d Design) check(what string, extra int) error {
	n := len(d.Y)
	for _, x := range d.X {
		if len(x) != n {
			panic(fmt.Sprintf("regression: columns of %d and %d values", n, len(x)))
		}
	}
	last := 0
	for _, end := range d.RunEnds() {
		if end < last {
			panic("regression: runs are not in order")
		}
		last = end
	}
	if last != n {
		panic(fmt.Sprintf("regression: runs end at %d of %d values", last, n))
	}
	if d.coefficients() == 0 {
		panic("regression: nothing to estimate")
	}
	if need := d.coefficients() + d.Removed + extra + 1; n < need {
		return &stats.Undefined{What: what, Reason: stats.TooShort, N: n, Need: need}
	}
	return nil
}

// coefficients is the number of them, the constant counted.
func (d Design) coefficients() int {
	if d.NoConstant {
		return len(d.X)
	}
	return len(d.X) + 1
}
