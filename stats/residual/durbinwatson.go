package residual

import (
	"math"

	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/mat"

	"lagwise/stats"
	"lagwise/stats/distribution"
	"lagwise/stats/regression"
)

// DurbinWatson is d = sum (e[t] - e[t-1])^2 / sum e[t]^2, about 2 - 2 r(1), with
// differences inside runs only. It has no meaning with a lagged response among
// the predictors. The error is *stats.Undefined: TooShort below 2 values, or
// Constant when all are zero.
//
// Source: Durbin & Watson 1950.
func DurbinWatson(e []float64, runs []int) (float64, error) {
	const what = "Durbin-Watson statistic"
	if len(e) < 2 {
		return 0, &stats.Undefined{What: what, Reason: stats.TooShort, N: len(e), Need: 2}
	}
	top := floats.Norm(e, math.Inf(1))
	if math.IsNaN(top) || math.IsInf(top, 0) || floats.HasNaN(e) {
		return 0, &stats.Undefined{What: what, Reason: stats.NotFinite, N: len(e)}
	}
	if top == 0 {
		return 0, &stats.Undefined{What: what, Reason: stats.Constant, N: len(e)}
	}
	u := unitless(e)
	return floats.Dot(u, steps(u, runs)) / floats.Dot(u, u), nil
}

// steps is A u with u'Au the sum of squared differences inside runs.
func steps(u []float64, runs []int) []float64 {
	out := make([]float64, len(u))
	from := 0
	for _, end := range runs {
		for t := from + 1; t < end; t++ {
			d := u[t] - u[t-1]
			out[t] += d
			out[t-1] -= d
		}
		from = end
	}
	return out
}

// DurbinWatsonTest is the statistic with the chance of one as small or smaller,
// against positive autocorrelation, when the errors are independent and normal.
type DurbinWatsonTest struct {
	Statistic        float64
	Positive         float64 // P(D <= d)
	TwoSided         float64
	PositiveByNormal float64 // from mean and variance of D
	TwoSidedByNormal float64
	Exact            bool // Positive and TwoSided are exact, else the normal ones
}

// mostExact is the longest series whose eigenvalues are computed.
const mostExact = 500

// DurbinWatsonP is the test for the rows and predictors of a least-squares
// fit. Up to 500 rows the p is exact: the distribution of a ratio of quadratic
// forms, by the eigenvalues of MAM. Beyond, it is the normal approximation from
// the exact mean and variance. Errors as DurbinWatson, TooShort without a degree
// of freedom.
//
// Sources: Durbin & Watson 1950, 1971; Imhof 1961 (the integral, here along the
// line through the saddle point: Rice 1980).
func DurbinWatsonP(d regression.Design, f *regression.Fit) (DurbinWatsonTest, error) {
	statistic, err := DurbinWatson(f.Errors(), d.RunEnds())
	if err != nil {
		return DurbinWatsonTest{}, err
	}
	t := DurbinWatsonTest{Statistic: statistic}
	mean, sd := moments(f, d.RunEnds())
	t.PositiveByNormal = 0.5
	if sd > 0 {
		z := (statistic - mean) / sd
		t.PositiveByNormal, t.TwoSidedByNormal = distribution.NormalUpper(-z), distribution.NormalTwoSided(z)
	}
	t.Positive, t.TwoSided = t.PositiveByNormal, t.TwoSidedByNormal
	if f.N <= mostExact {
		below, above, ok := tails(centredEigenvalues(f, d.RunEnds(), statistic))
		if ok {
			t.Positive, t.TwoSided, t.Exact = below, min(1, 2*min(below, above)), true
		}
	}
	return t, nil
}

// moments are mean and standard deviation of D: from the traces of MA and
// (MA)^2.
func moments(f *regression.Fit, runs []int) (mean, sd float64) {
	var one, two float64 // traces of A, A^2
	from := 0
	for _, end := range runs {
		if n := float64(end - from); n >= 2 {
			one += 2 * (n - 1)
			two += 6*n - 8
		}
		from = end
	}
	basis := f.Basis()
	for _, q := range basis {
		a := steps(q, runs)
		one -= floats.Dot(q, a)
		two -= 2 * floats.Dot(a, a)
		for _, r := range basis {
			c := floats.Dot(r, a)
			two += c * c
		}
	}
	df := float64(f.N - f.K)
	mean = one / df
	return mean, math.Sqrt(max(0, 2*(two-one*mean)/(df*(df+2))))
}

// centredEigenvalues are the n - K eigenvalues of MAM outside the predictors,
// less d: D <= d is the event that the sum of them times independent
// chi-squares is at most 0.
func centredEigenvalues(f *regression.Fit, runs []int, d float64) []float64 {
	n := f.N
	basis := f.Basis()
	m := mat.NewSymDense(n, nil)
	column := make([]float64, n)
	project := func(v []float64) {
		for _, q := range basis {
			floats.AddScaled(v, -floats.Dot(q, v), q)
		}
	}
	for j := range n {
		for i := range column {
			column[i] = 0
		}
		column[j] = 1
		project(column)
		a := steps(column, runs)
		project(a)
		for i := 0; i <= j; i++ {
			m.SetSym(i, j, a[i])
		}
	}
	// The predictors' own directions are moved out of the way, above all others.
	for _, q := range basis {
		m.SymRankOne(m, 100, mat.NewVecDense(n, append([]float64(nil), q...)))
	}
	var eigen mat.EigenSym
	if !eigen.Factorize(m, false) {
		return nil
	}
	values := eigen.Values(nil)[:n-len(basis)]
	floats.AddConst(-d, values)
	return values
}
