// Package normality tests whether the values of one series are normal.
package normality

import (
	"math"
	"slices"

	"lagwise/stats"
	"lagwise/stats/distribution"
	"lagwise/stats/series"
)

// JarqueBeraResult is a test of normality by the moments.
type JarqueBeraResult struct {
	Statistic, P       float64
	DF                 int
	Skewness, Kurtosis float64
	N                  int
}

// JarqueBera is n/6 (skewness^2 + (kurtosis - 3)^2 / 4), with p from chi-squared
// with 2 degrees of freedom (Jarque & Bera 1980). Null hypothesis: independent
// normal values. A large-sample test: below some 100 values p is rough. The error
// is that of series.Describe.
func JarqueBera(x []float64) (JarqueBeraResult, error) {
	m, err := series.Describe(x)
	if err != nil {
		return JarqueBeraResult{}, err
	}
	excess := m.Kurtosis - 3
	out := JarqueBeraResult{DF: 2, Skewness: m.Skewness, Kurtosis: m.Kurtosis, N: m.N}
	out.Statistic = float64(m.N) / 6 * (m.Skewness*m.Skewness + excess*excess/4)
	out.P = math.Exp(-out.Statistic / 2)
	return out, nil
}

// AndersonDarling is the test of normality with mean and standard deviation
// estimated,
//
//	A = -n - (1/n) sum (2i - 1) [log Phi(z_i) + log(1 - Phi(z_(n+1-i)))]
//
// over the sorted standardised values z, with p from Stephens 1986 (table 4.9) on
// A (1 + 0.75/n + 2.25/n^2). Null hypothesis: independent normal values. The
// error is *stats.Undefined: that of series.Describe, or TooShort below 8 values.
func AndersonDarling(x []float64) (a, p float64, err error) {
	m, err := series.Describe(x)
	if err != nil {
		return 0, 0, err
	}
	if m.N < 8 {
		return 0, 0, &stats.Undefined{What: "Anderson-Darling test", Reason: stats.TooShort, N: m.N, Need: 8}
	}
	n := float64(m.N)
	z := slices.Clone(x)
	slices.Sort(z)
	for i := range z {
		z[i] = z[i]/m.SD - m.Mean/m.SD
	}
	sum := 0.0
	for i, v := range z {
		sum += float64(2*i+1) * (logCDF(v) + logCDF(-z[len(z)-1-i]))
	}
	a = -n - sum/n
	return a, stephens(a * (1 + 0.75/n + 2.25/n/n)), nil
}

// logCDF is log Phi(z), without underflow far below zero.
func logCDF(z float64) float64 {
	if z > -30 {
		return math.Log(distribution.NormalUpper(-z))
	}
	return -z*z/2 - math.Log(-z) - math.Log(2*math.Pi)/2 - 1/(z*z)
}

func stephens(a float64) float64 {
	switch {
	case a < 0.2:
		return 1 - math.Exp(-13.436+101.14*a-223.73*a*a)
	case a < 0.34:
		return 1 - math.Exp(-8.318+42.796*a-59.938*a*a)
	case a < 0.6:
		return math.Exp(0.9177 - 4.279*a - 1.38*a*a)
	case a < 10:
		return math.Exp(1.2937 - 5.709*a + 0.0186*a*a)
	}
	return 3.7e-24 // at most
}
