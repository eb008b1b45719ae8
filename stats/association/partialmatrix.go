package association

import (
	"math"

	"gonum.org/v1/gonum/mat"

	"lagwise/stats"
)

// partialFrom is the partial and, for from "first" or "second", the semipartial
// coefficient of rows 0 and 1 of a matrix of coefficients given the others:
// with P the inverse, -P01/sqrt(P00 P11), and that times the root of the share
// of the untouched column that the others leave.
func partialFrom(what string, matrix [][]float64, from string, n int) (partial, own float64, err error) {
	k := len(matrix)
	c := mat.NewDense(k, k, nil)
	for i, row := range matrix {
		c.SetRow(i, row)
	}
	var p mat.Dense
	if p.Inverse(c) != nil || !(p.At(0, 0) > 0 && p.At(1, 1) > 0) {
		return 0, 0, &stats.Undefined{What: what, Reason: stats.Singular, N: n,
			Detail: "the coefficients of the series have no inverse"}
	}
	partial = clamp(-p.At(0, 1) / math.Sqrt(p.At(0, 0)*p.At(1, 1)))
	switch from {
	case "first":
		return partial, clamp(partial * leftOf(&p, 1, 0)), nil
	case "second":
		return partial, clamp(partial * leftOf(&p, 0, 1)), nil
	}
	return partial, partial, nil
}

// leftOf is the root of the share of column i, whole, that the columns after
// the pair leave, from the inverse p in which column j of the pair stands too.
func leftOf(p *mat.Dense, i, j int) float64 {
	det := p.At(i, i) - p.At(i, j)*p.At(j, i)/p.At(j, j)
	return 1 / math.Sqrt(max(det, 1))
}

func clamp(r float64) float64 { return max(-1, min(1, r)) }
