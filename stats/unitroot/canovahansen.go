package unitroot

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/mat"

	"lagwise/stats"
	"lagwise/stats/series"
)

// CanovaHansenResult is a test of the stability of a season.
type CanovaHansenResult struct {
	Statistic float64
	Critical5 float64
	P         float64
	Rejects   bool // at 5 %
	DF        int  // seasonal terms tested
}

// The harmonics tested of a long season: more could not be told apart in the
// records there are, and the covariance grows with their square.
const mostHarmonics = 12

// CanovaHansen tests whether a season is the same throughout. Null hypothesis:
// the seasonal pattern is constant (alternative: it changes as a random walk).
//
//	L = n^-2 sum over t of F[t]' W^-1 F[t],  F[t] = sum over i = 1..t of f[i] e[i]
//
// f are the sines and cosines of the season's harmonics (s - 1 of them; of a
// season longer than 25 steps the first 12 harmonics), e the residuals of x on a
// constant and f, W the Bartlett long-run covariance of f e with bandwidth
// round(s (n/100)^(1/4)) (common practice). The law of L is that of the integral
// of the squared length of a DF-dimensional Brownian bridge; P is
// computed from its characteristic function.
//
// x must be stationary but for its season. at holds the step positions, strictly
// increasing; products never cross a gap. The error is *stats.Undefined:
// NotFinite; TooShort below three full seasons or when a harmonic cannot be told
// from the others; Constant when nothing moves around the season. It panics when
// s < 2 or the lengths differ. Source: Canova & Hansen 1995, J. Bus. Econ. Stat.
// 13:237-252.
func CanovaHansen(x []float64, at []int, s int) (CanovaHansenResult, error) {
	const what = "Canova-Hansen test"
	if len(x) != len(at) || s < 2 {
		panic(fmt.Sprintf("unitroot: %s of %d values at %d positions with a season of %d", what, len(x), len(at), s))
	}
	n := len(x)
	if n < 3*min(s, n+1) {
		return CanovaHansenResult{}, tooShort(what, n, 3*s, "three full seasons")
	}
	e, _, err := series.Scaled(what, x)
	if err != nil {
		return CanovaHansenResult{}, err
	}
	if same(e) {
		return CanovaHansenResult{}, constant(what, n, "")
	}
	series.Centre(e)
	f := harmonics(at, s)
	if err := residuals(e, f); err != nil {
		return CanovaHansenResult{}, err
	}
	top := largest(e)
	if top <= rounding {
		return CanovaHansenResult{}, constant(what, n, "no movement around the season")
	}
	scores := mat.NewDense(n, f.RawMatrix().Cols, nil)
	for t := range e {
		for j, v := range f.RawRowView(t) {
			scores.Set(t, j, v*e[t]/top)
		}
	}
	bandwidth := int(math.Round(float64(s) * math.Pow(float64(n)/100, 0.25)))
	var w mat.Cholesky
	if !w.Factorize(longRun(scores, at, bandwidth)) || w.Cond() > 1e12 {
		return CanovaHansenResult{}, &stats.Undefined{What: what, Reason: stats.TooShort, N: n, Detail: "the harmonics cannot be told apart"}
	}
	out := CanovaHansenResult{DF: scores.RawMatrix().Cols, Statistic: nyblom(scores, &w)}
	out.P = bridgeTail(out.Statistic, out.DF)
	out.Critical5 = bridge5[out.DF-1]
	out.Rejects = out.Statistic > out.Critical5
	return out, nil
}

// harmonics are cos and sin of 2 pi j t / s for j = 1..s/2, the sine of the last
// left out where it is zero at every step.
func harmonics(at []int, s int) *mat.Dense {
	terms := min(s-1, 2*mostHarmonics)
	f := mat.NewDense(len(at), terms, nil)
	for i, t := range at {
		place := t % s // exact for large positions
		for j := 0; j < terms; j++ {
			angle := 2 * math.Pi * float64((j/2+1)*place%s) / float64(s)
			if j%2 == 0 {
				f.Set(i, j, math.Cos(angle))
			} else {
				f.Set(i, j, math.Sin(angle))
			}
		}
	}
	return f
}

// residuals replaces e by its residuals on a constant and f.
func residuals(e []float64, f *mat.Dense) error {
	n, k := f.Dims()
	x := mat.NewDense(n, k+1, nil)
	for t := 0; t < n; t++ {
		x.Set(t, 0, 1)
		for j := 0; j < k; j++ {
			x.Set(t, j+1, f.At(t, j))
		}
	}
	var qr mat.QR
	qr.Factorize(x)
	y := mat.NewVecDense(n, e)
	var beta, fitted mat.VecDense
	if err := qr.SolveVecTo(&beta, false, y); err != nil {
		return &stats.Undefined{What: "Canova-Hansen test", Reason: stats.TooShort, N: n, Detail: "a phase of the season never occurs"}
	}
	fitted.MulVec(x, &beta)
	y.SubVec(y, &fitted)
	return nil
}

// longRun is the Bartlett long-run covariance of the scores by moving sums, as
// in bartlett; a gap in at starts a new run.
func longRun(scores *mat.Dense, at []int, q int) *mat.SymDense {
	n, k := scores.Dims()
	sum := mat.NewVecDense(k, nil)
	w := mat.NewSymDense(k, nil)
	for start := 0; start < n; {
		end := start + 1
		for end < n && at[end] == at[end-1]+1 {
			end++
		}
		sum.Zero()
		for t := start; t < end+q; t++ {
			if full := start + q - t + 1; t == end && full > 0 { // the whole run is inside the window
				w.SymRankOne(w, float64(full), sum)
				if t += full; t == end+q {
					break
				}
			}
			if t < end {
				sum.AddVec(sum, scores.RowView(t))
			}
			if out := t - q - 1; out >= start {
				sum.SubVec(sum, scores.RowView(out))
			}
			w.SymRankOne(w, 1, sum)
		}
		start = end
	}
	w.ScaleSym(1/float64(q+1)/float64(n), w)
	return w
}

func nyblom(scores *mat.Dense, w *mat.Cholesky) float64 {
	n, k := scores.Dims()
	sum := mat.NewVecDense(k, nil)
	total := mat.NewSymDense(k, nil)
	for t := 0; t < n; t++ {
		sum.AddVec(sum, scores.RowView(t))
		total.SymRankOne(total, 1, sum)
	}
	var ratio mat.Dense
	if err := w.SolveTo(&ratio, total); err != nil {
		return 0 // not reached: the caller has checked the condition
	}
	return mat.Trace(&ratio) / float64(n) / float64(n)
}
