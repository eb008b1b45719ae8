package unitroot

import (
	"math"
	"testing"
)

// The 5 % points of Canova & Hansen 1995, table 1 (after Nyblom 1989), from
// memory. They were simulated, and differ from the exact law by up to 0.018.
func TestBridgeTable(t *testing.T) {
	for i, want := range []float64{.470, .749, 1.01, 1.24, 1.47, 1.68, 1.90, 2.11, 2.32, 2.54, 2.75, 2.96} {
		if got := bridge5[i]; math.Abs(got-want) > 0.019 {
			t.Errorf("%d degrees of freedom: %v, table %v", i+1, got, want)
		}
	}
	for i, q := range bridge5 {
		if p := bridgeTail(q, i+1); math.Abs(p-0.05) > 5e-5 {
			t.Errorf("%d degrees of freedom: P(Q > %v) = %v", i+1, q, p)
		}
	}
}

// With one degree of freedom the law is that of Cramer and von Mises: Anderson &
// Darling 1952, table 1, asymptotic 10, 5 and 1 % points.
func TestBridgeCramerVonMises(t *testing.T) {
	for p, q := range map[float64]float64{0.10: 0.34730, 0.05: 0.46136, 0.01: 0.74346} {
		if got := bridgeTail(q, 1); math.Abs(got-p) > 5e-6 {
			t.Errorf("P(Q > %v) = %v, table %v", q, got, p)
		}
	}
	if bridgeTail(1e9, 5) != 0 || bridgeTail(0, 5) != 1 {
		t.Error("tails")
	}
}

// The fast route and the route by rows are two ways to the same least squares.
func TestGramAgainstRows(t *testing.T) {
	x := lcgWalk(400)
	for i := range x {
		x[i] += 1e6 + 3*float64(i)
	}
	for _, terms := range []Terms{Constant, Trend} {
		s, err := newSample([][]float64{x}, terms)
		if err != nil {
			t.Fatal(err)
		}
		g := s.newGram(12)
		fast, ok := g.nested()
		if !ok {
			t.Fatal("the fast route refused an ordinary series")
		}
		slow, err := s.nestedByRows(12)
		if err != nil {
			t.Fatal(err)
		}
		for j := range fast.lag {
			relative(t, "lag", math.Abs(fast.lag[j]), math.Abs(slow.lag[j]), math.Sqrt(slow.rss))
		}
		relative(t, "rss", fast.rss, slow.rss, slow.rss)
		for p := 0; p <= 12; p += 4 {
			a, ok := g.final(p)
			b, err := s.finalByRows(p)
			if !ok || err != nil || a.rows != b.rows {
				t.Fatal(ok, err, a, b)
			}
			relative(t, "level", a.level, b.level, math.Sqrt(b.rss))
			relative(t, "rss", a.rss, b.rss, b.rss)
		}
	}
}

func relative(t *testing.T, what string, got, want, scale float64) {
	t.Helper()
	if math.Abs(got-want) > 1e-11*scale {
		t.Errorf("%s: %v by sums, %v by rows", what, got, want)
	}
}

// One outlier at an end would spoil the sums, smooth lags the pivots: refused.
func TestGramRefuses(t *testing.T) {
	last := lcgWalk(400)
	last[399] = 1e8
	smooth := lcgWalk(400)
	for pass := 0; pass < 3; pass++ {
		for i := 1; i < len(smooth); i++ {
			smooth[i] += smooth[i-1]
		}
	}
	for name, x := range map[string][]float64{"outlier": last, "smooth": smooth} {
		s, err := newSample([][]float64{x}, Constant)
		if err != nil {
			t.Fatal(err)
		}
		if _, ok := s.newGram(12).nested(); ok {
			t.Errorf("%s: not refused", name)
		}
	}
}

// lcgWalk adds up the steps of a linear congruential generator: invented.
func lcgWalk(n int) []float64 {
	x := make([]float64, n)
	state := uint64(12345)
	for i := 1; i < n; i++ {
		state = state*6364136223846793005 + 1442695040888963407
		x[i] = x[i-1] + float64(state>>11)/(1<<53) - 0.5
	}
	return x
}
