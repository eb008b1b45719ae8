package regression

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
	"lagwise/stats/series"
)

// scores are q[t] e[t] for each column q of the basis: their long-run
// covariance is that of the coefficients on the basis.
func (f *Fit) scores() [][]float64 {
	out := make([][]float64, f.K)
	for i, q := range f.basis.q {
		out[i] = make([]float64, f.N)
		floats.MulTo(out[i], q, f.basis.rest)
	}
	return out
}

// Cosines is the number of cosines of the default long-run variance,
// max(2, floor(0.41 n^(2/3))) (Lazarus, Lewis, Stock & Watson 2018).
func Cosines(n int) int {
	return max(2, int(0.41*math.Pow(float64(n), 2.0/3)))
}

// WithCosineHAC is the fit with standard errors robust to autocorrelation and
// unequal variance, from equally weighted cosines:
//
//	L_j = sqrt(2/n) sum cos(pi j (t - 1/2)/n) x_t e_t,  j = 1..nu
//	Omega = [n/(n - K)] (1/nu) sum L_j L_j'
//	V = n (X'X)^-1 Omega (X'X)^-1,  t on nu degrees of freedom
//	F = Wald (nu - m + 1)/(nu m) on (m, nu - m + 1) for m slopes
//
// nu = Cosines(n); K counts the constant and the terms removed by transforms. Rows on
// both sides of a gap follow one another. F is absent (0, p 1) when m > nu.
//
// Source: Lazarus, Lewis, Stock & Watson 2018 (J. Bus. Econ. Stat. 36:541).
func (f *Fit) WithCosineHAC(d Design, level float64) (*Fit, error) {
	nu := Cosines(f.N)
	n := float64(f.N)
	omega := f.basis.spherical(0)
	scores := f.scores()
	sums := make([][]float64, f.K)
	for i, s := range scores {
		sums[i] = series.CosineSums(s, nu)
	}
	l := make([]float64, f.K)
	for j := range nu {
		for i := range l {
			l[i] = sums[i][j]
		}
		addOuter(omega, l, l, 2/(n-float64(f.K+d.Removed))*n/float64(nu))
	}
	return f.robust(omega, float64(nu), waldRule{df: float64(nu), cosine: true}, level)
}

// WithNeweyWest is the fit with Bartlett's kernel, weights 1 - j/(lag + 1) on
// the autocovariances of the scores (Newey & West 1987), without prewhitening or
// small-sample factor, t on n - K degrees of freedom. Products never cross a
// gap. It panics when lag < 0.
func (f *Fit) WithNeweyWest(d Design, lag int, level float64) (*Fit, error) {
	if lag < 0 {
		panic(fmt.Sprintf("regression: lag %d", lag))
	}
	return f.kernel(d, min(lag, f.N-1), level, func(j int) float64 { return 1 - float64(j)/float64(lag+1) })
}

// WithQuadraticSpectral is the same with the quadratic spectral kernel at the
// given bandwidth > 0 (Andrews 1991) and all lags.
func (f *Fit) WithQuadraticSpectral(d Design, bandwidth, level float64) (*Fit, error) {
	if !(bandwidth > 0) {
		panic(fmt.Sprintf("regression: bandwidth %v", bandwidth))
	}
	return f.kernel(d, f.N-1, level, func(j int) float64 {
		a := 6 * math.Pi / 5 * float64(j) / bandwidth
		return 3 / (a * a) * (math.Sin(a)/a - math.Cos(a))
	})
}

func (f *Fit) kernel(d Design, lags int, level float64, weight func(j int) float64) (*Fit, error) {
	omega := f.basis.spherical(0)
	scores := f.scores()
	for i, s := range scores {
		for l, r := range scores {
			omega[i][l] = floats.Dot(s, r)
		}
	}
	for j := 1; j <= lags; j++ {
		w := weight(j)
		from := 0
		for _, end := range d.RunEnds() {
			if end-from > j {
				addLagged(omega, scores, from, end, j, w)
			}
			from = end
		}
	}
	df := float64(f.N - f.K - d.Removed)
	return f.robust(omega, df, waldRule{df: df}, level)
}

// addLagged adds w (G + G') with G the lag-j products of the scores in a run.
func addLagged(omega, scores [][]float64, from, end, j int, w float64) {
	for i, s := range scores {
		for l, r := range scores {
			g := w * floats.Dot(s[from+j:end], r[from:end-j])
			omega[i][l] += g
			omega[l][i] += g
		}
	}
}

func addOuter(omega [][]float64, a, b []float64, w float64) {
	for i := range a {
		floats.AddScaled(omega[i], w*a[i], b)
	}
}

// robust is the fit with another covariance on the basis.
func (f *Fit) robust(omega [][]float64, df float64, rule waldRule, level float64) (*Fit, error) {
	g := *f
	g.wald, g.EffectiveN = rule, nil
	g.setCovariance(omega)
	for i, se := range g.ownSE {
		if !(se > 0) {
			return nil, &stats.Undefined{What: fmt.Sprintf("robust standard error of coefficient %d", i), Reason: stats.Singular,
				N: f.N, Detail: "the scores leave no variance"}
		}
	}
	g.same(df, level)
	g.joint()
	return &g, nil
}
