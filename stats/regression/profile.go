package regression

import (
	"math"
	"slices"

	"lagwise/stats/distribution"
)

// profile is the interval of partial autocorrelation i in which the likelihood,
// maximised over the other parameters, is within the chi-square bound of its
// maximum.
func (l *likelihood) profile(best point, i int, level float64) [2]float64 {
	z := distribution.NormalQuantile((1 + level) / 2)
	floor := best.value - z*z/2
	return [2]float64{l.crossing(best, i, -1, floor), l.crossing(best, i, 1, floor)}
}

// crossing is the partial autocorrelation, on the given side of the best one,
// where the profile likelihood of parameter i falls through floor; -1 or 1
// when it is above floor there, even if it dips below on the way.
func (l *likelihood) crossing(best point, i int, side, floor float64) float64 {
	if end := l.held(best, i, side*edge); end.value >= floor {
		return side
	}
	inside, outside := best, best
	for step := 0.25; ; step *= 1.5 {
		outside = l.held(inside, i, max(-edge, min(edge, inside.u[i]+side*step)))
		if outside.value < floor {
			break
		}
		if math.Abs(outside.u[i]) >= edge {
			return side
		}
		inside = outside
	}
	return math.Tanh(l.between(inside, outside, i, floor))
}

// held is the best point near another with parameter i at u.
func (l *likelihood) held(near point, i int, u float64) point {
	start := point{slices.Clone(near.u), near.value}
	start.u[i] = u
	return l.climb(start, i)
}

// between is the u of parameter i at which the profile goes through floor, by
// regula falsi in the Illinois form.
func (l *likelihood) between(inside, outside point, i int, floor float64) float64 {
	a, b := inside.u[i], outside.u[i]
	fa, fb := inside.value-floor, outside.value-floor
	side := 0
	for range 100 {
		if math.Abs(math.Tanh(a)-math.Tanh(b)) < 1e-9 {
			break
		}
		u := (a*fb - b*fa) / (fb - fa)
		if math.IsInf(fb, -1) || !(min(a, b) < u && u < max(a, b)) {
			u = (a + b) / 2
		}
		mid := l.held(inside, i, u)
		if f := mid.value - floor; f >= 0 {
			if side > 0 {
				fb /= 2
			}
			a, fa, inside, side = u, f, mid, 1
		} else {
			if side < 0 {
				fa /= 2
			}
			b, fb, side = u, f, -1
		}
		if math.Abs(mid.value-floor) < 1e-10 {
			return u
		}
	}
	return (a + b) / 2
}
