package unitroot

import (
	"fmt"

	"gonum.org/v1/gonum/mat"

	"lagwise/stats"
	"lagwise/stats/series"
)

// JointF is the F statistic of Dickey & Fuller 1981 in the regression of ADF
// with the given terms and number of lags. Null hypothesis: a unit root, and no
// terms beyond those of under. Their Phi1 is (Constant, None), Phi2 (Trend,
// None), Phi3 (Trend, Constant). It is compared with their tables, not with F.
//
// Errors as for ADF; dependent lags are Singular here. It panics when under is not below terms.
func JointF(r series.Runs, terms, under Terms, lags int) (float64, error) {
	terms.check()
	if under >= terms || lags < 0 {
		panic(fmt.Sprintf("unitroot: joint F of terms %s under %s with %d lags", terms, under, lags))
	}
	s, err := newSample(r, terms)
	if err != nil {
		return 0, err
	}
	m := terms.Count()
	rows, coefficients := s.count(lags), m+1+lags
	if rows <= coefficients {
		return 0, tooShort(adfName, rows, coefficients+1, fmt.Sprintf("rows left by %d lags", lags))
	}
	kept := under.Count()
	// Kept terms, lags, tested terms, level, response. The mean goes back on the
	// differences, because the constant that bears it may be tested.
	triangle := s.triangle(lags, func(row []float64, t int) {
		s.fillTerms(row, t)
		tested := append([]float64(nil), row[kept:m]...)
		for j := 1; j <= lags; j++ {
			row[kept+j-1] = s.e[t-j] + s.mean
		}
		copy(row[kept+lags:], tested)
		row[m+lags] = s.z[t]
		row[m+lags+1] = s.e[t] + s.mean
	})
	err = s.independent(triangle, kept, m+lags, kept, kept+lags)
	if d, ok := err.(dependent); ok {
		return 0, &stats.Undefined{What: adfName, Reason: stats.Singular, N: r.N(), Detail: d.Error()}
	}
	if err != nil {
		return 0, err
	}
	f := fOfLast(triangle, m-kept+1, rows-coefficients)
	if !(f < 1e24) { // the residuals are rounding
		return 0, exact(r.N())
	}
	return f, nil
}

// fOfLast is the F of the last q columns before the response.
func fOfLast(r *mat.Dense, q, df int) float64 {
	_, width := r.Dims()
	y := width - 1
	explained := 0.0
	for i := y - q; i < y; i++ {
		explained += r.At(i, y) * r.At(i, y)
	}
	return explained / float64(q) / (r.At(y, y) * r.At(y, y) / float64(df))
}
