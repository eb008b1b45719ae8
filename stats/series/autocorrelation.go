package series

import (
	"fmt"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
)

// Autocorrelations are r(1)..r(lags) of a series:
//
//	r(k) = sum (x[t] - m)(x[t+k] - m) / sum (x[t] - m)^2
//
// with the mean m of all values. Gaps: the sum of products runs over the pairs
// inside a run; the other sum and the mean run over all values (the divisor n
// of Box & Jenkins 1970). A lag at which there is no pair has r(k) = 0.
//
// The error is *stats.Undefined: NotFinite, Constant, or TooShort when there are
// not more than lags values. It panics when lags < 0.
func Autocorrelations(r Runs, lags int) ([]float64, error) {
	const what = "autocorrelations"
	if lags < 0 {
		panic(fmt.Sprintf("series: %d autocorrelations", lags))
	}
	if n := r.N(); n < max(lags+1, 2) {
		return nil, tooShort(what, n, max(lags+1, 2), "")
	}
	c, total, err := centred(what, r)
	if err != nil {
		return nil, err
	}
	out := make([]float64, lags)
	for _, run := range c {
		addProducts(out, run)
	}
	floats.Scale(1/total, out)
	return out, nil
}

// addProducts adds sum x[t] x[t+k] to sums[k-1] for every k = 1..len(sums). It
// goes block by block, so that a block is read from the cache for every lag.
func addProducts(sums, x []float64) {
	const block = 2048
	for from := 0; from < len(x); from += block {
		to := min(from+block, len(x))
		for k := 1; k <= len(sums); k++ {
			end := min(to, len(x)-k)
			if end <= from {
				break
			}
			sums[k-1] += floats.Dot(x[from:end], x[from+k:end+k])
		}
	}
}

// PartialAutocorrelations are the partial autocorrelations at lags 1..lags by
// the Durbin-Levinson recursion on Autocorrelations (Durbin 1960), that is the
// Yule-Walker estimate.
//
// Errors as for Autocorrelations, and *stats.Undefined (Singular) when the
// values before determine a lag exactly, so that no later one exists.
func PartialAutocorrelations(r Runs, lags int) ([]float64, error) {
	rho, err := Autocorrelations(r, lags)
	if err != nil {
		return nil, err
	}
	out := make([]float64, lags)
	phi := make([]float64, lags) // phi[j]: coefficient j+1 of the current order
	last := make([]float64, lags)
	rest := 1.0 // share of the variance left
	for k := 0; k < lags; k++ {
		if rest <= 0 {
			return nil, &stats.Undefined{What: "partial autocorrelations", Reason: stats.Singular, N: r.N(),
				Detail: fmt.Sprintf("the %d lags before lag %d leave no variance", k, k+1)}
		}
		num := rho[k]
		for j := 0; j < k; j++ {
			num -= phi[j] * rho[k-1-j]
		}
		a := num / rest
		copy(last, phi[:k])
		for j := 0; j < k; j++ {
			phi[j] -= a * last[k-1-j]
		}
		phi[k], out[k] = a, a
		rest *= 1 - a*a
	}
	return out, nil
}
