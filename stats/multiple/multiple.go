// Package multiple adjusts p values for the number of tests in a family.
//
// Every function takes the p values of a family, in any order, and returns the
// adjusted ones in the same order; the input is not modified. An adjusted p is
// the smallest level at which its test would be rejected. A p outside 0..1
// panics: it is no result of a test.
package multiple

import (
	"fmt"
	"slices"
)

// Bonferroni is min(1, m p): the chance of any false rejection, whatever the
// dependence (Dunn 1961).
func Bonferroni(p []float64) []float64 {
	return stepDown(p, func(int) float64 { return float64(len(p)) })
}

// Holm is the step-down form, max over j <= i of min(1, (m - j + 1) p(j)), at
// least as powerful as Bonferroni under any dependence (Holm 1979).
func Holm(p []float64) []float64 {
	return stepDown(p, func(i int) float64 { return float64(len(p) - i) })
}

// Hochberg is the step-up form of Holm, min over j >= i of (m - j + 1) p(j); it
// needs independent or positively dependent tests (Hochberg 1988).
func Hochberg(p []float64) []float64 {
	return stepUp(p, func(i int) float64 { return float64(len(p) - i) })
}

// BenjaminiHochberg bounds the expected share of false rejections among all
// rejections, min over j >= i of m p(j)/j, for independent or positively
// dependent tests (Benjamini & Hochberg 1995).
func BenjaminiHochberg(p []float64) []float64 {
	return stepUp(p, func(i int) float64 { return float64(len(p)) / float64(i+1) })
}

// BenjaminiYekutieli is the same under any dependence: times the sum of 1/j,
// j = 1..m (Benjamini & Yekutieli 2001).
func BenjaminiYekutieli(p []float64) []float64 {
	var harmonic float64
	for j := range p {
		harmonic += 1 / float64(j+1)
	}
	return stepUp(p, func(i int) float64 { return harmonic * float64(len(p)) / float64(i+1) })
}

// stepDown goes from the smallest p upwards, never falling; factor is by rank
// from 0.
func stepDown(p []float64, factor func(rank int) float64) []float64 {
	out := make([]float64, len(p))
	least := 0.0
	for rank, i := range ordered(p) {
		least = max(least, min(1, factor(rank)*p[i]))
		out[i] = least
	}
	return out
}

// stepUp goes from the largest p downwards, never rising.
func stepUp(p []float64, factor func(rank int) float64) []float64 {
	out := make([]float64, len(p))
	most := 1.0
	order := ordered(p)
	for rank := len(order) - 1; rank >= 0; rank-- {
		most = min(most, factor(rank)*p[order[rank]])
		out[order[rank]] = most
	}
	return out
}

func ordered(p []float64) []int {
	order := make([]int, len(p))
	for i, v := range p {
		if !(v >= 0 && v <= 1) {
			panic(fmt.Sprintf("multiple: p = %v", v))
		}
		order[i] = i
	}
	slices.SortStableFunc(order, func(a, b int) int {
		switch {
		case p[a] < p[b]:
			return -1
		case p[a] > p[b]:
			return 1
		}
		return 0
	})
	return order
}
