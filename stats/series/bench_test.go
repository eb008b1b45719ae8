package series_test

import (
	"fmt"
	"math/rand/v2"
	"testing"

	"lagwise/stats/series"
)

func BenchmarkSeries(b *testing.B) {
	for _, n := range []int{1_000, 10_000, 100_000} {
		r := rand.New(rand.NewPCG(1, 2))
		x, at := make([]float64, n), make([]int, n)
		for i := range x {
			x[i], at[i] = r.NormFloat64(), i
		}
		runs := series.Runs{x}
		for name, call := range map[string]func() error{
			"Autocorrelations40": func() error { _, err := series.Autocorrelations(runs, 40); return err },
			"FitAR":              func() error { _, err := series.FitAR(x, at, []int{n}, true, 12); return err },
			"SeasonalStrength":   func() error { _, err := series.SeasonalStrength(x, at, 12); return err },
			"SeasonalF":          func() error { _, err := series.SeasonalF(x, at, 12); return err },
		} {
			b.Run(fmt.Sprintf("%s/%d", name, n), func(b *testing.B) {
				for b.Loop() {
					if err := call(); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
}
