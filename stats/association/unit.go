package association

import (
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
	"lagwise/stats/series"
)

// granularity bounds the relative rounding of a value: a spread below it is
// that of one number written several times.
const granularity = 64 * 0x1p-52

// unit is a copy of x centred and scaled to length one, robust to offset and
// to any unit. The error is *stats.Undefined: NotFinite, TooShort below two
// values, or Constant.
func unit(what string, x []float64) ([]float64, error) {
	if len(x) < 2 {
		return nil, &stats.Undefined{What: what, Reason: stats.TooShort, N: len(x), Need: 2}
	}
	u, _, err := series.Scaled(what, x)
	if err != nil {
		return nil, err
	}
	if floats.Max(u)-floats.Min(u) <= granularity*max(math.Abs(floats.Max(u)), math.Abs(floats.Min(u))) {
		return nil, &stats.Undefined{What: what, Reason: stats.Constant, N: len(x)}
	}
	series.Centre(u)
	floats.Scale(1/math.Sqrt(floats.Dot(u, u)), u)
	return u, nil
}

// units are unit vectors of several columns.
func units(what string, columns ...[]float64) ([][]float64, error) {
	out := make([][]float64, len(columns))
	for i, c := range columns {
		var err error
		if out[i], err = unit(what, c); err != nil {
			return nil, err
		}
	}
	return out, nil
}
