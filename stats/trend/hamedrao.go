package trend

import (
	"fmt"
	"math"
	"sort"

	"lagwise/stats"
	"lagwise/stats/series"
)

// MannKendallHamedRao is the Mann-Kendall test with the variance of S corrected
// for autocorrelation (Hamed & Rao 1998). Null hypothesis: no monotone trend, the
// values may be autocorrelated.
//
//	Var* S = Var S [1 + 2/(n(n-1)(n-2)) sum over i of (n-i)(n-i-1)(n-i-2) r(i)]
//
// r are the autocorrelations (divisor n) of the average ranks of x less its
// Theil-Sen line over 1..n, at lags 1..maxLag; with onlySignificant only those
// beyond 1.96/sqrt(n). Residuals closer than 1e-11 of the largest deviation count
// as tied: the pairs that define the median slope are tied exactly, but for rounding.
// The values are taken as evenly spaced.
//
// The error is *stats.Undefined: as for MannKendall; TooShort below four values or
// when there are not more than maxLag; TooFewIndependent when the corrected
// variance is not positive. A maxLag below zero panics.
func MannKendallHamedRao(x []float64, maxLag int, onlySignificant bool) (MannKendallResult, error) {
	const what = "Mann-Kendall test after Hamed & Rao"
	if maxLag < 0 {
		panic(fmt.Sprintf("trend: lags up to %d", maxLag))
	}
	n := len(x)
	if need := max(4, maxLag+1); n < need {
		return MannKendallResult{}, tooShort(what, n, need, "")
	}
	out, err := MannKendall(x)
	if err != nil {
		return out, err
	}
	rho, err := residualRankAutocorrelations(x, maxLag)
	if err != nil {
		return MannKendallResult{}, err
	}
	size := float64(n)
	bound := 1.959963984540054 / math.Sqrt(size)
	sum := 0.0
	for k, r := range rho {
		rest := size - float64(k+1)
		if !onlySignificant || math.Abs(r) > bound {
			sum += rest * (rest - 1) * (rest - 2) * r
		}
	}
	out.Correction = 1 + 2/(size*(size-1)*(size-2))*sum
	if out.Correction <= 0 {
		return MannKendallResult{}, &stats.Undefined{What: what, Reason: stats.TooFewIndependent, N: n,
			Detail: fmt.Sprintf("the correction %.4g of the variance is not positive", out.Correction)}
	}
	out.VarS *= out.Correction
	out.Z, out.P = normal(out.S, out.VarS)
	return out, nil
}

// residualRankAutocorrelations are all zero when every value lies on the line.
func residualRankAutocorrelations(x []float64, maxLag int) ([]float64, error) {
	t := make([]float64, len(x))
	for i := range t {
		t[i] = float64(i + 1)
	}
	scaled, _, err := series.Scaled("Theil-Sen slope", x)
	if err != nil {
		return nil, err
	}
	series.Centre(scaled) // so that an offset does not widen the ties
	if scaled, _, err = series.Scaled("Theil-Sen slope", scaled); err != nil {
		return nil, err
	}
	slope, err := medianSlope(t, scaled)
	if err != nil {
		return nil, err
	}
	for i := range scaled {
		scaled[i] -= slope * t[i]
	}
	ranks, tied := rank(scaled, 1e-11)
	if tied == len(x) {
		return make([]float64, maxLag), nil
	}
	return series.Autocorrelations(series.Runs{ranks}, maxLag)
}

// rank are the average ranks of x, values within width of their neighbour in
// order counting as tied, and the size of the largest tie.
func rank(x []float64, width float64) (ranks []float64, largest int) {
	order := make([]int, len(x))
	for i := range order {
		order[i] = i
	}
	sort.Slice(order, func(a, b int) bool { return x[order[a]] < x[order[b]] })
	ranks = make([]float64, len(x))
	for i := 0; i < len(order); {
		j := i + 1
		for j < len(order) && x[order[j]]-x[order[j-1]] <= width {
			j++
		}
		for _, o := range order[i:j] {
			ranks[o] = float64(i+j+1) / 2
		}
		largest = max(largest, j-i)
		i = j
	}
	return ranks, largest
}
