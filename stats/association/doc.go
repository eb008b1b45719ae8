// Package association holds coefficients of correlation between two measured
// series, with inference that knows about autocorrelation.
//
// Every function takes complete rows: x and y of the same length, and runs,
// the end index of each stretch without a gap ({n} when there is none). Inputs
// are never modified. Slices of different length, or runs that do not end at
// n, panic: that is a mistake of the programmer.
//
// One idea carries all the inference: the m values that a test may count.
//
//	m = n                     usual
//	m = n* (effective n)      inference by effective n
//	m = n* (n - q)/n          when transforms removed q terms
//	m = n - q                 prewhitened series
//
// A test of a coefficient with g controls has m - 2 - g degrees of freedom,
// and its interval uses the same m.
package association

import (
	"fmt"
	"math"

	"lagwise/stats"
	"lagwise/stats/distribution"
)

// Inference says how a coefficient is tested.
type Inference struct {
	// EffectiveN counts n* of EffectiveN instead of the rows.
	EffectiveN bool
	// Removed is the number q of terms that transforms have taken off the
	// series (season s - 1, trend 1).
	Removed int
	// Prewhitened says that the series are innovations: they are independent
	// by construction, so that no effective n is taken (Haugh 1976).
	Prewhitened bool
	// Level of the interval, as 0.95; 0 means 0.95.
	Level float64
	// Approximate asks for the large-sample p where a short series without
	// ties would get an exact one.
	Approximate bool
	// OwnTest tests a semipartial by its own t (Kim 2015) instead of by the
	// exact t of the partial correlation.
	OwnTest bool
}

func (inf Inference) level() float64 {
	if inf.Level == 0 {
		return 0.95
	}
	return inf.Level
}

// exact reports whether an exact p may be given: only for the data as they are.
func (inf Inference) exact() bool {
	return !inf.EffectiveN && !inf.Prewhitened && !inf.Approximate && inf.Removed == 0
}

// Result is a coefficient with its test of "no association" and its interval.
type Result struct {
	Estimate      float64
	Statistic     float64
	StatisticName string  // "t", "z" or "S"
	DF            float64 // of t; 0 for z and S
	P             float64 // two-sided
	Lower, Upper  float64
	N             int
	EffectiveN    float64 // N when the inference is not by effective n
	Exact         bool    // P is exact under every order being equally likely
}

// checkShape panics unless the columns have one length and runs end at it.
func checkShape(runs []int, columns ...[]float64) {
	n := len(columns[0])
	for _, c := range columns {
		if len(c) != n {
			panic(fmt.Sprintf("association: columns of %d and %d values", n, len(c)))
		}
	}
	last := 0
	for _, end := range runs {
		if end < last {
			panic("association: runs are not in order")
		}
		last = end
	}
	if last != n {
		panic(fmt.Sprintf("association: runs end at %d of %d values", last, n))
	}
}

// counted is the m of the package comment. The error is *stats.Undefined,
// TooFewIndependent for n* <= 3.
func (inf Inference) counted(what string, x, y []float64, runs []int) (nStar, m float64, err error) {
	n := float64(len(x))
	nStar = n
	if inf.EffectiveN && !inf.Prewhitened {
		if nStar, err = EffectiveN(x, y, runs); err != nil {
			return 0, 0, err
		}
		if nStar <= 3 {
			return 0, 0, &stats.Undefined{What: what, Reason: stats.TooFewIndependent, N: len(x),
				Detail: fmt.Sprintf("effective n is %.3g; more than 3 are needed", nStar)}
		}
	}
	return nStar, nStar * (n - float64(inf.Removed)) / n, nil
}

// degrees is m - 2 - g, or an error when that leaves nothing to test with.
func degrees(what string, n int, m float64, g int) (float64, error) {
	df := m - 2 - float64(g)
	if df < 1e-9 {
		return 0, &stats.Undefined{What: what, Reason: stats.TooFewIndependent, N: n,
			Detail: fmt.Sprintf("%.4g values count, %d are estimated", m, 2+g)}
	}
	return df, nil
}

// correlation is a coefficient together with 1 - r and 1 + r, which keep their
// digits when r is near one.
type correlation struct{ r, below, above float64 }

// newCorrelation measures the angle of two centred vectors of length one:
// 1 - r = |u - v|^2/2 loses nothing to cancellation.
func newCorrelation(u, v []float64) correlation {
	var below, above float64
	for i := range u {
		d, s := u[i]-v[i], u[i]+v[i]
		below += d * d
		above += s * s
	}
	below, above = below/2, above/2
	r := 0.0
	if below < above { // mirrored exactly when one vector changes its sign
		r = 1 - below
	} else if above < below {
		r = above - 1
	}
	return correlation{max(-1, min(1, r)), below, above}
}

// resolution is the least 1 - r^2 that binary numbers tell from zero. A
// perfect correlation gets that: a finite statistic, p = 0 or close to it.
const resolution = 0x1p-52

// t is r sqrt(df/(1 - r^2)).
func (c correlation) t(df float64) float64 {
	return c.r * math.Sqrt(df/max(c.below*c.above, resolution))
}

// fisher is the interval tanh(atanh r +- z se), clamped to what is known: all
// of -1..1 when se is not a number above 0.
func (c correlation) fisher(se, level float64) (lower, upper float64) {
	if !(se > 0) || math.IsInf(se, 1) {
		return -1, 1
	}
	if c.below < resolution || c.above < resolution {
		return c.r, c.r
	}
	centre := (math.Log(c.above) - math.Log(c.below)) / 2
	half := distribution.NormalQuantile((1+level)/2) * se
	return math.Tanh(centre - half), math.Tanh(centre + half)
}

// root is sqrt(variance) where there is one, else 0.
func root(variance float64) float64 {
	if !(variance > 0) {
		return 0
	}
	return math.Sqrt(variance)
}
