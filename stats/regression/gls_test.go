package regression

import (
	"math"
	"math/rand/v2"
	"testing"
)

func TestGradientAgainstDifferences(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 8))
	n := 40
	y, x := make([]float64, n), make([]float64, n)
	for i := range y {
		x[i] = r.NormFloat64()
		y[i] = 2 + x[i] + r.NormFloat64()
		if i > 0 {
			y[i] += 0.5 * y[i-1]
		}
	}
	d := Design{Y: y, X: [][]float64{x}, Runs: []int{2, 5, 22, n}}
	b, err := newBasis("test", d)
	if err != nil {
		t.Fatal(err)
	}
	for order := 1; order <= 4; order++ {
		for _, reml := range []bool{false, true} {
			l := newLikelihood(b, d.Runs, order, reml)
			u := []float64{0.7, -0.4, 0.3, 0.2}[:order]
			g := l.gradientAt(u)
			for v := range u {
				const h = 1e-5
				up, down := append([]float64(nil), u...), append([]float64(nil), u...)
				up[v] += h
				down[v] -= h
				want := (l.value(up) - l.value(down)) / (2 * h)
				if math.Abs(g[v]-want) > 1e-6*(1+math.Abs(want)) {
					t.Errorf("order %d, reml %v, parameter %d: gradient %v, differences %v", order, reml, v, g[v], want)
				}
			}
		}
	}
}
