package distribution

import (
	"math"
	"testing"
)

func close(t *testing.T, what string, got, want, relative float64) {
	t.Helper()
	if !(math.Abs(got-want) <= relative*math.Abs(want)) {
		t.Errorf("%s: got %.17g, want %.17g", what, got, want)
	}
}

// Closed forms: t with 1 and 2 df, F with 2 df above, chi-square with 2 df
// (Johnson, Kotz & Balakrishnan 1994, 1995).
func TestTailsAgainstClosedForms(t *testing.T) {
	for _, v := range []float64{1e-8, 0.3, 1, 2.5, 40, 1e6, 1e120} {
		close(t, "t, 1 df", TTwoSided(v, 1), 2/math.Pi*math.Atan(1/v), 1e-13)
		if v < 1e100 {
			root := math.Sqrt(2 + v*v)
			close(t, "t, 2 df", TTwoSided(-v, 2), 2/(root*(root+v)), 1e-13)
			close(t, "F, 2 and 7 df", FUpper(v, 2, 7), math.Pow(1+2*v/7, -3.5), 1e-13)
		}
	}
	for _, v := range []float64{0.1, 3, 50, 900} {
		close(t, "chi-square, 2 df", ChiSquareUpper(v, 2), math.Exp(-v/2), 1e-12)
		close(t, "chi-square, 1 df", ChiSquareUpper(v, 1), NormalTwoSided(math.Sqrt(v)), 1e-12)
	}
	close(t, "F(1, n) is t squared", FUpper(6.25, 1, 83.5), TTwoSided(2.5, 83.5), 1e-13)
	close(t, "many df: normal", TTwoSided(3, 1e8), NormalTwoSided(3), 1e-6)
}

// Percentage points printed in every statistics handbook
// (Abramowitz & Stegun 1964, tables 26.1, 26.8, 26.10, from memory).
func TestPercentagePoints(t *testing.T) {
	close(t, "t(10) 97.5 %", TQuantile(0.975, 10), 2.228, 3e-4)
	close(t, "t(1) 97.5 %", TQuantile(0.975, 1), 12.706, 3e-5)
	close(t, "z 97.5 %", NormalQuantile(0.975), 1.959963984540054, 1e-14)
	close(t, "chi-square(5) 11.070", ChiSquareUpper(11.070, 5), 0.05, 3e-4)
	close(t, "F(3, 20) 3.10", FUpper(3.10, 3, 20), 0.05, 2e-3)
	close(t, "symmetry", TQuantile(0.025, 10), -TQuantile(0.975, 10), 1e-13)
	if TQuantile(0.5, 7) != 0 {
		t.Error("the median of t is not 0")
	}
}

func TestQuantileInvertsTail(t *testing.T) {
	for _, df := range []float64{0.5, 1, 3.7, 30, 1e5} {
		for _, p := range []float64{0.9, 0.975, 0.9995} {
			close(t, "round trip", TTwoSided(TQuantile(p, df), df), 2*(1-p), 1e-11)
		}
	}
}
