package trend

import (
	"fmt"
	"math"

	"lagwise/stats"
)

func finite(what string, x []float64) error {
	for i, v := range x {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return &stats.Undefined{What: what, Reason: stats.NotFinite, N: len(x), Detail: fmt.Sprintf("value %d is %v", i+1, v)}
		}
	}
	return nil
}

func tooShort(what string, n, need int, detail string) error {
	return &stats.Undefined{What: what, Reason: stats.TooShort, N: n, Need: need, Detail: detail}
}
