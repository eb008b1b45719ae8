package dataset

import (
	"math"

	"lagwise/stats"
)

// log returns natural logarithms. A value at or below 0 has none.
func (p part) log() ([]float64, error) {
	out := make([]float64, len(p.values()))
	for i, v := range p.values() {
		if v <= 0 {
			return nil, p.undefined(stats.NotFinite, "log of %s at %s does not exist; log is for values above 0", shortNumber(v), p.frame.Format(p.frame.Positions[i]))
		}
		out[i] = math.Log(v)
	}
	return out, nil
}

// differences returns x[t] - x[t-k] inside runs; the first k rows of a run are
// lost.
func (p part) differences(k int) []float64 {
	x, out := p.values(), p.blank()
	p.eachRun(func(start, end int) {
		for i := start + k; i < end; i++ {
			out[i] = x[i] - x[i-k]
		}
	})
	return out
}

// rates returns differences over the distance of their positions, in the unit
// of the axis.
func (p part) rates() ([]float64, error) {
	out := p.differences(1)
	at := p.frame.Positions
	for i := range out {
		if out[i] != out[i] {
			continue
		}
		d := at[i] - at[i-1]
		if d <= 0 {
			return nil, p.undefined(stats.NotFinite, "two rows stand at %s, so that the rate between them does not exist", p.frame.Format(at[i]))
		}
		out[i] /= d
	}
	return out, nil
}

// movingMean returns the mean of k steps around each row, the later half the
// longer one when k is even; rows without all of them are lost.
func (p part) movingMean(k int) []float64 {
	x, out := p.values(), p.blank()
	before := (k - 1) / 2
	p.eachRun(func(start, end int) {
		for i := start + before; i+k-before <= end; i++ {
			sum := 0.0
			for _, v := range x[i-before : i-before+k] {
				sum += v
			}
			out[i] = sum / float64(k)
		}
	})
	return out
}

// anomalies returns the values minus the mean of their place in the season.
func (p part) anomalies() ([]float64, int, error) {
	s := p.frame.Season
	if err := p.needsSeason("anomalies"); err != nil {
		return nil, 0, err
	}
	x, out := p.values(), p.blank()
	groups := p.frame.stretches()
	for _, g := range groups {
		sums, counts := make([]float64, s), make([]float64, s)
		center := firstPresent(x[g[0]:g[1]])
		for i := g[0]; i < g[1]; i++ {
			if x[i] == x[i] {
				phase := floorMod(p.frame.Step[i], s)
				sums[phase] += x[i] - center
				counts[phase]++
			}
		}
		for i := g[0]; i < g[1]; i++ {
			phase := floorMod(p.frame.Step[i], s)
			out[i] = x[i] - center - sums[phase]/counts[phase]
		}
	}
	return out, (s - 1) * len(groups), nil
}

// firstPresent returns a value near the others, so that sums of distances from
// it lose no digits.
func firstPresent(x []float64) float64 {
	for _, v := range x {
		if v == v {
			return v
		}
	}
	return 0
}

// detrended returns the values minus the least-squares line along the axis.
func (p part) detrended() ([]float64, int, error) {
	x, at, out := p.values(), p.frame.Positions, p.blank()
	groups := p.frame.stretches()
	for _, g := range groups {
		mx, mt, n := 0.0, 0.0, 0.0
		cx, ct := firstPresent(x[g[0]:g[1]]), at[g[0]]
		for i := g[0]; i < g[1]; i++ {
			if x[i] == x[i] {
				mx += x[i] - cx
				mt += at[i] - ct
				n++
			}
		}
		mx, mt = cx+mx/n, ct+mt/n
		sxt, stt := 0.0, 0.0
		for i := g[0]; i < g[1]; i++ {
			if x[i] == x[i] {
				sxt += (at[i] - mt) * (x[i] - mx)
				stt += (at[i] - mt) * (at[i] - mt)
			}
		}
		if !(stt > 0) {
			return nil, 0, p.undefined(stats.TooShort, "a line needs values at two positions")
		}
		for i := g[0]; i < g[1]; i++ {
			out[i] = (x[i] - mx) - sxt/stt*(at[i]-mt)
		}
	}
	return out, len(groups), nil
}

// standardized returns (x - mean)/sd, sd with divisor n - 1.
func (p part) standardized() ([]float64, error) {
	x, out := p.values(), p.blank()
	for _, g := range p.frame.stretches() {
		center := firstPresent(x[g[0]:g[1]])
		sum, n := 0.0, 0.0
		for _, v := range x[g[0]:g[1]] {
			if v == v {
				sum += v - center
				n++
			}
		}
		mean, squares := center+sum/n, 0.0
		for _, v := range x[g[0]:g[1]] {
			if v == v {
				squares += (v - mean) * (v - mean)
			}
		}
		sd := math.Sqrt(squares / (n - 1))
		if n < 2 || !(sd > 0) {
			return nil, p.undefined(stats.Constant, "its standard deviation is 0")
		}
		for i := g[0]; i < g[1]; i++ {
			out[i] = (x[i] - mean) / sd
		}
	}
	return out, nil
}
