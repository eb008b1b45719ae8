package regression

import (
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats/distribution"
)

// OLS is the least-squares fit y = b0 + b1 x1 + … + e with the usual standard
// errors, which assume independent errors of equal variance:
//
//	se(b) = sqrt(s2 diag (X'X)^-1),  s2 = RSS/(n - K - removed)
//	t = b/se on n - K - removed degrees of freedom
//	F = [(TSS - RSS)/k]/s2 on (k, n - K - removed), k slopes
//	log-likelihood = -(n/2)(log(2 pi RSS/n) + 1)
//
// level is that of the intervals, as 0.95. Gaps do not matter here. RSS and
// Covariance saturate where the square of the unit is beyond binary numbers; a
// fit that leaves nothing but rounding has a tiny sigma, never 0.
//
// The error is *stats.Undefined: TooShort without a degree of freedom, NotFinite,
// Constant for the response, or Singular naming the predictor.
//
// Sources: Gauss 1821; Greene 2012. Twice-iterated orthogonalisation: Giraud,
// Langou & Rozloznik 2005.
func OLS(d Design, level float64) (*Fit, error) {
	const what = "least squares"
	if err := d.check(what, 0); err != nil {
		return nil, err
	}
	b, err := newBasis(what, d)
	if err != nil {
		return nil, err
	}
	n, k := float64(b.n), len(b.q)
	df := n - float64(k+d.Removed)
	rss := b.squares()
	f := &Fit{N: b.n, K: k, basis: b, wald: waldRule{df: df}}
	f.Sigma = math.Ldexp(math.Sqrt(rss/df), b.yUnit)
	f.RSS = saturate(math.Ldexp(rss, 2*b.yUnit))
	f.estimates(b.onto)
	f.setCovariance(b.spherical(rss / df))
	f.residuals(d, nil)
	f.same(df, level)
	f.determination(rss, df)
	f.LogLik = -n/2*(math.Log(2*math.Pi*rss/n)+1) - n*float64(b.yUnit)*math.Ln2
	f.information(float64(k+1), n)
	return f, nil
}

// squares is the residual sum of squares, scaled, floored at what rounding of
// the response leaves.
func (b *basis) squares() float64 {
	return max(floats.Dot(b.rest, b.rest), b.squaresFloor())
}

func (b *basis) squaresFloor() float64 { return 0x1p-100 * b.total }

// saturate keeps a value inside the finite numbers.
func saturate(v float64) float64 {
	return max(-math.MaxFloat64, min(v, math.MaxFloat64))
}

// estimates fills in the coefficients from those on the basis.
func (f *Fit) estimates(onto []float64) {
	f.own = f.basis.coefficients(onto)
	f.Coefficients = f.basis.unscaled(f.own)
}

func logOf(n int) float64 { return math.Log(float64(n)) }

// setCovariance fills in the standard errors and the covariance from that of
// the coefficients on the basis.
func (f *Fit) setCovariance(omega [][]float64) {
	b := f.basis
	c := b.covariance(omega)
	f.ownSE = make([]float64, f.K)
	f.related = make([][]float64, f.K)
	for i := range c {
		f.ownSE[i] = math.Sqrt(max(c[i][i], 0))
		f.related[i] = make([]float64, f.K)
		for j := range c[i] {
			f.related[i][j] = c[i][j] / math.Sqrt(c[i][i]*c[j][j])
		}
	}
	f.spread()
}

// spread fills in SE and Covariance from correlations and standard errors in
// scaled units.
func (f *Fit) spread() {
	f.SE = f.basis.unscaled(f.ownSE)
	f.Covariance = make([][]float64, f.K)
	for i, row := range f.related {
		f.Covariance[i] = make([]float64, f.K)
		for j, r := range row {
			f.Covariance[i][j] = saturate(r * f.SE[i] * f.SE[j])
		}
	}
}

// residuals fills in residuals and fitted values of the coefficients that
// differ by shift, on the basis, from the least-squares ones.
func (f *Fit) residuals(d Design, shift []float64) {
	f.errors = f.basis.errors(shift)
	f.Residuals = f.basis.original(f.errors)
	f.Fitted = make([]float64, f.N)
	floats.SubTo(f.Fitted, d.Y, f.Residuals)
}

// same tests every coefficient with the same degrees of freedom.
func (f *Fit) same(df, level float64) {
	all := make([]float64, f.K)
	floats.AddConst(df, all)
	f.test(all, level)
}

// test fills in t, p and intervals from coefficients and standard errors.
func (f *Fit) test(df []float64, level float64) {
	f.DF = df
	f.T, f.P = make([]float64, f.K), make([]float64, f.K)
	f.Lower, f.Upper = make([]float64, f.K), make([]float64, f.K)
	quantile := make(map[float64]float64)
	for i, c := range f.own {
		if df[i] == 0 {
			f.P[i], f.Lower[i], f.Upper[i] = 1, math.Inf(-1), math.Inf(1)
			continue
		}
		f.T[i] = c / f.ownSE[i]
		f.P[i] = distribution.TTwoSided(f.T[i], df[i])
		q, ok := quantile[df[i]]
		if !ok {
			q = distribution.TQuantile((1+level)/2, df[i])
			quantile[df[i]] = q
		}
		f.Lower[i], f.Upper[i] = c-q*f.ownSE[i], c+q*f.ownSE[i]
	}
	f.Lower, f.Upper = f.basis.unscaled(f.Lower), f.basis.unscaled(f.Upper)
}

// determination fills in R2 and F from the residual sum of squares, scaled.
func (f *Fit) determination(rss, df float64) {
	slopes := f.basis.onto
	around := 0.0
	if f.basis.constant {
		slopes, around = slopes[1:], 1
	}
	explained := floats.Dot(slopes, slopes)
	f.R2 = explained / (explained + rss)
	f.AdjustedR2 = 1 - rss/(explained+rss)*(float64(f.N)-around)/df
	f.FP = 1
	if k := float64(len(slopes)); k > 0 {
		f.F = explained / k / (rss / df)
		f.FDF = [2]float64{k, df}
		f.FP = distribution.FUpper(f.F, k, df)
	}
}

// information fills in AIC and BIC for the given number of parameters and the
// n of BIC.
func (f *Fit) information(parameters, n float64) {
	f.AIC = -2*f.LogLik + 2*parameters
	f.BIC = -2*f.LogLik + parameters*math.Log(n)
}
