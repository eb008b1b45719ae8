// Package residual checks what a regression leaves behind: autocorrelation,
// curvature, unequal variance, shape, and single rows that carry the result.
//
// The tests of curvature, variance and shape assume independent errors: give
// them the fit of whitened series, or normalized residuals.
package residual

import (
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
	"lagwise/stats/distribution"
	"lagwise/stats/regression"
	"lagwise/stats/series"
)

// LM is a Lagrange-multiplier test: chi-square with DF degrees of freedom, and
// its F form on (DF, DF2).
type LM struct {
	Statistic, P, F, FP float64
	DF, DF2             int
}

// added is a regression of e on a basis and further columns: the share of the
// squares of e that the further columns explain, and how many of them are not
// a combination of the rest. e is made orthogonal to the basis first.
type added struct {
	share float64
	rank  int
}

// collinear is the part of a column, next to its length, below which it says
// nothing new.
const collinear = 1e-11

func add(what string, basis [][]float64, e []float64, columns [][]float64) (added, error) {
	rest, left := part(e, basis)
	if !(left > 0) {
		return added{}, &stats.Undefined{What: what, Reason: stats.Constant, N: len(e), Detail: "there are no residuals"}
	}
	all := append([][]float64(nil), basis...)
	var a added
	for _, c := range columns {
		q, left := part(c, all)
		if left < collinear {
			continue
		}
		all = append(all, q)
		p := floats.Dot(q, rest)
		floats.AddScaled(rest, -p, q)
		a.share += p * p
		a.rank++
	}
	if a.rank == 0 {
		return a, &stats.Undefined{What: what, Reason: stats.Singular, N: len(e),
			Detail: "what the test adds is a combination of the predictors"}
	}
	a.share = min(a.share, 1)
	return a, nil
}

// part is v without the basis, at length one, and the share of its length that
// was left.
func part(v []float64, basis [][]float64) ([]float64, float64) {
	q := unitless(v)
	length := floats.Norm(q, 2)
	if length == 0 {
		return q, 0
	}
	for range 2 {
		for _, b := range basis {
			floats.AddScaled(q, -floats.Dot(b, q), b)
		}
	}
	left := floats.Norm(q, 2)
	if left > 0 {
		floats.Scale(1/left, q)
	}
	return q, left / length
}

// test turns the share into n R2 and F with df2 = n - fitted - rank.
func (a added) test(what string, n, fitted int) (LM, error) {
	t := LM{Statistic: float64(n) * a.share, DF: a.rank, DF2: n - fitted - a.rank}
	if t.DF2 < 1 {
		return t, &stats.Undefined{What: what, Reason: stats.TooShort, N: n, Need: fitted + a.rank + 1}
	}
	t.P = distribution.ChiSquareUpper(t.Statistic, float64(t.DF))
	t.F, t.FP = a.f(t.DF2)
	return t, nil
}

// f is F and its p; what explains everything to rounding is resolved to 2^-52.
func (a added) f(df2 int) (f, p float64) {
	f = a.share / float64(a.rank) / (max(1-a.share, 0x1p-52) / float64(df2))
	return f, distribution.FUpper(f, float64(a.rank), float64(df2))
}

// standardised is v centred and scaled to values of the order of one.
func standardised(v []float64) []float64 {
	s := unitless(v)
	floats.AddConst(-floats.Sum(s)/float64(len(s)), s)
	if top := floats.Norm(s, math.Inf(1)); top > 0 {
		floats.Scale(1/top, s)
	}
	return s
}

// unitless is v times a power of two that brings it to the order of one; a v
// that is not finite is left alone.
func unitless(v []float64) []float64 {
	s, _, err := series.Scaled("values", v)
	if err != nil {
		return append([]float64(nil), v...)
	}
	return s
}

// powers are the second and third powers of v.
func powers(v []float64) [][]float64 {
	two, three := make([]float64, len(v)), make([]float64, len(v))
	floats.MulTo(two, v, v)
	floats.MulTo(three, two, v)
	return [][]float64{two, three}
}

// withConstant is the basis of a fit, extended by the constant when it has
// none.
func withConstant(f *regression.Fit) [][]float64 {
	if f.HasConstant() {
		return f.Basis()
	}
	one := make([]float64, f.N)
	floats.AddConst(1, one)
	q, left := part(one, f.Basis())
	if left < collinear {
		return f.Basis()
	}
	return append(append([][]float64(nil), f.Basis()...), q)
}
