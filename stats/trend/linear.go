package trend

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
	"lagwise/stats/distribution"
	"lagwise/stats/series"
)

// Slope is a least-squares slope and its t test. Null hypothesis: slope zero.
type Slope struct{ Slope, SE, T, DF, P float64 }

// LinearCosine is the least-squares slope of x on at, in units of x per unit of
// at, with a standard error that allows for autocorrelation and unequal variance:
// the equal-weighted cosine estimator of Lazarus, Lewis, Stock & Watson 2018,
//
//	nu = max(2, floor(0.41 n^(2/3)))
//	L[j] = sqrt(2/n) sum over t of cos(pi j (t - 1/2)/n) (at[t] - mean) e[t], j = 1..nu
//	SE^2 = n (n/(n-2)) (1/nu) sum L[j]^2 / [sum (at - mean)^2]^2
//
// with t on nu degrees of freedom. The order of the values is the time; gaps are
// passed over.
//
// The error is *stats.Undefined: NotFinite; TooShort below five values; Constant
// when the values are equal or lie on a line to rounding, or at does not change.
// It panics when the lengths differ.
func LinearCosine(x []float64, at []float64) (Slope, error) {
	const what = "linear trend"
	if len(x) != len(at) {
		panic(fmt.Sprintf("trend: %d values at %d times", len(x), len(at)))
	}
	n := len(x)
	if n < 5 {
		return Slope{}, tooShort(what, n, 5, "")
	}
	e, exponent, err := series.Scaled(what, x)
	if err != nil {
		return Slope{}, err
	}
	time, timeExponent, err := series.Scaled(what, at)
	if err != nil {
		return Slope{}, err
	}
	series.Centre(e)
	series.Centre(time)
	square := floats.Dot(time, time)
	if floats.Norm(time, math.Inf(1)) <= 0x1p-50 {
		return Slope{}, &stats.Undefined{What: what, Reason: stats.Constant, N: n, Detail: "all values are at one time"}
	}
	slope := floats.Dot(time, e) / square
	floats.AddScaled(e, -slope, time)
	rest := floats.Norm(e, math.Inf(1))
	if rest <= 0x1p-50 {
		return Slope{}, &stats.Undefined{What: what, Reason: stats.Constant, N: n, Detail: "every value lies on one line"}
	}
	floats.Scale(1/rest, e)
	floats.Mul(e, time)
	size := float64(n)
	nu := int(math.Max(2, math.Floor(0.41*math.Pow(size, 2.0/3))))
	variance := size / (size - 2) * cosineVariance(e, nu)
	se := math.Sqrt(size*variance) * rest / square
	out := Slope{Slope: math.Ldexp(slope, exponent-timeExponent), SE: math.Ldexp(se, exponent-timeExponent), T: slope / se, DF: float64(nu)}
	out.P = distribution.TTwoSided(out.T, out.DF)
	if math.IsInf(out.Slope, 0) || math.IsInf(out.T, 0) || math.IsNaN(out.T) {
		return Slope{}, &stats.Undefined{What: what, Reason: stats.NotFinite, N: n, Detail: "the slope is beyond the largest floating-point number"}
	}
	return out, nil
}

// cosineVariance is the mean of the first nu squared cosine coefficients of v.
func cosineVariance(v []float64, nu int) float64 {
	sums := series.CosineSums(v, nu)
	return 2 / float64(len(v)) * floats.Dot(sums, sums) / float64(nu)
}
