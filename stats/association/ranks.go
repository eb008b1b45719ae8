package association

import (
	"math"
	"strconv"
)

// Ranks are the average ranks of x, 1 for the smallest value; equal values
// share the mean of the ranks that they take up. Only values that are equal
// bit for bit (or both zero) are tied.
func Ranks(x []float64) []float64 {
	order := sorted(x)
	return spread(order, x, 0)
}

// TiedRanks are average ranks with the ties restored that binary arithmetic
// breaks: 0.3 - 0.2 and 0.2 - 0.1 differ by 3e-17 and are one value to whoever
// reads the data. Neighbours in order are tied when they differ by no more than
// 1e-9 of the range of x, but only where this is the mark of rounding:
//
//   - the smallest larger step between neighbours is at least a million times
//     the largest such step, so that steps of rounding and steps of data are
//     far apart with nothing between (smooth data have steps of every size);
//   - and some value needs more than 15 significant digits: values as they
//     were written down, however small, are as distinct as they were written.
//
// The rule does not change when x is multiplied or shifted by what the binary
// numbers can hold. Ranks has the exact rule.
func TiedRanks(x []float64) []float64 {
	order := sorted(x)
	return spread(order, x, noise(order, x))
}

// spread gives the members of each chain of neighbours within step the mean of
// their ranks.
func spread(order []int32, x []float64, step float64) []float64 {
	ranks := make([]float64, len(x))
	for from := 0; from < len(order); {
		to := from + 1
		for to < len(order) && x[order[to]]-x[order[to-1]] <= step {
			to++
		}
		mean := float64(from+to+1) / 2
		for _, i := range order[from:to] {
			ranks[i] = mean
		}
		from = to
	}
	return ranks
}

// noise is the largest step between neighbours that is rounding, 0 when none
// is.
func noise(order []int32, x []float64) float64 {
	const share, apart = 1e-9, 1e6
	if len(x) < 2 {
		return 0
	}
	limit := share * (x[order[len(x)-1]] - x[order[0]])
	rounding, data := 0.0, math.Inf(1)
	for i := 1; i < len(order); i++ {
		step := x[order[i]] - x[order[i-1]]
		if step <= limit {
			rounding = max(rounding, step)
		} else {
			data = min(data, step)
		}
	}
	if rounding == 0 || data < apart*rounding || written(x) {
		return 0
	}
	return rounding
}

// written reports whether every value is the nearest binary number to a
// decimal of at most 15 digits, as every number is that somebody wrote down.
func written(x []float64) bool {
	var b [32]byte
	for _, v := range x {
		text := strconv.AppendFloat(b[:0], v, 'e', 14, 64)
		if back, _ := strconv.ParseFloat(string(text), 64); back != v {
			return false
		}
	}
	return true
}
