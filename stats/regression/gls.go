package regression

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
)

// GLSFit is a regression whose errors are an autoregression. Sigma is the
// marginal standard deviation of the errors, R2 that of Buse 1973, RSS the sum
// of squares of the normalized residuals times the innovation variance.
type GLSFit struct {
	Fit
	Order   int
	AR      []float64 // e[t] = AR[0] e[t-1] + AR[1] e[t-2] + … + innovation
	Partial []float64 // partial autocorrelations of the errors
	// Intervals are the 95 % profile-likelihood intervals of Partial: for one
	// parameter, that of the parameter itself.
	Intervals  [][2]float64
	Normalized []float64 // innovations over their standard deviation
	Likelihood string    // "ml" or "reml"
	// Boundary says that the likelihood keeps rising as a partial
	// autocorrelation goes to 1: errors with a unit root. Slopes and their
	// standard errors are then the limit, which is the regression of
	// differences; the constant, its standard error and Sigma have none.
	Boundary bool
}

// GLS is generalised least squares with AR(order) errors by exact Gaussian
// likelihood, maximised over the stationary region: all local maxima of a scan
// for order 1, several starting points otherwise. Every run starts afresh from
// the stationary distribution; nothing crosses a gap.
//
//	ML    l = -(n/2)(log(2 pi s2) + 1) - log|R|/2,  s2 = e'R^-1 e/n
//	REML  l = -((n-K)/2)(log(2 pi s2) + 1) - log|R|/2 - log|X'R^-1 X|/2, s2 = e'R^-1 e/(n-K)
//	se = sqrt(e'R^-1 e/(n - K) diag (X'R^-1 X)^-1) under both
//	t on n - K - order - removed degrees of freedom (WithDegrees has others)
//
// AIC and BIC count K, order and sigma; BIC takes log(n - K) under REML. order
// is 0 to 20. The error is *stats.Undefined: as for OLS, or NotConverged.
//
// Sources: Pinheiro & Bates 2000, chapter 5; Barndorff-Nielsen & Schou 1973 (the
// partial autocorrelations as parameters); Buse 1973.
func GLS(d Design, order int, reml bool, level float64) (*GLSFit, error) {
	if order < 0 || order > 20 {
		panic(fmt.Sprintf("regression: AR(%d) errors", order))
	}
	what := fmt.Sprintf("regression with AR(%d) errors", order)
	if err := d.check(what, order); err != nil {
		return nil, err
	}
	if order > 0 && longest(d.RunEnds()) <= order+1 {
		return nil, &stats.Undefined{What: what, Reason: stats.TooShort, N: longest(d.RunEnds()), Need: order + 2,
			Detail: "no stretch without a gap is long enough"}
	}
	b, err := newBasis(what, d)
	if err != nil {
		return nil, err
	}
	if floats.Dot(b.rest, b.rest) <= b.squaresFloor() {
		return nil, &stats.Undefined{What: what, Reason: stats.Constant, N: b.n,
			Detail: "the predictors explain the response to the last digit; no errors are left to model"}
	}
	l := newLikelihood(b, d.RunEnds(), order, reml)
	best, err := l.maximise(what)
	if err != nil {
		return nil, err
	}
	g := l.fit(d, best)
	g.setDegrees(float64(g.N-g.K-order-d.Removed), level)
	return g, nil
}

func longest(ends []int) int {
	most, from := 0, 0
	for _, end := range ends {
		most = max(most, end-from)
		from = end
	}
	return most
}

// WithDegrees is the fit with other degrees of freedom for all its tests and
// intervals, such as n - K.
func (g *GLSFit) WithDegrees(df, level float64) *GLSFit {
	h := *g
	h.setDegrees(df, level)
	return &h
}

func (g *GLSFit) setDegrees(df, level float64) {
	g.wald = waldRule{df: df}
	g.same(df, level)
	g.joint()
}

// fit turns the best parameters into the fit.
func (l *likelihood) fit(d Design, best point) *GLSFit {
	b := l.basis
	n, k := float64(b.n), len(b.q)
	g := &GLSFit{Order: l.order, AR: l.coefficients(best.u), Likelihood: "ml", Boundary: l.atEdge(best.u)}
	g.Fit = Fit{N: b.n, K: k, basis: b}
	divisor := n
	if l.reml {
		g.Likelihood, divisor = "reml", n-float64(k)
	}
	e := l.evaluate(best.u)
	g.LogLik = e.value - l.offset()
	g.information(float64(k+l.order+1), divisor)

	onto := make([]float64, k)
	floats.AddTo(onto, b.onto, e.shift)
	g.estimates(onto)
	df := n - float64(k+d.Removed)
	g.setCovariance(scale(e.inverse(), e.squares/df))
	g.residuals(d, e.shift)
	g.Sigma = saturate(math.Ldexp(math.Sqrt(e.squares/divisor/e.filters.weights[0]), b.yUnit))
	g.RSS = saturate(math.Ldexp(e.squares, 2*b.yUnit))
	g.Normalized = l.normalized(e, b.errors(e.shift), math.Sqrt(e.squares/divisor))
	g.buse(df)
	for _, u := range best.u {
		g.Partial = append(g.Partial, math.Tanh(u))
	}
	for i := range best.u {
		g.Intervals = append(g.Intervals, l.profile(best, i, 0.95))
	}
	return g
}

// buse fills in R2 from the Wald statistic of the slopes.
func (g *GLSFit) buse(df float64) {
	g.DF = make([]float64, g.K)
	floats.AddConst(df, g.DF)
	s := g.slopes()
	if len(s) == 0 {
		return
	}
	if w, ok := g.quadratic(s); ok {
		g.R2 = w / (w + df)
		around := 0.0
		if g.basis.constant {
			around = 1
		}
		g.AdjustedR2 = 1 - (1-g.R2)*(float64(g.N)-around)/df
	}
}

func scale(m [][]float64, by float64) [][]float64 {
	for _, row := range m {
		floats.Scale(by, row)
	}
	return m
}
