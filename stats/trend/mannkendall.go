// Package trend measures a monotone or linear trend of one series: rank tests,
// the median of pairwise slopes, and the least-squares slope with a standard
// error that allows for autocorrelation.
package trend

import (
	"math"

	"lagwise/stats"
	"lagwise/stats/distribution"
)

// MannKendallResult is a test of a monotone trend.
type MannKendallResult struct {
	S          float64 // pairs that rise less pairs that fall
	VarS       float64 // its variance without a trend, corrected when Correction is not 1
	Z          float64 // with continuity correction
	P          float64 // two-sided, normal
	TauB       float64
	Correction float64 // n over the effective n; 1 without correction
	N          int
}

// MannKendall is the test of Mann 1945 and Kendall 1975. Null hypothesis: the
// values are independent and equally distributed.
//
//	S = sum over i < j of sign(x[j] - x[i])
//	Var S = [n(n-1)(2n+5) - sum over ties of t(t-1)(2t+5)] / 18
//	Z = (S -+ 1) / sqrt(Var S), tau-b = S / sqrt(pairs untied * all pairs)
//
// The order of x is the time; gaps change nothing, since only the order counts.
// Ties are exact equalities. The normal law is good from about 10 values.
//
// The error is *stats.Undefined: NotFinite; TooShort below three values; Constant.
func MannKendall(x []float64) (MannKendallResult, error) {
	const what = "Mann-Kendall test"
	if err := finite(what, x); err != nil {
		return MannKendallResult{}, err
	}
	n := len(x)
	if n < 3 {
		return MannKendallResult{}, tooShort(what, n, 3, "")
	}
	c := countPairs(x)
	if c.untied() == 0 {
		return MannKendallResult{}, &stats.Undefined{What: what, Reason: stats.Constant, N: n}
	}
	out := MannKendallResult{S: float64(c.s()), VarS: c.variance(), Correction: 1, N: n}
	out.TauB = out.S / math.Sqrt(float64(c.untied())) / math.Sqrt(float64(c.pairs))
	out.Z, out.P = normal(out.S, out.VarS)
	return out, nil
}

// normal is the continuity-corrected Z of S and its two-sided p.
func normal(s, variance float64) (z, p float64) {
	switch {
	case s > 0:
		z = (s - 1) / math.Sqrt(variance)
	case s < 0:
		z = (s + 1) / math.Sqrt(variance)
	}
	return z, distribution.NormalTwoSided(z)
}

// pairCount is what the pairs of a sequence do.
type pairCount struct {
	n       int
	pairs   int64
	tied    int64
	falling int64
	ties    float64 // sum of t(t-1)(2t+5)
}

func (c pairCount) untied() int64 { return c.pairs - c.tied }
func (c pairCount) s() int64      { return c.untied() - 2*c.falling }

func (c pairCount) variance() float64 {
	n := float64(c.n)
	return (n*(n-1)*(2*n+5) - c.ties) / 18
}

// countPairs counts by sorting: the falling pairs are those out of order.
func countPairs(x []float64) pairCount {
	n := int64(len(x))
	c := pairCount{n: len(x), pairs: n * (n - 1) / 2}
	sorted := keys(x)
	c.falling = sortCounting(sorted, make([]uint64, len(x)))
	for i := 0; i < len(sorted); {
		j := i + 1
		for j < len(sorted) && sorted[j] == sorted[i] {
			j++
		}
		t := int64(j - i)
		c.tied += t * (t - 1) / 2
		c.ties += float64(t) * float64(t-1) * float64(2*t+5)
		i = j
	}
	return c
}
