package residual

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
	"lagwise/stats/distribution"
)

// ShapiroWilk tests that independent values are normal. W is the squared
// correlation of the ordered values with (approximately) their expected normal
// order statistics; p comes from a normal approximation to a transform of
// 1 - W, exact for n = 3. Ties are allowed, and lower W. For n from 3 to 5000.
//
// The error is *stats.Undefined: TooShort below 3 values, NotFinite, or Constant;
// above 5000 values it is TooLong.
//
// Sources: Shapiro & Wilk 1965; Royston 1982, 1992, 1995 (AS R94).
func ShapiroWilk(x []float64) (w, p float64, err error) {
	const what = "Shapiro-Wilk test"
	n := len(x)
	if n < 3 {
		return 0, 0, &stats.Undefined{What: what, Reason: stats.TooShort, N: n, Need: 3}
	}
	if n > 5000 {
		return 0, 0, &stats.Undefined{What: what, Reason: TooLong, N: n, Detail: "its p is known up to 5000 values"}
	}
	for _, v := range x {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return 0, 0, &stats.Undefined{What: what, Reason: stats.NotFinite, N: n}
		}
	}
	z := standardised(x)
	slices.Sort(z)
	if z[n-1]-z[0] == 0 || slices.Max(x)-slices.Min(x) <= 64*0x1p-52*floats.Norm(x, math.Inf(1)) {
		return 0, 0, &stats.Undefined{What: what, Reason: stats.Constant, N: n}
	}
	left := departure(z, shapiroWeights(n))
	return 1 - left, shapiroP(left, n), nil
}

// TooLong is the reason when a statistic's distribution is not known for so
// many values.
const TooLong stats.Reason = "too many values"

// shapiroWeights are the n coefficients of the ordered values, antisymmetric
// and of length one: Royston's polynomials for the outer one or two, expected
// normal order statistics (Blom) for the others.
func shapiroWeights(n int) []float64 {
	if n == 3 {
		return []float64{-math.Sqrt2 / 2, 0, math.Sqrt2 / 2}
	}
	m := make([]float64, n)
	for i := range m {
		m[i] = distribution.NormalQuantile((float64(i+1) - 0.375) / (float64(n) + 0.25))
	}
	squares := floats.Dot(m, m)
	u := 1 / math.Sqrt(float64(n))
	last := polynomial(u, m[n-1]/math.Sqrt(squares), 0.221157, -0.147981, -2.071190, 4.434685, -2.706056)
	outer := 1
	rest, taken := squares-2*m[n-1]*m[n-1], 2*last*last
	a := make([]float64, n)
	if n > 5 {
		next := polynomial(u, m[n-2]/math.Sqrt(squares), 0.042981, -0.293762, -1.752461, 5.682633, -3.582633)
		outer = 2
		rest -= 2 * m[n-2] * m[n-2]
		taken += 2 * next * next
		a[n-2], a[1] = next, -next
	}
	a[n-1], a[0] = last, -last
	scale := math.Sqrt((1 - taken) / rest)
	for i := outer; i < n-outer; i++ {
		a[i] = m[i] * scale
	}
	return a
}

// polynomial is c0 + c1 u + c2 u^2 + …
func polynomial(u float64, c ...float64) float64 {
	var s float64
	for i := len(c) - 1; i >= 0; i-- {
		s = s*u + c[i]
	}
	return s
}

// departure is 1 - W, without the cancellation of that difference.
func departure(sorted, a []float64) float64 {
	u, v := append([]float64(nil), sorted...), append([]float64(nil), a...)
	for _, s := range [][]float64{u, v} {
		floats.AddConst(-floats.Sum(s)/float64(len(s)), s)
		floats.Scale(1/floats.Norm(s, 2), s)
	}
	var below, above float64
	for i := range u {
		below += (u[i] - v[i]) * (u[i] - v[i])
		above += (u[i] + v[i]) * (u[i] + v[i])
	}
	return below / 2 * (above / 2)
}

// shapiroP is the upper tail of the transform of 1 - W.
func shapiroP(left float64, n int) float64 {
	if n == 3 {
		p := 6 / math.Pi * (math.Asin(math.Sqrt(1-left)) - math.Asin(math.Sqrt(0.75)))
		return max(0, min(1, p))
	}
	y := math.Log(max(left, 1e-300))
	x := float64(n)
	var mean, sd float64
	if n <= 11 {
		gamma := -2.273 + 0.459*x
		if y >= gamma {
			return 1e-99
		}
		y = -math.Log(gamma - y)
		mean = polynomial(x, 0.5440, -0.39978, 0.025054, -6.714e-4)
		sd = math.Exp(polynomial(x, 1.3822, -0.77857, 0.062767, -0.0020322))
	} else {
		l := math.Log(x)
		mean = polynomial(l, -1.5861, -0.31082, -0.083751, 0.0038915)
		sd = math.Exp(polynomial(l, -0.4803, -0.082676, 0.0030302))
	}
	return distribution.NormalUpper((y - mean) / sd)
}
