package series

import (
	"fmt"

	"lagwise/stats/distribution"
)

// Portmanteau is a joint test of the first autocorrelations. Null hypothesis:
// the values are independent of each other at every lag tested.
type Portmanteau struct {
	Statistic float64
	P         float64 // upper tail of chi-squared with DF degrees of freedom
	Lags      int     // lags with at least one pair of values
	DF        int     // Lags less the fitted parameters
	N         int
}

// LjungBox is the test of Ljung & Box 1978,
//
//	Q = n (n + 2) sum over k = 1..lags of r(k)^2 / n(k)
//
// where n(k) is the number of pairs k steps apart: n - k without gaps, and the
// pairs inside the runs with gaps (Stoffer & Toloi 1992). fitted is the number
// of autoregressive and moving-average parameters estimated when the values are
// residuals; it is taken off the degrees of freedom. Lags at which the gaps leave
// no pair are not counted. Chi-squared is a large-sample law: best with n well
// above the number of lags.
//
// The error is *stats.Undefined: NotFinite, Constant, or TooShort (not more than
// lags values, or no degree of freedom left). It panics on negative arguments.
func LjungBox(r Runs, lags, fitted int) (Portmanteau, error) {
	n := float64(r.N())
	return portmanteau("Ljung-Box test", r, lags, fitted, func(rho, pairs float64) float64 {
		return n * (n + 2) * rho * rho / pairs
	})
}

// BoxPierce is the test of Box & Pierce 1970, Q = n sum r(k)^2; the rest is as
// for LjungBox, which holds its level better in small samples.
func BoxPierce(r Runs, lags, fitted int) (Portmanteau, error) {
	n := float64(r.N())
	return portmanteau("Box-Pierce test", r, lags, fitted, func(rho, _ float64) float64 {
		return n * rho * rho
	})
}

func portmanteau(what string, r Runs, lags, fitted int, term func(rho, pairs float64) float64) (Portmanteau, error) {
	if lags < 0 || fitted < 0 {
		panic(fmt.Sprintf("series: %s with %d lags and %d fitted parameters", what, lags, fitted))
	}
	p := Portmanteau{N: r.N()}
	if lags <= fitted {
		return p, tooShort(what, p.N, 0, fmt.Sprintf("%d lags leave no degree of freedom beside %d fitted parameters", lags, fitted))
	}
	rho, err := Autocorrelations(r, lags)
	if err != nil {
		return p, err
	}
	for k := 1; k <= lags; k++ {
		if pairs := r.Pairs(k); pairs > 0 {
			p.Lags++
			p.Statistic += term(rho[k-1], float64(pairs))
		}
	}
	p.DF = p.Lags - fitted
	if p.DF < 1 {
		return p, tooShort(what, p.N, 0, fmt.Sprintf("the gaps leave pairs at %d of %d lags", p.Lags, lags))
	}
	p.P = distribution.ChiSquareUpper(p.Statistic, float64(p.DF))
	return p, nil
}
