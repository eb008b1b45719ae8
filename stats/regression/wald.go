package regression

import (
	"math"

	"gonum.org/v1/gonum/mat"

	"lagwise/stats"
	"lagwise/stats/distribution"
)

// waldRule is how a joint test of coefficients is scaled.
type waldRule struct {
	df     float64
	cosine bool // Hotelling's T2 on df cosines
}

// JointTest is a test that several coefficients are zero at once.
type JointTest struct{ F, P, DF1, DF2 float64 }

// Wald tests that the coefficients with the given indices (into Coefficients)
// are all zero, with the covariance of the fit:
//
//	F = c'V^-1 c/m on (m, df)
//	F = c'V^-1 c (nu - m + 1)/(nu m) on (m, nu - m + 1) after WithCosineHAC
//
// After WithEffectiveN df is the smallest of theirs. The error is
// *stats.Undefined: Singular when V has no inverse, TooFewIndependent when no
// degree of freedom is left.
//
// Sources: Wald 1943; Lazarus, Lewis, Stock & Watson 2018 (Hotelling).
func (f *Fit) Wald(coefficients ...int) (JointTest, error) {
	const what = "joint test of coefficients"
	m := len(coefficients)
	if m == 0 {
		panic("regression: no coefficients to test")
	}
	df := f.wald.df
	for _, i := range coefficients {
		df = min(df, f.DF[i])
	}
	scale := 1 / float64(m)
	if f.wald.cosine {
		scale = (df - float64(m) + 1) / (df * float64(m))
		df = df - float64(m) + 1
	}
	if !(df > 0) {
		return JointTest{}, &stats.Undefined{What: what, Reason: stats.TooFewIndependent, N: f.N}
	}
	w, ok := f.quadratic(coefficients)
	if !ok {
		return JointTest{}, &stats.Undefined{What: what, Reason: stats.Singular, N: f.N}
	}
	t := JointTest{F: w * scale, DF1: float64(m), DF2: df}
	t.P = distribution.FUpper(t.F, t.DF1, t.DF2)
	return t, nil
}

// quadratic is t'C^-1 t with the t ratios and the correlation matrix C of the
// coefficients: c'V^-1 c without their units.
func (f *Fit) quadratic(at []int) (float64, bool) {
	m := len(at)
	c, t := mat.NewSymDense(m, nil), mat.NewVecDense(m, nil)
	for a, i := range at {
		if !(f.ownSE[i] > 0) {
			return 0, false
		}
		t.SetVec(a, f.own[i]/f.ownSE[i])
		for b := a; b < m; b++ {
			j := at[b]
			c.SetSym(a, b, f.related[i][j])
		}
	}
	var chol mat.Cholesky
	if !chol.Factorize(c) || chol.Cond() > 1e15 {
		return 0, false
	}
	var x mat.VecDense
	if chol.SolveVecTo(&x, t) != nil {
		return 0, false
	}
	w := mat.Dot(t, &x)
	return w, w >= 0 && !math.IsInf(w, 0)
}

// slopes are the indices of all coefficients but the constant.
func (f *Fit) slopes() []int {
	var out []int
	for i := range f.own {
		if i > 0 || !f.basis.constant {
			out = append(out, i)
		}
	}
	return out
}

// joint fills in F of all slopes, or none where the covariance does not carry
// it.
func (f *Fit) joint() {
	f.F, f.FP, f.FDF = 0, 1, [2]float64{}
	s := f.slopes()
	if len(s) == 0 {
		return
	}
	if t, err := f.Wald(s...); err == nil {
		f.F, f.FP, f.FDF = t.F, t.P, [2]float64{t.DF1, t.DF2}
	}
}
