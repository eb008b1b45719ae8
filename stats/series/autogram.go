package series

import (
	"math"

	"gonum.org/v1/gonum/floats"
)

// leastPivot is the smallest pivot, relative to its diagonal, at which cross
// products keep enough digits: the error is about 5e-15 over the pivot.
const leastPivot = 1e-6

// lagGram holds the cross products of the lags 1..p and, last, of the values
// themselves, the mean of each column taken off, over the rows p..n-1 of one
// run. It costs p + 1 products of the whole series: each further row follows
// from the one before it by one step.
func lagGram(x []float64, p int) [][]float64 {
	n := len(x)
	rows := float64(n - p)
	raw := make([][]float64, p+1) // by lag 0..p
	for i := range raw {
		raw[i] = make([]float64, p+1)
	}
	sums := make([]float64, p+1)
	for i := range sums {
		sums[i] = floats.Sum(x[p-i : n-i])
		raw[0][i] = floats.Dot(x[p:], x[p-i:n-i])
	}
	for i := 1; i <= p; i++ {
		raw[i][0] = raw[0][i]
		for j := 1; j <= p; j++ {
			raw[i][j] = raw[i-1][j-1] + x[p-i]*x[p-j] - x[n-i]*x[n-j]
		}
	}
	gram := make([][]float64, p+1)
	for i := range gram {
		gram[i] = make([]float64, p+1)
		for j := range gram[i] {
			a, b := (i+1)%(p+1), (j+1)%(p+1) // the values, lag 0, come last
			gram[i][j] = raw[a][b] - sums[a]*sums[b]/rows
		}
	}
	return gram
}

// factor is the upper triangle of the Cholesky decomposition of a Gram matrix,
// nil when a pivot but the last is too small for it.
func factor(gram [][]float64) [][]float64 {
	n := len(gram)
	r := make([][]float64, n)
	for i := range r {
		r[i] = make([]float64, n)
		pivot := gram[i][i]
		for k := 0; k < i; k++ {
			pivot -= r[k][i] * r[k][i]
		}
		if i < n-1 && !(pivot > leastPivot*gram[i][i]) || !(pivot > 0) {
			return nil
		}
		r[i][i] = math.Sqrt(pivot)
		for j := i + 1; j < n; j++ {
			v := gram[i][j]
			for k := 0; k < i; k++ {
				v -= r[k][i] * r[k][j]
			}
			r[i][j] = v / r[i][i]
		}
	}
	return r
}
