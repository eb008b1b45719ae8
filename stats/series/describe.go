package series

import (
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
)

// Moments describe the values of a series without regard to their order.
type Moments struct {
	N        int
	Mean     float64
	SD       float64 // divisor n-1
	Skewness float64 // m3 / m2^1.5, m_k the central moments with divisor n
	Kurtosis float64 // m4 / m2^2: 3 for a normal distribution
	Min, Max float64
}

// Describe computes the moments of x. Means are subtracted in two passes and
// the values scaled first, so that neither an offset (1e12) nor a unit (1e-300
// to 1e300) costs digits.
//
// The error is *stats.Undefined: NotFinite; TooShort below two values; Constant
// when all are equal, for then the shape does not exist. N, Mean, Min, Max and,
// for a constant, SD = 0 are filled in with the last two as well.
func Describe(x []float64) (Moments, error) {
	const what = "moments"
	if len(x) == 0 {
		return Moments{}, tooShort(what, 0, 2, "")
	}
	c, exponent, err := Scaled(what, x)
	if err != nil {
		return Moments{}, err
	}
	m := Moments{N: len(x), Min: floats.Min(x), Max: floats.Max(x)}
	if m.Min == m.Max {
		m.Mean = x[0]
		if m.N == 1 {
			return m, tooShort(what, 1, 2, "")
		}
		return m, constant(what, m.N)
	}
	m.Mean = math.Ldexp(Centre(c), exponent)
	n := float64(m.N)
	// A second scaling, now of the deviations, for a small spread on a large
	// offset: its fourth powers would vanish.
	c, spread, err := Scaled(what, c)
	if err != nil {
		return Moments{}, err
	}
	var m2, m3, m4 float64
	for _, d := range c {
		sq := d * d
		m2 += sq
		m3 += sq * d
		m4 += sq * sq
	}
	m.SD = math.Ldexp(math.Sqrt(m2/(n-1)), exponent+spread)
	if math.IsInf(m.SD, 0) {
		return Moments{}, &stats.Undefined{What: what, Reason: stats.NotFinite, N: m.N,
			Detail: "the standard deviation is beyond the largest floating-point number"}
	}
	m.Skewness = m3 / n / math.Pow(m2/n, 1.5)
	m.Kurtosis = m4 / n / (m2 / n * (m2 / n))
	return m, nil
}
