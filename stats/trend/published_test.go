package trend_test

import (
	"math"
	"testing"

	"lagwise/stats/trend"
)

func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance) {
		t.Errorf("%s: got %.12g, want %.12g", what, got, want)
	}
}

// EPA Unified Guidance 2009 (EPA 530/R-09-007), example 17-6, sulfate; outputs as
// carried by a public library for environmental statistics.
func TestSulfate(t *testing.T) {
	at := []float64{89.6, 89.8, 90.1, 90.3, 90.6, 90.8, 91.1, 91.3, 91.6, 91.8, 92.1, 92.6, 93.1, 93.6, 94.1, 94.6, 95.1, 95.6, 95.8, 96.1, 96.3, 96.6, 96.8}
	x := []float64{480, 450, 490, 520, 485, 510, 510, 530, 510, 560, 560, 540, 590, 550, 600, 700, 570, 610, 650, 620, 830, 720, 590}
	r, err := trend.MannKendall(x)
	if err != nil {
		t.Fatal(err)
	}
	if r.S != 194 || r.VarS != 1428 || r.N != 23 || r.Correction != 1 {
		t.Errorf("%+v", r)
	}
	near(t, "z", r.Z, 5.107322, 5e-7)
	near(t, "p", r.P, 3.267574e-07, 5e-14)
	near(t, "tau-b", r.TauB, 0.7744897, 5e-8)
	s, err := trend.TheilSen(at, x, 0.95)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "slope", s.Slope, 26.66667, 5e-6)
	// The guidance interpolates between slopes; Sen's rule takes one of them.
	near(t, "lower", s.Lower, 20.0, 0.1)
	near(t, "upper", s.Upper, 35.71182, 0.15)
}

// The same guidance, example 17-7, sodium.
func TestSodium(t *testing.T) {
	at := []float64{89.6, 90.1, 90.8, 91.1, 92.1, 93.1, 94.1, 95.6, 96.1, 96.3}
	x := []float64{56, 53, 51, 55, 52, 60, 62, 59, 61, 63}
	r, err := trend.MannKendall(x)
	if err != nil {
		t.Fatal(err)
	}
	if r.S != 25 || r.VarS != 125 {
		t.Errorf("%+v", r)
	}
	near(t, "z", r.Z, 2.146625, 5e-7)
	near(t, "p", r.P, 0.03182313, 5e-9)
	s, err := trend.TheilSen(at, x, 0.95)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "slope", s.Slope, 1.333333, 5e-7)
	near(t, "intercept", s.Intercept, -65.96667, 5e-6)
	near(t, "upper", s.Upper, 2.333333, 5e-7)
}

// The same guidance, example 14-10: months as rows, 1983 to 1985.
func TestSeasonalKendall(t *testing.T) {
	months := [12][3]float64{{1.99, 2.01, 2.15}, {2.10, 2.10, 2.17}, {2.12, 2.17, 2.27}, {2.12, 2.13, 2.23},
		{2.11, 2.13, 2.24}, {2.15, 2.18, 2.26}, {2.19, 2.25, 2.31}, {2.18, 2.24, 2.32}, {2.16, 2.22, 2.28},
		{2.08, 2.13, 2.22}, {2.05, 2.08, 2.19}, {2.08, 2.16, 2.22}}
	var x []float64
	var at []int
	for year := 0; year < 3; year++ {
		for month := range months {
			x = append(x, months[month][year])
			at = append(at, 12*year+month-24)
		}
	}
	r, err := trend.SeasonalMannKendall(x, at, 12, false)
	if err != nil {
		t.Fatal(err)
	}
	if r.S != 35 || math.Abs(r.VarS-43) > 1e-9 {
		t.Errorf("%+v", r)
	}
	near(t, "z", r.Z, 5.1849514, 5e-8)
	near(t, "p", r.P, 2.160712e-07, 5e-14)
	near(t, "slope", r.Slope, 0.06, 1e-12)
}

// Helsel & Hirsch, chapter 8: y in the order of x. 33 pairs concordant, 12
// discordant; large-sample Z 1.78885, p 0.07364. Data from memory, result
// confirmed with a general-purpose statistics library.
func TestHelsel(t *testing.T) {
	x := []float64{2, 24, 99, 197, 377, 544, 632, 3452, 6587, 53170}
	y := []float64{1.22, 2.20, 4.80, 1.28, 1.97, 1.46, 2.64, 2.34, 4.84, 2.96}
	r, err := trend.MannKendall(y)
	if err != nil {
		t.Fatal(err)
	}
	if r.S != 33-12 {
		t.Errorf("S %v", r.S)
	}
	near(t, "tau", r.TauB, 21.0/45, 1e-15)
	near(t, "z", r.Z, 1.78885, 5e-6)
	near(t, "p", r.P, 0.07364, 5e-6)
	s, err := trend.TheilSen(x, y, 0.9)
	if err != nil || s.Pairs != 45 {
		t.Errorf("%+v, %v", s, err)
	}
}
