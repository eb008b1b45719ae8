package series_test

import (
	"errors"
	"math"
	"testing"

	"lagwise/stats"
	"lagwise/stats/series"
)

// Batch yields of a chemical process: Box & Jenkins, series F, as printed in the
// NIST/SEMATECH e-Handbook, section 6.4.4.9.
var seriesF = []float64{47, 64, 23, 71, 38, 64, 55, 41, 59, 48, 71, 35, 57, 40, 58, 44, 80, 55, 37, 74, 51, 57, 50, 60, 45,
	57, 50, 45, 25, 59, 50, 71, 56, 74, 50, 58, 45, 54, 36, 54, 48, 55, 45, 57, 50, 62, 44, 64, 43, 52, 38, 59, 55, 41,
	53, 49, 34, 35, 54, 45, 68, 38, 50, 60, 39, 59, 40, 57, 54, 23}

func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance) {
		t.Errorf("%s: got %.12g, want %.12g", what, got, want)
	}
}

func undefined(t *testing.T, what string, err error, reason stats.Reason) {
	t.Helper()
	var u *stats.Undefined
	if !errors.As(err, &u) || u.Reason != reason {
		t.Errorf("%s: got error %v, want %s", what, err, reason)
	}
}

// NIST e-Handbook 6.4.4.9 prints the autocorrelations to nine digits; mean,
// variance, Ljung-Box and Yule-Walker were confirmed with a general-purpose
// statistics library.
func TestSeriesF(t *testing.T) {
	m, err := series.Describe(seriesF)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "mean", m.Mean, 51.128571, 5e-7)
	near(t, "variance", m.SD*m.SD, 141.823810, 5e-7)
	runs := series.Runs{seriesF}
	r, err := series.Autocorrelations(runs, 17)
	if err != nil {
		t.Fatal(err)
	}
	for k, want := range []float64{-0.389878319, 0.304394082, -0.165554717, 0.070719321,
		-0.097039288, -0.047057692, 0.035373112, -0.043458199} {
		near(t, "r", r[k], want, 5e-10)
	}
	near(t, "r(17)", r[16], -0.111342583, 5e-10)
	// Yule-Walker AR(2): phi2 is the second partial autocorrelation.
	p, err := series.PartialAutocorrelations(runs, 2)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "phi2", p[1], 0.17971, 5e-6)
	for _, c := range []struct {
		lags int
		q, p float64
	}{{12, 23.03468, 0.02743}, {24, 30.64757, 0.16421}} {
		lb, err := series.LjungBox(runs, c.lags, 0)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "Q", lb.Statistic, c.q, 5e-6)
		near(t, "p", lb.P, c.p, 5e-6)
	}
}

// The least-squares AR(2) of series F, NIST e-Handbook 6.4.4.10 (older edition).
func TestFitARSeriesF(t *testing.T) {
	at := make([]int, len(seriesF))
	for i := range at {
		at[i] = i
	}
	fit, err := series.FitAR(seriesF, at, []int{len(seriesF)}, false, 0)
	if err != nil {
		t.Fatal(err)
	}
	if fit.Order != 2 || fit.Terms != 0 || len(fit.Residuals) != 68 || fit.Rows[0] != 2 {
		t.Fatalf("order %d, %d terms, %d residuals from row %d", fit.Order, fit.Terms, len(fit.Residuals), fit.Rows[0])
	}
	near(t, "phi1", fit.Coefficients[0], -0.33972, 5e-6)
	near(t, "phi2", fit.Coefficients[1], 0.19040, 5e-6)
}

// A short series by hand: mean 3, deviations -2 -1 0 1 2, squares 10.
func TestByHand(t *testing.T) {
	x := []float64{1, 2, 3, 4, 5}
	m, err := series.Describe(x)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "sd", m.SD, math.Sqrt(2.5), 1e-15)
	near(t, "skewness", m.Skewness, 0, 1e-15)
	near(t, "kurtosis", m.Kurtosis, 34.0/5/4, 1e-14)
	r, err := series.Autocorrelations(series.Runs{x}, 2)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "r1", r[0], 0.4, 1e-15)  // 2 + 0 + 0 + 2
	near(t, "r2", r[1], -0.1, 1e-15) // 0 - 1 + 0
	// With a gap after the second value: only 2 and 0 + 2 are inside runs.
	r, err = series.Autocorrelations(series.Runs{x[:2], x[2:]}, 2)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "r1 with a gap", r[0], 0.4, 1e-15)
	near(t, "r2 with a gap", r[1], 0, 1e-15)
	lb, err := series.LjungBox(series.Runs{x[:2], x[2:]}, 1, 0)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "Q with 3 pairs", lb.Statistic, 5*7*0.16/3, 1e-14)
}

func TestDifferences(t *testing.T) {
	r := series.Runs{{1, 4, 9, 16}, {25}, {36, 49}}
	d := series.Differences(r, 1)
	if got := d.Concat(); len(d) != 2 || len(got) != 4 || got[0] != 3 || got[2] != 7 || got[3] != 13 {
		t.Errorf("first differences %v", d)
	}
	if d = series.Differences(r, 2); len(d) != 1 || d.N() != 2 || d[0][0] != 8 {
		t.Errorf("differences at lag 2 %v", d)
	}
	if r.N() != 7 || r.Longest() != 4 || r.Pairs(1) != 4 || r.Pairs(3) != 1 {
		t.Error("counts of runs")
	}
}

// What does not depend on unit and offset must not: exactly for powers of two.
func TestInvariance(t *testing.T) {
	runs := func(scale, offset float64) series.Runs {
		y := make([]float64, len(seriesF))
		for i, v := range seriesF {
			y[i] = scale*v + offset
		}
		return series.Runs{y}
	}
	want, _ := series.Autocorrelations(runs(1, 0), 20)
	for _, c := range []struct{ scale, offset, tolerance float64 }{
		{0x1p-990, 0, 0}, {0x1p1000, 0, 0}, {-1, 0, 0}, {1, 1e12, 1e-13}, {1e-300, 0, 1e-13}, {1e300, 0, 1e-13},
	} {
		r := runs(c.scale, c.offset)
		got, err := series.Autocorrelations(r, 20)
		if err != nil {
			t.Fatal(err)
		}
		for k := range got {
			near(t, "r", got[k], want[k], c.tolerance)
		}
		m, err := series.Describe(r[0])
		if err != nil {
			t.Fatal(err)
		}
		near(t, "sd", m.SD/math.Abs(c.scale), math.Sqrt(141.8238095238095), 1e-11)
	}
}

// Every function answers bad data with an error of the right reason.
func TestHostile(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for name, c := range map[string]struct {
		x      []float64
		reason stats.Reason
	}{
		"NaN":      {[]float64{1, 2, nan, 4, 5, 6, 8, 7, 9, 3, 5, 6}, stats.NotFinite},
		"infinite": {[]float64{1, 2, inf, 4, 5, 6, 8, 7, 9, 3, 5, 6}, stats.NotFinite},
		"constant": {[]float64{7, 7, 7, 7, 7, 7, 7, 7, 7, 7, 7, 7}, stats.Constant},
		"zero":     {make([]float64, 12), stats.Constant},
		"one":      {[]float64{1}, stats.TooShort},
		"none":     {nil, stats.TooShort},
	} {
		at := make([]int, len(c.x))
		for i := range at {
			at[i] = i
		}
		runs := series.Runs{c.x}
		_, err := series.Describe(c.x)
		undefined(t, name+": Describe", err, c.reason)
		_, err = series.Autocorrelations(runs, 1)
		undefined(t, name+": Autocorrelations", err, c.reason)
		_, err = series.PartialAutocorrelations(runs, 1)
		undefined(t, name+": PartialAutocorrelations", err, c.reason)
		_, err = series.LjungBox(runs, 1, 0)
		undefined(t, name+": LjungBox", err, c.reason)
		_, err = series.BoxPierce(runs, 1, 0)
		undefined(t, name+": BoxPierce", err, c.reason)
		_, err = series.SeasonalF(c.x, at, 4)
		undefined(t, name+": SeasonalF", err, c.reason)
		_, err = series.SeasonalStrength(c.x, at, 4)
		undefined(t, name+": SeasonalStrength", err, c.reason)
		_, _, err = series.QS(runs, 4)
		undefined(t, name+": QS", err, c.reason)
		_, err = series.FitAR(c.x, at, []int{len(c.x)}, true, 4)
		undefined(t, name+": FitAR", err, c.reason)
	}
	_, err := series.LjungBox(series.Runs{seriesF}, 2, 2)
	undefined(t, "no degree of freedom", err, stats.TooShort)
	_, err = series.LjungBox(series.Runs{{1, 3}, {2, 5}, {4, 9}}, 5, 1)
	undefined(t, "no pairs", err, stats.TooShort)
}
