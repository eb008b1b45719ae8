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
	// The integrand dies as (2.8 v)^(p/2) exp(-p v / 2) with v = sqrt(u), which
	// also makes it smooth at 0.
	end := 10 + 50/float64(p)
	steps := 200 + int(end*end*q)
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

// bridge5[p-1] is the 5 % point of Q, solved from bridgeTail. Canova & Hansen 1995
// print them, simulated to two decimals, for p up to 12.
var bridge5 = [2 * mostHarmonics]float64{
	0.4614, 0.7475, 1.0002, 1.2373, 1.4651, 1.6864,
	1.9030, 2.1159, 2.3258, 2.5333, 2.7386, 2.9422,
	3.1442, 3.3448, 3.5442, 3.7425, 3.9397, 4.1361,
	4.3316, 4.5264, 4.7204, 4.9138, 5.1066, 5.2988,
}
