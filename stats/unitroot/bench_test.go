package unitroot_test

import (
	"fmt"
	"math/rand/v2"
	"testing"

	"lagwise/stats/series"
	"lagwise/stats/unitroot"
)

// walk is a random walk: invented, for timing and for exact relations only.
func walk(n int, seed uint64) []float64 {
	r := rand.New(rand.NewPCG(seed, 1))
	x := make([]float64, n)
	for t := 1; t < n; t++ {
		x[t] = x[t-1] + r.NormFloat64()
	}
	return x
}

func BenchmarkADF(b *testing.B) {
	for _, n := range []int{1_000, 10_000, 100_000} {
		for _, terms := range []unitroot.Terms{unitroot.Constant, unitroot.Trend} {
			runs := series.Runs{walk(n, 7)}
			b.Run(fmt.Sprintf("AIC/%s/%d", terms, n), func(b *testing.B) {
				for b.Loop() {
					if _, err := unitroot.ADF(runs, terms, unitroot.Lags{Max: -1}); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
}

// The lags of a smooth series are nearly dependent: the route by rows.
func BenchmarkADFByRows(b *testing.B) {
	x := walk(10_000, 7)
	for pass := 0; pass < 2; pass++ {
		for t := 1; t < len(x); t++ {
			x[t] += x[t-1]
		}
	}
	runs := series.Runs{x}
	for b.Loop() {
		if _, err := unitroot.ADF(runs, unitroot.Constant, unitroot.Lags{Max: -1}); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkKPSS(b *testing.B) {
	for _, n := range []int{1_000, 10_000, 100_000} {
		runs := series.Runs{walk(n, 7)}
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			for b.Loop() {
				if _, err := unitroot.KPSS(runs, unitroot.Constant, -1); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
