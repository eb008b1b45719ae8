package regression

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
	"lagwise/stats/association"
)

// WithEffectiveN is the fit with standard errors that count, for each
// coefficient j, the effective n of its own pair of series:
//
//	x~ = residuals of x_j on the other predictors and the constant
//	n* = EffectiveN of x~ and the residuals e
//	se = sqrt([sum e^2/(n* - K)]/sum x~^2),  t on n* - K degrees of freedom
//
// (K coefficients; n* (n - q)/n for n* when transforms have removed q terms). It
// assumes errors of equal variance. Covariance keeps the usual correlations
// between the coefficients; F is a joint test only as far as they hold. A
// constant whose n* leaves no degree of freedom is not judged (DF 0); that of a
// predictor is the error *stats.Undefined, TooFewIndependent, also for n* <= 3.
//
// Source: Pyper & Peterman 1998, applied to the score of a coefficient.
func (f *Fit) WithEffectiveN(d Design, level float64) (*Fit, error) {
	g := *f
	b := f.basis
	n := float64(f.N)
	g.EffectiveN = make([]float64, f.K)
	g.ownSE = make([]float64, f.K)
	df := make([]float64, f.K)
	for i, x := range f.Directions() {
		nStar, err := association.EffectiveNAboutZero(x, b.rest, d.RunEnds())
		if err != nil {
			return nil, err
		}
		g.EffectiveN[i] = nStar
		left := nStar*(n-float64(d.Removed))/n - float64(f.K)
		if nStar <= 3 || left < 1e-9 {
			if i == 0 && b.constant {
				continue
			}
			return nil, &stats.Undefined{What: fmt.Sprintf("coefficient of predictor %d", f.predictor(i)),
				Reason: stats.TooFewIndependent, N: f.N,
				Detail: fmt.Sprintf("effective n is %.3g for %d coefficients", nStar, f.K)}
		}
		df[i] = left
		g.ownSE[i] = math.Sqrt(b.squares()/left) * floats.Norm(b.back[i], 2)
	}
	g.spread()
	g.wald = waldRule{df: n}
	g.test(df, level)
	g.joint()
	return &g, nil
}

// predictor is the number, from 1, of the predictor of coefficient i.
func (f *Fit) predictor(i int) int {
	if f.basis.constant {
		return i
	}
	return i + 1
}
