package association

import (
	"fmt"
	"math"

	"lagwise/stats"
	"lagwise/stats/distribution"
)

// Detectable is the smallest absolute correlation that a two-sided test at
// level alpha finds with 80 % power among n effective values, with given
// controls taken out:
//
//	tanh((z(1 - alpha/2) + 0.8416)/sqrt(n - 3 - given))
//
// The error is *stats.Undefined, TooFewIndependent, when n - 3 - given <= 0. It
// panics unless 0 < alpha < 1.
//
// Source: Fisher 1921; Cohen 1988. Large-sample: good from about n = 10.
func Detectable(n float64, given int, alpha float64) (float64, error) {
	if !(alpha > 0 && alpha < 1) {
		panic(fmt.Sprintf("association: alpha %v", alpha))
	}
	left := n - 3 - float64(given)
	if !(left > 0) {
		return 0, &stats.Undefined{What: "detectable correlation", Reason: stats.TooFewIndependent,
			N: int(n), Detail: fmt.Sprintf("%.3g values count, more than %d are needed", n, 3+given)}
	}
	power := distribution.NormalQuantile(0.8)
	return math.Tanh((distribution.NormalQuantile(1-alpha/2) + power) / math.Sqrt(left)), nil
}
