package series

import (
	"math"
	"math/rand/v2"
	"testing"
)

// The Fourier route gives the sums of the definition, also for prime lengths.
func TestCosineSumsAreTheirDefinition(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 4))
	for _, n := range []int{2, 3, 64, 97, 1000, 1009} {
		v := make([]float64, n)
		norm := 0.0
		for i := range v {
			v[i] = r.NormFloat64()
			norm += math.Abs(v[i])
		}
		nu := min(n-1, 60)
		want, got := cosinesDirect(v, nu), cosinesByChirp(v, nu)
		for j := range want {
			if math.Abs(got[j]-want[j]) > 1e-13*norm {
				t.Errorf("n %d, j %d: got %v, want %v", n, j+1, got[j], want[j])
			}
		}
	}
}

// Cross products give the autoregression that the rows themselves give.
func TestLongAutoregressionsAgree(t *testing.T) {
	r := rand.New(rand.NewPCG(5, 6))
	n := manyRows + 500
	x, at := make([]float64, n), make([]int, n)
	for i := range x {
		at[i] = i
		x[i] = 1e6 + r.NormFloat64()
		if i > 1 {
			x[i] += 0.6*(x[i-1]-1e6) - 0.3*(x[i-2]-1e6)
		}
	}
	got, err := FitAR(x, at, []int{n}, false, 0)
	if err != nil {
		t.Fatal(err)
	}
	c := append([]float64(nil), x...)
	Centre(c)
	a := autoregression{x: c, at: at, before: predecessors(n, []int{n})}
	e := a.equation(got.Order)
	want, err := backSubstitute(triangle(e.columns), got.Order)
	if err != nil || got.Order < 2 {
		t.Fatal(got.Order, err)
	}
	for j := range want {
		if math.Abs(got.Coefficients[j]-want[j]) > 1e-10 {
			t.Errorf("lag %d: %v, want %v", j+1, got.Coefficients[j], want[j])
		}
	}
}
