package association

import (
	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
)

// EffectiveN is the number n* of independent pairs whose correlation would
// vary as much as that of the n autocorrelated ones:
//
//	1/n* = 1/n + (2/n) sum over k = 1..floor(n/5) of r_x(k) r_y(k)
//	r(k) = [n/(n-k)] sum (x[t] - mean)(x[t+k] - mean) / sum (x[t] - mean)^2
//
// n* exceeds n where the two series have autocorrelations of opposite sign,
// and is bounded by 2n; a sum so negative that the variance would vanish gives
// 2n as well. n* is not rounded. Products never cross a gap; the other sums
// run over all values.
//
// The error is *stats.Undefined: TooShort below 2 rows, NotFinite or Constant.
//
// Source: Pyper & Peterman 1998 (Can. J. Fish. Aquat. Sci. 55:2127), without
// their weights (n-k)/n and without their bound n, which makes the test too
// timid (its size falls to 0.01) where the signs are opposite.
func EffectiveN(x, y []float64, runs []int) (float64, error) {
	n, _, err := EffectiveNBy(Judged, x, y, runs)
	return n, err
}

// EffectiveRule is one of the published estimates of the effective n.
type EffectiveRule uint8

const (
	// Judged is the rule of EffectiveN.
	Judged EffectiveRule = iota
	// LagOne is n (1 - a b)/(1 + a b) with the lag-1 autocorrelations a and b,
	// divisor n (Bartlett 1935; Bretherton et al. 1999, eq. 31).
	LagOne
	// Weighted is 1/n* = 1/n + (2/n) sum (n-k)/n r_x(k) r_y(k), divisor n
	// (Pyper & Peterman 1998).
	Weighted
	// WeightedScaled is Weighted with autocorrelations scaled by n/(n-k).
	WeightedScaled
)

// EffectiveNBy is the effective n by a named rule: bounded (by 2n for Judged,
// by n for the others, as their authors do) and as the formula gives it. A
// formula that gives no positive number is reported as the bound.
// Errors as EffectiveN.
func EffectiveNBy(rule EffectiveRule, x, y []float64, runs []int) (bounded, raw float64, err error) {
	checkShape(runs, x, y)
	u, err := units("effective n", x, y)
	if err != nil {
		return 0, 0, err
	}
	bounded, raw = rule.count(u[0], u[1], runs)
	return bounded, raw, nil
}

// EffectiveNAboutZero is EffectiveN of two series that are taken about zero
// instead of about their means: the scores of a regression coefficient are
// products of such a pair. The error is *stats.Undefined, Constant, when a
// series is all zeros.
func EffectiveNAboutZero(x, y []float64, runs []int) (float64, error) {
	checkShape(runs, x, y)
	var u [2][]float64
	for i, c := range [][]float64{x, y} {
		norm := floats.Norm(c, 2)
		if !(norm > 0) {
			return 0, &stats.Undefined{What: "effective n", Reason: stats.Constant, N: len(c)}
		}
		u[i] = make([]float64, len(c))
		floats.ScaleTo(u[i], 1/norm, c)
	}
	bounded, _ := Judged.count(u[0], u[1], runs)
	return bounded, nil
}

// count applies the rule to two series of length one (sum of squares).
func (rule EffectiveRule) count(u, v []float64, runs []int) (bounded, raw float64) {
	n := float64(len(u))
	bound := n
	if rule == Judged {
		bound = 2 * n
	}
	if rule == LagOne {
		ab := lagProducts(u, runs, 1)[0] * lagProducts(v, runs, 1)[0]
		raw = n * (1 - ab) / (1 + ab)
	} else {
		raw = n / (1 + 2*rule.sum(u, v, runs))
	}
	if !(raw > 0) || raw > bound {
		return bound, raw
	}
	return raw, raw
}

// sum is the weighted sum of r_x(k) r_y(k) over k = 1..floor(n/5).
func (rule EffectiveRule) sum(u, v []float64, runs []int) float64 {
	n := len(u)
	p := lagProducts(u, runs, n/5)
	q := p
	if &u[0] != &v[0] {
		q = lagProducts(v, runs, n/5)
	}
	var s float64
	for i := range p {
		left := float64(n-i-1) / float64(n)
		term := p[i] * q[i]
		switch rule {
		case Judged:
			term /= left * left
		case Weighted:
			term *= left
		case WeightedScaled:
			term /= left
		}
		s += term
	}
	return s
}
