package residual

import (
	"math"
	"math/cmplx"

	"gonum.org/v1/gonum/floats"
)

// tails are P(Q <= 0) and P(Q > 0) of Q = sum of mu_i times independent
// chi-squares with one degree of freedom, each with its own digits where it is
// the smaller one. The inversion integral
//
//	P(Q <= 0) = (1/2 pi i) int exp(K(s))/(-s) ds,  K(s) = -sum log(1 - 2 s mu)/2
//
// runs along the line Re s = c < 0 on which the integrand is smallest at its
// middle, where nothing cancels (Rice 1980, SIAM J. Sci. Stat. Comput. 1:438); for
// the upper tail the signs of mu change. ok is false without eigenvalues.
func tails(mu []float64) (below, above float64, ok bool) {
	if len(mu) == 0 {
		return 0, 0, false
	}
	if floats.Min(mu) >= 0 {
		return 0, 1, true
	}
	if floats.Max(mu) <= 0 {
		return 1, 0, true
	}
	if floats.Sum(mu) > 0 {
		below = lowerTail(mu)
		return below, 1 - below, true
	}
	turned := make([]float64, len(mu))
	floats.ScaleTo(turned, -1, mu)
	above = lowerTail(turned)
	return 1 - above, above, true
}

// lowerTail is P(Q <= 0), for values of both signs.
func lowerTail(mu []float64) float64 {
	c, width := saddle(mu)
	const step = 0.02
	var sum float64
	for v := 0.0; v < 400; v += step {
		u := width * math.Sinh(v)
		s := complex(c, u)
		f := real(cmplx.Exp(cumulant(mu, s))/-s) * width * math.Cosh(v)
		if v == 0 {
			f /= 2
		}
		sum += f
		if v > 1 && math.Abs(f) < 1e-18*math.Abs(sum) {
			break
		}
	}
	return max(0, min(1, sum*step/math.Pi))
}

func cumulant(mu []float64, s complex128) complex128 {
	var k complex128
	for _, m := range mu {
		k -= cmplx.Log(1 - 2*s*complex(m, 0))
	}
	return k / 2
}

// saddle is the c < 0 with the smallest exp(K(c))/-c, found by bisection on
// the derivative, and the width of the peak there.
func saddle(mu []float64) (c, width float64) {
	lo, hi := 1/(2*floats.Min(mu)), 0.0
	edge := lo
	slope := func(s float64) (first, second float64) {
		first, second = -1/s, 1/(s*s)
		for _, m := range mu {
			r := m / (1 - 2*s*m)
			first += r
			second += 2 * r * r
		}
		return first, second
	}
	for range 200 {
		c = (lo + hi) / 2
		if c == lo || c == hi {
			break
		}
		if first, _ := slope(c); first < 0 {
			lo = c
		} else {
			hi = c
		}
	}
	_, second := slope(c)
	return c, min(1/math.Sqrt(second), -c, c-edge)
}
