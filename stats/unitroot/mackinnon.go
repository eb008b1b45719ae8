package unitroot

import (
	"fmt"
	"math"

	"lagwise/stats/distribution"
)

// MacKinnonP is the asymptotic p-value of a Dickey-Fuller tau (n = 1) or of an
// Engle-Granger tau of n series, n = 1..6: Phi(b0 + b1 tau + b2 tau^2 [+ b3
// tau^3]), 0 or 1 beyond the range of the approximation. Null hypothesis: a unit
// root (no cointegration). It panics for another n, for unknown terms and for
// NaN. Source: MacKinnon 1994.
func MacKinnonP(tau float64, terms Terms, n int) float64 {
	terms.check()
	if n < 1 || n > 6 || math.IsNaN(tau) {
		panic(fmt.Sprintf("unitroot: p of tau %v for %d series", tau, n))
	}
	s := pSurfaces[terms][n-1]
	var z float64
	switch {
	case tau > s.max:
		return 1
	case tau < s.min:
		return 0
	case tau <= s.star:
		z = s.small[0] + tau*(s.small[1]+tau*s.small[2])
	default:
		z = s.large[0] + tau*(s.large[1]+tau*(s.large[2]+tau*s.large[3]))
	}
	return distribution.NormalUpper(-z)
}

// MacKinnonCritical are the 1, 5 and 10 % critical values of tau for n series
// and a final regression of the given number of rows, b0 + b1/rows + b2/rows^2 +
// b3/rows^3; rows <= 0 asks for the limit. Without terms only n = 1 is
// tabulated. The error says what is not. Source: MacKinnon 2010.
func MacKinnonCritical(terms Terms, n, rows int) ([3]float64, error) {
	terms.check()
	table := criticalSurfaces[terms]
	if n < 1 || n > len(table) {
		return [3]float64{}, fmt.Errorf("critical values of MacKinnon 2010 with terms %q are tabulated for 1 to %d series, not for %d", terms, len(table), n)
	}
	inverse := 0.0
	if rows > 0 {
		inverse = 1 / float64(rows)
	}
	var out [3]float64
	for i, b := range table[n-1] {
		out[i] = b[0] + inverse*(b[1]+inverse*(b[2]+inverse*b[3]))
	}
	return out, nil
}

// FullerCritical are the 1, 5 and 10 % points of the Dickey-Fuller tau from
// Fuller's 1976 table: the row of the smallest tabulated size above n, the length
// of the differenced series (25, 50, 100, 250, 500, limit). They are what older
// reports quote; MacKinnonCritical is finer. A quadratic trend is not tabulated,
// which is the error.
func FullerCritical(terms Terms, n int) ([3]float64, error) {
	terms.check()
	if terms == QuadraticTrend {
		return [3]float64{}, fmt.Errorf("Fuller's table has no quadratic trend; use MacKinnonCritical")
	}
	for i, size := range fullerSizes {
		if float64(n) < size {
			return fuller[terms][i], nil
		}
	}
	return fuller[terms][len(fullerSizes)-1], nil
}
