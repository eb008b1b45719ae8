package unitroot

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats/series"
)

// KPSSResult is a test of stationarity.
type KPSSResult struct {
	Statistic float64
	P         float64
	Bound     int // -1: p is at most P; +1: at least P; 0: exact by interpolation
	Bandwidth int
	N         int
	Terms     Terms
	Critical  [4]float64 // 10, 5, 2.5, 1 %
}

// Kwiatkowski, Phillips, Schmidt & Shin 1992, J. Econometrics 54:159-178, table 1.
var (
	kpssP     = [4]float64{0.10, 0.05, 0.025, 0.01}
	kpssLevel = [4]float64{0.347, 0.463, 0.574, 0.739}
	kpssTrend = [4]float64{0.119, 0.146, 0.176, 0.216}
)

// KPSS is the test of Kwiatkowski, Phillips, Schmidt & Shin 1992. Null
// hypothesis: stationary around a level (Constant) or a line (Trend).
//
//	eta = n^-2 sum over t of (e[1] + .. + e[t])^2 / s^2(q)
//	s^2(q) = n^-1 [sum e^2 + 2 sum over k = 1..q of (1 - k/(q+1)) sum e[t] e[t+k]]
//
// e are the residuals from the mean or the line, q the bandwidth; below zero it
// is that of Hobijn, Franses & Ooms 2004,
// min(floor(1.1447 (s1/s0)^(2/3) n^(1/3)), n - 1). p is interpolated in the
// 1992 table, with a bound beyond its ends. Gaps: products of e only inside a
// run, all sums divided by all values; the line counts values.
//
// The error is *stats.Undefined: NotFinite; TooShort below three values; Constant
// when nothing moves around the terms. It panics on other terms and when
// bandwidth >= n. The table is a limit: common practice is 20 values and more.
func KPSS(r series.Runs, terms Terms, bandwidth int) (KPSSResult, error) {
	const what = "KPSS test"
	if terms != Constant && terms != Trend {
		panic("unitroot: KPSS with terms " + terms.String())
	}
	n := r.N()
	if n < 3 {
		return KPSSResult{}, tooShort(what, n, 3, "")
	}
	if bandwidth >= n {
		panic(fmt.Sprintf("unitroot: KPSS bandwidth %d with %d values", bandwidth, n))
	}
	e, _, err := scaled(what, r)
	if err != nil {
		return KPSSResult{}, err
	}
	if same(e) {
		return KPSSResult{}, constant(what, n, "")
	}
	out := KPSSResult{Terms: terms, N: n, Bandwidth: bandwidth, Critical: kpssLevel}
	series.Centre(e)
	if terms == Trend {
		takeLineOff(e)
		out.Critical = kpssTrend
	}
	top := largest(e)
	if top <= rounding {
		return KPSSResult{}, constant(what, n, "no movement around the terms")
	}
	floats.Scale(1/top, e) // a small movement on a large offset keeps its squares
	if bandwidth < 0 {
		out.Bandwidth = hobijn(r, e)
	}
	var sum, squares float64
	for _, v := range e {
		sum += v
		squares += sum * sum
	}
	size := float64(n)
	out.Statistic = squares / (size * size) / bartlett(r, e, out.Bandwidth)
	out.P, out.Bound = interpolate(out.Statistic, out.Critical, kpssP)
	return out, nil
}

// bartlett is the long-run variance of e with Bartlett weights. The weighted sum
// of autocovariances equals the sum of squares of all moving sums of q + 1
// neighbours (zeros beyond the ends of a run) over q + 1, so that any bandwidth
// costs one pass.
func bartlett(r series.Runs, e []float64, q int) float64 {
	total, start := 0.0, 0
	for _, run := range r {
		x := e[start : start+len(run)]
		start += len(run)
		sum := 0.0
		head := min(len(x), q+1)
		for _, v := range x[:head] {
			sum += v
			total += sum * sum
		}
		for t := q + 1; t < len(x); t++ {
			sum += x[t] - x[t-q-1]
			total += sum * sum
		}
		if inside := q + 1 - len(x); inside > 0 { // windows that hold the whole run
			total += float64(inside) * sum * sum
		}
		for t := len(x) - head; t < len(x)-1; t++ {
			sum -= x[t]
			total += sum * sum
		}
	}
	return total / float64(q+1) / float64(len(e))
}

// hobijn is the data-driven bandwidth of Hobijn, Franses & Ooms 2004 for the
// Bartlett kernel.
func hobijn(r series.Runs, e []float64) int {
	n := float64(len(e))
	s0 := floats.Dot(e, e) / n
	s1 := 0.0
	for k := 1; k <= int(math.Pow(n, 2.0/9)); k++ {
		product, start := 0.0, 0
		for _, run := range r {
			x := e[start : start+len(run)]
			start += len(run)
			if len(x) > k {
				product += floats.Dot(x[k:], x[:len(x)-k])
			}
		}
		s0 += 2 * product / n
		s1 += 2 * product / n * float64(k)
	}
	if s0 == 0 {
		return len(e) - 1
	}
	ratio := s1 / s0
	q := 1.1447 * math.Cbrt(ratio*ratio) * math.Cbrt(n)
	return int(math.Min(q, n-1))
}

// interpolate reads p off a table of rising critical values, linearly.
func interpolate(statistic float64, critical, p [4]float64) (float64, int) {
	switch {
	case statistic < critical[0]:
		return p[0], 1
	case statistic > critical[3]:
		return p[3], -1
	}
	i := 1
	for statistic > critical[i] {
		i++
	}
	share := (statistic - critical[i-1]) / (critical[i] - critical[i-1])
	return p[i-1] + share*(p[i]-p[i-1]), 0
}
