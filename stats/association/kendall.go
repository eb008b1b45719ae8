package association

import (
	"math"

	"lagwise/stats/distribution"
)

// shortestNormal is the shortest series without ties whose p is taken from the
// normal approximation although an exact one could be had.
const shortestNormal = 50

// Kendall is the rank correlation tau-b
//
//	tau = S / sqrt((n0 - n1)(n0 - n2)),  S = concordant - discordant pairs
//
// with n0 = n(n-1)/2 pairs, n1 and n2 of them tied in x and in y; ties are
// restored as in TiedRanks. Without ties, below n = 50 and for usual inference,
// p is exact: twice the smaller tail of S over all orders, at most 1. Else
// z = S/sqrt(var S) with the variance corrected for ties and multiplied by
// v(m)/v(n), v(k) = 2(2k + 5)/(9k(k - 1)), m the values that count (package
// comment; n* from the autocorrelations of the ranks). No continuity correction.
// The interval is tanh(atanh tau +- z sqrt(0.437/(m - 4))), -1..1 for m <= 4.
// O(n log n) (Knight 1966).
//
// The error is *stats.Undefined as for Pearson.
//
// Sources: Kendall 1938, 1975; Knight 1966; Fieller, Hartley & Pearson 1957.
func Kendall(x, y []float64, runs []int, inf Inference) (Result, error) {
	const what = "Kendall correlation"
	checkShape(runs, x, y)
	if err := enough(what, len(x), 3); err != nil {
		return Result{}, err
	}
	if _, err := units(what, x, y); err != nil {
		return Result{}, err
	}
	rx, ry := TiedRanks(x), TiedRanks(y)
	nStar, m, err := inf.counted(what, rx, ry, runs)
	if err != nil {
		return Result{}, err
	}
	if _, err := degrees(what, len(x), m, 0); err != nil {
		return Result{}, err
	}
	pairs := countPairs(rx, ry)
	r := Result{Estimate: pairs.tau(), N: len(x), EffectiveN: nStar}
	if inf.exact() && len(x) < shortestNormal && pairs.tiedX == 0 && pairs.tiedY == 0 {
		r.Statistic, r.StatisticName, r.Exact = pairs.s, "S", true
		r.P = exactKendall(pairs)
	} else {
		r.normal(pairs.s / math.Sqrt(pairs.variance()*tauVariance(m)/tauVariance(float64(len(x)))))
	}
	r.Lower, r.Upper = fieller(r.Estimate, m, inf.level())
	return r, nil
}

// normal fills in a test by z.
func (r *Result) normal(z float64) {
	r.Statistic, r.StatisticName, r.DF = z, "z", 0
	r.P = distribution.NormalTwoSided(z)
}

// tauVariance is the variance of tau of m independent pairs without ties.
func tauVariance(m float64) float64 { return 2 * (2*m + 5) / (9 * m * (m - 1)) }

// fieller is the interval of tau from m independent pairs.
func fieller(tau, m, level float64) (lower, upper float64) {
	c := correlation{tau, 1 - tau, 1 + tau}
	return c.fisher(math.Sqrt(0.437)/root(m-4), level)
}

// exactKendall is twice the smaller tail of the number of discordant pairs.
func exactKendall(p pairCount) float64 {
	top := int(p.all)
	discordant := int(math.Round((p.all - p.s) / 2))
	chance := inversionChances(int(p.n))
	var sum float64
	for d := 0; d <= min(discordant, top-discordant); d++ {
		sum += chance[d]
	}
	return min(1, 2*sum)
}

// inversionChances[d] is the probability of d inversions in an order of n
// values when all n! are equally likely, for d = 0..n(n-1)/2.
func inversionChances(n int) []float64 {
	chance := []float64{1}
	for k := 2; k <= n; k++ {
		next := make([]float64, k*(k-1)/2+1)
		for d, c := range chance {
			for more := range k {
				next[d+more] += c / float64(k)
			}
		}
		chance = next
	}
	return chance
}

// taus is the matrix of tau-b of ranked columns; 0 with a column that does not
// vary.
func taus(ranks [][]float64) [][]float64 {
	out := make([][]float64, len(ranks))
	for i := range ranks {
		out[i] = make([]float64, len(ranks))
		out[i][i] = 1
		for j := range i {
			p := countPairs(ranks[i], ranks[j])
			if p.all > p.tiedX && p.all > p.tiedY {
				out[i][j] = p.tau()
				out[j][i] = out[i][j]
			}
		}
	}
	return out
}
