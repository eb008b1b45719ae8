// Package distribution holds the tail areas and quantiles of the normal, t,
// chi-square and F distributions. Every tail is computed as a tail, never as
// one minus the other side, so a p of 1e-200 has as many right digits as a p
// of 0.2.
package distribution

import (
	"math"

	"gonum.org/v1/gonum/mathext"
)

// NormalUpper is P(Z > z) of a standard normal Z.
func NormalUpper(z float64) float64 { return math.Erfc(z/math.Sqrt2) / 2 }

// NormalTwoSided is P(|Z| > |z|) of a standard normal Z.
func NormalTwoSided(z float64) float64 { return math.Erfc(math.Abs(z) / math.Sqrt2) }

// NormalQuantile is the z with P(Z <= z) = p, 0 < p < 1.
func NormalQuantile(p float64) float64 { return -math.Sqrt2 * math.Erfcinv(2*p) }

// TTwoSided is P(|T| > |t|) of Student's t with df > 0 degrees of freedom,
// whole or not: the regularised incomplete beta function at df/(df + t^2).
func TTwoSided(t, df float64) float64 {
	t2 := t * t
	if math.IsInf(t2, 1) {
		return 0
	}
	return betaTail(df/2, 0.5, df/(df+t2), t2/(df+t2))
}

// TQuantile is the t with P(T <= t) = p of Student's t with df > 0.
func TQuantile(p, df float64) float64 {
	if p == 0.5 {
		return 0
	}
	tail := 2 * math.Min(p, 1-p)
	t := tFromTwoSided(tail, df)
	if p < 0.5 {
		return -t
	}
	return t
}

// tFromTwoSided solves TTwoSided(t, df) = tail for t > 0 by bisection on
// log t: fifty halvings of a bracket and no starting value to go wrong.
func tFromTwoSided(tail, df float64) float64 {
	lo, hi := -40.0, 300.0
	for i := 0; i < 200 && hi-lo > 1e-15*math.Max(1, math.Abs(lo)); i++ {
		mid := lo + (hi-lo)/2
		if TTwoSided(math.Exp(mid), df) > tail {
			lo = mid
		} else {
			hi = mid
		}
	}
	return math.Exp(lo + (hi-lo)/2)
}

// ChiSquareUpper is P(X > x) of a chi-square with df > 0.
func ChiSquareUpper(x, df float64) float64 {
	if x <= 0 {
		return 1
	}
	return mathext.GammaIncRegComp(df/2, x/2)
}

// FUpper is P(F > f) of Fisher's F with df1 and df2 > 0.
func FUpper(f, df1, df2 float64) float64 {
	if f <= 0 {
		return 1
	}
	if math.IsInf(f, 1) {
		return 0
	}
	return betaTail(df2/2, df1/2, df2/(df2+df1*f), df1*f/(df2+df1*f))
}

// betaTail is the regularised incomplete beta function I_x(a, b), given both
// x and y = 1 - x so that neither loses digits to the other.
func betaTail(a, b, x, y float64) float64 {
	if x <= 0 {
		return 0
	}
	if y <= 0 {
		return 1
	}
	if x > (a+1)/(a+b+2) {
		return 1 - betaFraction(b, a, y, x)
	}
	return betaFraction(a, b, x, y)
}

// betaFraction evaluates I_x(a, b) by its continued fraction (Abramowitz &
// Stegun 1964, 26.5.8) with the modified Lentz method; it converges quickly
// for x < (a+1)/(a+b+2).
func betaFraction(a, b, x, y float64) float64 {
	const tiny = 1e-300
	c, d := 1.0, 1/lift(1-(a+b)*x/(a+1), tiny)
	f := d
	for m := 1.0; m < 1e5; m++ {
		even := m * (b - m) * x / ((a + 2*m - 1) * (a + 2*m))
		d = 1 / lift(1+even*d, tiny)
		c = lift(1+even/c, tiny)
		f *= c * d
		odd := -(a + m) * (a + b + m) * x / ((a + 2*m) * (a + 2*m + 1))
		d = 1 / lift(1+odd*d, tiny)
		c = lift(1+odd/c, tiny)
		f *= c * d
		if math.Abs(c*d-1) < 2e-16 {
			break
		}
	}
	return f * math.Exp(a*logComplement(x, y)+b*logComplement(y, x)-mathext.Lbeta(a, b)) / a
}

// lift keeps a divisor of the continued fraction away from zero.
func lift(v, tiny float64) float64 {
	if math.Abs(v) < tiny {
		return tiny
	}
	return v
}

// logComplement is log v, given w = 1 - v, from whichever has the digits.
func logComplement(v, w float64) float64 {
	if w < 0.5 {
		return math.Log1p(-w)
	}
	return math.Log(v)
}
