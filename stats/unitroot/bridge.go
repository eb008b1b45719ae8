package unitroot

import (
	"math"
	"math/cmplx"
)

// bridgeTail is P(Q > q) for Q the integral over 0..1 of the squared length of a
// p-dimensional Brownian bridge, the sum over k of chi-squared(p) / (pi k)^2
// (p = 1: Cramer-von Mises). Its characteristic function is
// (r / sin r)^(p/2) with r = sqrt(2iu); it is inverted by the integral of
// Gil-Pelaez 1951.
func bridgeTail(q float64, p int) float64 {
	if q <= 0 {
		return 1
	}
	if q > float64(p)+20 {
		return 0 // below 1e-40
	}
	// The integrand dies as exp(-p sqrt(u) / 2); v = sqrt(u) makes it smooth at 0.
	end := 80 / float64(p)
	steps := 400 + int(4*end*end*q)
	steps += steps % 2
	h := end / float64(steps)
	sum := 0.0
	for i := 1; i <= steps; i++ {
		v := float64(i) * h
		weight := 2.0
		if i%2 == 1 {
			weight = 4
		}
		if i == steps {
			weight = 1
		}
		// Simpson; the value at 0 is zero because du = 2 v dv.
		sum += weight * bridgeIntegrand(v, q, p)
	}
	tail := 0.5 + sum*h/3/math.Pi
	return math.Min(1, math.Max(0, tail))
}

// bridgeIntegrand is Im(phi(u) exp(-iuq)) / u du with u = v^2.
func bridgeIntegrand(v, q float64, p int) float64 {
	// r = sqrt(2i) v = (1 + i) v; log sin r written without overflow.
	r := complex(v, v)
	logSin := cmplx.Log((1-cmplx.Exp(2i*r))*complex(0, 0.5)) - 1i*r
	power := complex(float64(p)/2, 0) * (cmplx.Log(r) - logSin)
	u := v * v
	phi := cmplx.Exp(power - complex(0, u*q))
	return imag(phi) * 2 / v
}

// bridgeQuantile is the value that Q exceeds with the given probability.
func bridgeQuantile(tail float64, p int) float64 {
	low, high := 0.0, 1.0
	for bridgeTail(high, p) > tail {
		low, high = high, 2*high
	}
	for high-low > 1e-9*high {
		middle := (low + high) / 2
		if bridgeTail(middle, p) > tail {
			low = middle
		} else {
			high = middle
		}
	}
	return (low + high) / 2
}
