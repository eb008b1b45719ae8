package residual

import (
	"fmt"

	"lagwise/stats/regression"
)

// BreuschGodfrey tests that the errors are not autocorrelated up to the given
// order: the regression of the residuals e[t] on the predictors and
// e[t-1]..e[t-order], with zeros before the first row of each run. Statistic is
// n R2, chi-square with order degrees of freedom; F is on (order, n - K - order).
// Null: independent errors. Lagged responses among the predictors are allowed.
//
// The error is *stats.Undefined: TooShort, Singular, or Constant when there are
// no residuals. It panics when order < 1.
//
// Sources: Breusch 1978; Godfrey 1978.
func BreuschGodfrey(d regression.Design, f *regression.Fit, order int) (LM, error) {
	if order < 1 {
		panic(fmt.Sprintf("residual: Breusch-Godfrey of order %d", order))
	}
	const what = "Breusch-Godfrey test"
	lags := make([][]float64, order)
	for j := range lags {
		lags[j] = make([]float64, f.N)
		from := 0
		for _, end := range d.RunEnds() {
			if end-from > j+1 {
				copy(lags[j][from+j+1:end], f.Errors()[from:end-j-1])
			}
			from = end
		}
	}
	a, err := add(what, f.Basis(), f.Errors(), lags)
	if err != nil {
		return LM{}, err
	}
	return a.test(what, f.N, f.K+d.Removed)
}
