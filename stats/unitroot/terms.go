// Package unitroot asks whether a series drifts: tests with the null of a unit
// root (ADF), with the null of stationarity (KPSS), and of a stable season
// (Canova-Hansen), and the distributions they are compared with.
package unitroot

import (
	"fmt"

	"lagwise/stats"
)

// Terms are the deterministic terms of a test regression.
type Terms uint8

const (
	None Terms = iota
	Constant
	Trend          // constant and linear trend
	QuadraticTrend // and its square
)

// Count is the number of coefficients of the terms.
func (t Terms) Count() int { return int(t) }

func (t Terms) String() string {
	switch t {
	case None:
		return "none"
	case Constant:
		return "constant"
	case Trend:
		return "trend"
	case QuadraticTrend:
		return "quadratic trend"
	}
	return fmt.Sprintf("Terms(%d)", uint8(t))
}

func (t Terms) check() {
	if t > QuadraticTrend {
		panic("unitroot: unknown " + t.String())
	}
}

func tooShort(what string, n, need int, detail string) error {
	return &stats.Undefined{What: what, Reason: stats.TooShort, N: n, Need: need, Detail: detail}
}

func constant(what string, n int, detail string) error {
	return &stats.Undefined{What: what, Reason: stats.Constant, N: n, Detail: detail}
}

func same(x []float64) bool {
	for _, v := range x {
		if v != x[0] {
			return false
		}
	}
	return true
}
