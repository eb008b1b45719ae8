package series

import (
	"math"
	"sort"

	"lagwise/stats"
)

// SeasonalStrength is the share of the variation that the season accounts for,
//
//	F_S = max(0, 1 - Var(R) / Var(S + R))
//
// (Wang, Smith & Hyndman 2006), 0 to 1, where x = T + S + R is the
// seasonal-trend decomposition by loess of Cleveland, Cleveland, McRae &
// Terpenning 1990: trend and low-pass loess linear, the seasonal one locally
// constant over 11 seasons so that a slowly changing season is followed and a
// short noise is not, two passes, no robustness weights. at holds the step
// positions, strictly increasing; steps without a value are passed over by
// every loess.
//
// The error is *stats.Undefined: NotFinite, Constant, or TooShort below two full
// seasons, when a phase never occurs, or when the values fill less than one step
// in twenty. It panics when s < 2 or the lengths differ.
func SeasonalStrength(x []float64, at []int, s int) (float64, error) {
	const what = "strength of the season"
	checkPositions(x, at, s)
	c, _, err := Scaled(what, x)
	if err != nil {
		return 0, err
	}
	if fullSeasons(at, s) < 2 || len(c) < 2*s/20 {
		return 0, tooShort(what, len(c), 2*s, "two full seasons")
	}
	span := at[len(at)-1] - at[0] + 1
	if span > 20*len(c) {
		return 0, tooShort(what, len(c), span/20, "the values fill less than one step in twenty")
	}
	if same(c) {
		return 0, constant(what, len(c))
	}
	Centre(c)
	steps := make([]int, len(at))
	for i := range at {
		steps[i] = at[i] - at[0]
	}
	d := decomposition{steps: steps, x: c, span: span, s: s}
	if missing := d.missingPhases(); missing > 0 {
		return 0, &stats.Undefined{What: what, Reason: stats.TooShort, N: len(c), Detail: "a phase of the season never occurs"}
	}
	season, rest := d.run()
	both := make([]float64, len(rest))
	for i := range rest {
		both[i] = season[i] + rest[i]
	}
	whole := variance(both)
	if whole <= 1e-28 {
		return 0, nil // what the trend leaves is rounding
	}
	return math.Max(0, 1-variance(rest)/whole), nil
}

func variance(x []float64) float64 {
	mean, sum := 0.0, 0.0
	for _, v := range x {
		mean += v / float64(len(x))
	}
	for _, v := range x {
		sum += (v - mean) * (v - mean)
	}
	return sum / float64(len(x))
}

// decomposition holds values x at the steps (from 0) of a grid of span steps.
type decomposition struct {
	steps []int
	x     []float64
	span  int
	s     int
}

func (d *decomposition) missingPhases() int {
	seen := make(map[int]bool)
	for _, t := range d.steps {
		seen[t%d.s] = true
	}
	return d.s - len(seen)
}

// run returns the seasonal and the remaining part of each value.
func (d *decomposition) run() (season, rest []float64) {
	const seasonWindow = 11
	trendWindow := odd(1.5 * float64(d.s) / (1 - 1.5/seasonWindow))
	trend := make([]float64, d.span)
	n := len(d.x)
	seasonal := make([]float64, d.span)
	work := make([]float64, n)
	for pass := 0; pass < 2; pass++ {
		for i, t := range d.steps {
			work[i] = d.x[i] - trend[t]
		}
		seasonal = d.seasonal(work, seasonWindow)
		for i, t := range d.steps {
			work[i] = d.x[i] - seasonal[t]
		}
		trend = smoothGrid(d.steps, work, 0, d.span, trendWindow, 1)
	}
	season, rest = make([]float64, n), make([]float64, n)
	for i, t := range d.steps {
		season[i] = seasonal[t]
		rest[i] = d.x[i] - trend[t] - seasonal[t]
	}
	return season, rest
}

// seasonal smooths each phase of the detrended values over the seasons, one
// season beyond both ends, and takes off the low frequencies of the result.
func (d *decomposition) seasonal(detrended []float64, window int) []float64 {
	s := d.s
	cycle := make([]float64, d.span+2*s) // cycle[j] belongs to step j-s
	for p := 0; p < s; p++ {
		var years []int
		var values []float64
		for i, t := range d.steps {
			if t%s == p {
				years = append(years, t/s)
				values = append(values, detrended[i])
			}
		}
		last := (d.span + s - 1 - p) / s // the phase's year at or beyond the end
		fitted := smoothGrid(years, values, -1, last+1, window, 0)
		for j, v := range fitted {
			if at := p + j*s; at < len(cycle) {
				cycle[at] = v
			}
		}
	}
	low := movingMean(movingMean(movingMean(cycle, s), s), 3)
	grid := make([]int, len(low))
	for i := range grid {
		grid[i] = i
	}
	low = smoothGrid(grid, low, 0, len(low), odd(float64(s)), 1)
	out := make([]float64, d.span)
	for t := range out {
		out[t] = cycle[t+s] - low[t]
	}
	return out
}

func odd(v float64) int {
	n := int(math.Ceil(v))
	return n + 1 - n%2
}

func movingMean(x []float64, w int) []float64 {
	out := make([]float64, len(x)-w+1)
	sum := 0.0
	for i, v := range x {
		sum += v
		if i >= w {
			sum -= x[i-w]
		}
		if i >= w-1 {
			out[i-w+1] = sum / float64(w)
		}
	}
	return out
}

// smoothGrid is the loess of values at steps (increasing), evaluated at every
// step from..to-1: weighted by tricube over the window nearest values, locally
// constant (degree 0) or linear (1). With a wide window only about ten places in
// it are fitted and the ones between interpolated, as its authors propose.
func smoothGrid(steps []int, values []float64, from, to, window, degree int) []float64 {
	out := make([]float64, to-from)
	jump := max(1, (window+9)/10)
	for a := from; ; a += jump {
		a = min(a, to-1)
		out[a-from] = loess(steps, values, a, window, degree)
		if a == to-1 {
			break
		}
	}
	for a := from; a+1 < to; a += jump {
		b := min(a+jump, to-1)
		for t := a + 1; t < b; t++ {
			w := float64(t-a) / float64(b-a)
			out[t-from] = (1-w)*out[a-from] + w*out[b-from]
		}
	}
	return out
}

func loess(steps []int, values []float64, at, window, degree int) float64 {
	n := len(steps)
	lo, hi := nearest(steps, at, min(window, n))
	reach := float64(max(at-steps[lo], steps[hi-1]-at))
	if window > n {
		reach += float64((window - n) / 2)
	}
	reach = math.Max(reach, 1)
	var sw, swd, swdd, swv, swdv float64
	for i := lo; i < hi; i++ {
		d := float64(steps[i] - at)
		u := math.Abs(d) / reach
		w := 1.0
		if u > 0.001 {
			w = 1 - u*u*u
			w = math.Max(w*w*w, 0)
		}
		sw += w
		swd += w * d
		swdd += w * d * d
		swv += w * values[i]
		swdv += w * d * values[i]
	}
	if sw == 0 { // every value stands at the very edge of the window
		return mean(values[lo:hi])
	}
	level := swv / sw
	spread := swdd - swd*swd/sw
	if degree == 0 || spread <= 1e-6*reach*reach*sw {
		return level
	}
	return level - (swdv-swd*level)/spread*swd/sw
}

// nearest is the range of the q steps closest to at.
func nearest(steps []int, at, q int) (lo, hi int) {
	hi = sort.SearchInts(steps, at)
	lo = hi
	for hi-lo < q {
		switch {
		case lo == 0:
			hi++
		case hi == len(steps):
			lo--
		case at-steps[lo-1] <= steps[hi]-at:
			lo--
		default:
			hi++
		}
	}
	return lo, hi
}

func mean(x []float64) float64 {
	sum := 0.0
	for _, v := range x {
		sum += v
	}
	return sum / float64(len(x))
}
