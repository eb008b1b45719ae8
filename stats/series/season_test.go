package series_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"lagwise/stats"
	"lagwise/stats/series"
)

// A one-way analysis of variance by hand: phases {1 2 3} and {2 4 6}, means 2
// and 4, grand mean 3: between 6 on 1 df, within 10 on 4 df, F = 2.4.
func TestSeasonalFByHand(t *testing.T) {
	x := []float64{1, 2, 2, 4, 3, 6}
	at := []int{-2, -1, 0, 1, 2, 3}
	f, err := series.SeasonalF(x, at, 2)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "F", f.F, 2.4, 1e-13)
	if f.DF1 != 1 || f.DF2 != 4 {
		t.Errorf("df %v, %v", f.DF1, f.DF2)
	}
	// F(1, 4) is the square of t(4): P(|t| > sqrt 2.4); closed form of t with 4 df.
	u := math.Sqrt(2.4)
	s := u / math.Sqrt(4+2.4)
	near(t, "p", f.P, 1-s*(1+(1-s*s)/2), 1e-12)
	// A gap changes the phases of what follows and nothing else.
	g, err := series.SeasonalF(x, []int{0, 1, 10, 11, 100, 101}, 2)
	if err != nil || g != f {
		t.Errorf("with gaps: %v, %v", g, err)
	}
}

func TestSeasonalFExact(t *testing.T) {
	x := []float64{1, 2, 3, 1, 2, 3, 1, 2, 3}
	f, err := series.SeasonalF(x, []int{0, 1, 2, 3, 4, 5, 6, 7, 8}, 3)
	if err != nil {
		t.Fatal(err)
	}
	if math.IsInf(f.F, 0) || f.F < 1e20 || f.P > 1e-30 {
		t.Errorf("F %v, p %v of an exact season", f.F, f.P)
	}
	_, err = series.SeasonalF(x[:3], []int{0, 1, 2}, 3)
	undefined(t, "one value a phase", err, stats.TooShort)
}

// cycle is years of twelve steps: a slow rise, a season of the given size and
// noise of sd 1. Invented; only its make-up is asserted.
func cycle(years int, size float64, seed uint64) (x []float64, at []int) {
	r := rand.New(rand.NewPCG(seed, 3))
	for t := 0; t < 12*years; t++ {
		x = append(x, 0.02*float64(t)+size*math.Sin(2*math.Pi*float64(t)/12)+r.NormFloat64())
		at = append(at, t)
	}
	return x, at
}

// A sine of amplitude a has variance a^2/2; with noise of variance 1 the share of
// the season is a^2/2 / (a^2/2 + 1).
func TestSeasonalStrength(t *testing.T) {
	for _, c := range []struct{ size, low, high float64 }{
		{0, 0, 0.4}, {1, 0.25, 0.6}, {3, 0.75, 0.9}, {10, 0.97, 0.995},
	} {
		x, at := cycle(20, c.size, 5)
		f, err := series.SeasonalStrength(x, at, 12)
		if err != nil || f < c.low || f > c.high {
			t.Errorf("amplitude %v: %v, %v", c.size, f, err)
		}
	}
	// Strong trend and no noise: all of the rest is season.
	x, at := cycle(10, 0, 5)
	for i := range x {
		x[i] = 0.3*float64(i) + math.Cos(2*math.Pi*float64(i)/12)
	}
	f, err := series.SeasonalStrength(x, at, 12)
	if err != nil || f < 0.99 {
		t.Errorf("pure season on a line: %v, %v", f, err)
	}
}

// Without every seventh value and a whole year the strength hardly moves.
func TestSeasonalStrengthWithGaps(t *testing.T) {
	x, at := cycle(20, 3, 5)
	whole, err := series.SeasonalStrength(x, at, 12)
	if err != nil {
		t.Fatal(err)
	}
	var y []float64
	var kept []int
	for i := range x {
		if i%7 != 3 && i/12 != 9 {
			y = append(y, x[i])
			kept = append(kept, at[i]-1000)
		}
	}
	f, err := series.SeasonalStrength(y, kept, 12)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "strength", f, whole, 0.05)
	_, err = series.SeasonalStrength([]float64{1, 2, 3, 5}, []int{0, 1, 2, 1 << 60}, 2)
	undefined(t, "nearly empty", err, stats.TooShort)
	_, err = series.SeasonalStrength([]float64{1, 2, 3, 5, 4, 6}, []int{0, 2, 4, 6, 8, 10}, 2)
	undefined(t, "a phase never occurs", err, stats.TooShort)
}

// QS by its own formula for an alternating series of 9: r(2) and r(4) by hand.
func TestQSByHand(t *testing.T) {
	x := []float64{1, -1, 1, -1, 1, -1, 1, -1}
	qs, rs, err := series.QS(series.Runs{x}, 2)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "r(2)", rs, 6.0/8, 1e-15)
	near(t, "QS", qs, 8*10*(0.75*0.75/6+0.5*0.5/4), 1e-13)
}

// An AR(1) with trend and season in two runs: the terms are counted, rows near
// the gap dropped, and the residuals are orthogonal to what was fitted.
func TestFitARTerms(t *testing.T) {
	x, at := cycle(10, 4, 8)
	for i := 1; i < len(x); i++ {
		x[i] += 0.6 * x[i-1]
	}
	for i := 70; i < len(at); i++ {
		at[i] += 5
	}
	fit, err := series.FitAR(x, at, []int{70, 120}, true, 12)
	if err != nil {
		t.Fatal(err)
	}
	if fit.Terms != 12 || fit.Order < 1 {
		t.Fatalf("%d terms, order %d", fit.Terms, fit.Order)
	}
	if want := 120 - 2*fit.Order; len(fit.Rows) != want || len(fit.Residuals) != want {
		t.Errorf("%d rows, want %d", len(fit.Rows), want)
	}
	var sum, line, lag float64
	for k, i := range fit.Rows {
		sum += fit.Residuals[k]
		line += fit.Residuals[k] * float64(at[i])
		lag += fit.Residuals[k] * x[i-1]
		if i >= 70 && i < 70+fit.Order {
			t.Errorf("row %d has no %d predecessors in its run", i, fit.Order)
		}
	}
	near(t, "sum", sum, 0, 1e-9)
	near(t, "with trend", line, 0, 1e-7)
	near(t, "with lag 1", lag, 0, 1e-7)
}

func TestFitARExact(t *testing.T) {
	x, at := make([]float64, 30), make([]int, 30)
	for i := range x {
		x[i], at[i] = 0.1*float64(i), i
	}
	_, err := series.FitAR(x, at, []int{30}, true, 0)
	undefined(t, "a line", err, stats.Singular)
}
