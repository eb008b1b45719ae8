package unitroot

import (
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats/series"
)

// rounding is four units in the last place of values scaled to below 1: what is
// not larger is no movement.
const rounding = 0x1p-50

// sample holds the values of all runs as the regressions need them.
type sample struct {
	terms    Terms
	z        []float64 // scaled; centred, or taken off their line, where the terms allow
	e        []float64 // differences less their mean, z[t+1] = z[t] + e[t] + drift; without meaning at the end of a run
	mean     float64   // taken off the differences
	drift    float64   // what is left of it in z
	ends     []int     // end index of each run
	exponent int       // of the scale
}

func newSample(r series.Runs, terms Terms) (*sample, error) {
	n := r.N()
	if n < 4 {
		return nil, tooShort(adfName, n, 4, "")
	}
	z, exponent, err := scaled(adfName, r)
	if err != nil {
		return nil, err
	}
	if same(z) {
		return nil, constant(adfName, n, "")
	}
	s := &sample{terms: terms, z: z, exponent: exponent, e: make([]float64, n)}
	for _, run := range r {
		if len(run) > 0 {
			s.ends = append(s.ends, len(run)+last(s.ends))
		}
	}
	floats.SubTo(s.e[:n-1], z[1:], z[:n-1])
	if terms == None {
		return s, nil
	}
	series.Centre(z)
	slope := 0.0
	if terms >= Trend {
		slope = takeLineOff(z)
	}
	if largest(z) <= rounding {
		return nil, constant(adfName, n, "no movement around the terms")
	}
	s.mean = s.meanDifference()
	floats.AddConst(-s.mean, s.e)
	s.drift = s.mean - slope
	return s, nil
}

func last(ends []int) int {
	if len(ends) == 0 {
		return 0
	}
	return ends[len(ends)-1]
}

// scaled is series.Scaled of all values.
func scaled(what string, r series.Runs) ([]float64, int, error) {
	if len(r) == 1 {
		return series.Scaled(what, r[0]) // a copy already
	}
	return series.Scaled(what, r.Concat())
}

func largest(x []float64) float64 {
	top := 0.0
	for _, v := range x {
		if a := math.Abs(v); a > top {
			top = a
		}
	}
	return top
}

// takeLineOff subtracts the least-squares line over the index from the centred
// z and returns its slope.
func takeLineOff(z []float64) float64 {
	n := float64(len(z))
	middle := (n - 1) / 2
	square := n * (n*n - 1) / 12
	total := 0.0
	// Twice: the second pass takes off what rounding left of a steep line.
	for pass := 0; pass < 2; pass++ {
		product := 0.0
		for t, v := range z {
			product += (float64(t) - middle) * v
		}
		slope := product / square
		for t := range z {
			z[t] -= slope * (float64(t) - middle)
		}
		total += slope
	}
	return total
}

func (s *sample) meanDifference() float64 {
	sum, n := 0.0, 0
	start := 0
	for _, end := range s.ends {
		if end-start > 1 {
			sum += floats.Sum(s.e[start : end-1])
			n += end - start - 1
		}
		start = end
	}
	if n == 0 {
		return 0
	}
	return sum / float64(n)
}

// count is the number of rows with the given number of lags: t is a row when
// t+1 and the lags before t are in its run.
func (s *sample) count(lags int) int {
	n, start := 0, 0
	for _, end := range s.ends {
		n += max(0, end-start-1-lags)
		start = end
	}
	return n
}

// rows calls use for each row.
func (s *sample) rows(lags int, use func(t int)) {
	start := 0
	for _, end := range s.ends {
		for t := start + lags; t < end-1; t++ {
			use(t)
		}
		start = end
	}
}
