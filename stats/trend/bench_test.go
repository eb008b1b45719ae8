package trend_test

import (
	"fmt"
	"math/rand/v2"
	"testing"

	"lagwise/stats/trend"
)

func noise(n int, seed uint64) []float64 {
	r := rand.New(rand.NewPCG(seed, 1))
	x := make([]float64, n)
	for t := range x {
		x[t] = r.NormFloat64()
	}
	return x
}

func BenchmarkMannKendall(b *testing.B) {
	for _, n := range []int{1_000, 10_000, 100_000, 1_000_000} {
		x := noise(n, 7)
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			for b.Loop() {
				if _, err := trend.MannKendall(x); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

func BenchmarkTheilSen(b *testing.B) {
	for _, n := range []int{1_000, 10_000, 100_000} {
		x := noise(n, 7)
		t := make([]float64, n)
		for i := range t {
			t[i] = float64(i)
		}
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			for b.Loop() {
				if _, err := trend.TheilSen(t, x, 0.95); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
