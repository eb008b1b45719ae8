package series

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
)

// Scaled is a copy of x multiplied by 2^-exponent, the power of two that
// brings the largest absolute value into [0.5, 1), so that squares and products
// neither overflow nor vanish whatever the unit. The multiplication is exact.
// All zeros keep exponent 0.
//
// The error is *stats.Undefined (NotFinite) when a value is NaN or infinite;
// what names the statistic in it.
func Scaled(what string, x []float64) (scaled []float64, exponent int, err error) {
	top := 0.0
	for i, v := range x {
		a := math.Abs(v)
		if !(a <= math.MaxFloat64) {
			return nil, 0, &stats.Undefined{What: what, Reason: stats.NotFinite, N: len(x),
				Detail: fmt.Sprintf("value %d is %v", i+1, v)}
		}
		if a > top { // max would look for NaN again
			top = a
		}
	}
	scaled = make([]float64, len(x))
	if top == 0 {
		return scaled, 0, nil
	}
	_, exponent = math.Frexp(top)
	if -1000 < exponent && exponent < 1000 {
		floats.ScaleTo(scaled, math.Ldexp(1, -exponent), x)
		return scaled, exponent, nil
	}
	// Two factors, because 2^1074 alone is beyond the range.
	half := -exponent / 2
	floats.ScaleTo(scaled, math.Ldexp(1, half), x)
	floats.Scale(math.Ldexp(1, -exponent-half), scaled)
	return scaled, exponent, nil
}

// Centre subtracts the mean of x from x in place, in two passes so that an
// offset costs no digits, and returns the mean.
func Centre(x []float64) float64 {
	n := float64(len(x))
	mean := floats.Sum(x) / n
	floats.AddConst(-mean, x)
	rest := floats.Sum(x) / n
	floats.AddConst(-rest, x)
	return mean + rest
}

// centred is the runs of r scaled and with their common mean taken off, and
// the sum of squares of that. The error is *stats.Undefined: NotFinite, or
// Constant.
func centred(what string, r Runs) (Runs, float64, error) {
	c, _, err := Scaled(what, r.Concat())
	if err != nil {
		return nil, 0, err
	}
	if same(c) {
		return nil, 0, constant(what, len(c))
	}
	Centre(c)
	return r.like(c), floats.Dot(c, c), nil
}

func same(x []float64) bool {
	for _, v := range x {
		if v != x[0] {
			return false
		}
	}
	return true
}
