package unitroot_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	"lagwise/stats"
	"lagwise/stats/series"
	"lagwise/stats/unitroot"
)

func undefined(t *testing.T, what string, err error, reason stats.Reason) {
	t.Helper()
	var u *stats.Undefined
	if !errors.As(err, &u) || u.Reason != reason {
		t.Errorf("%s: got error %v, want %s", what, err, reason)
	}
}

var allTerms = []unitroot.Terms{unitroot.None, unitroot.Constant, unitroot.Trend, unitroot.QuadraticTrend}

func TestHostile(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for name, c := range map[string]struct {
		x      []float64
		reason stats.Reason
	}{
		"NaN":      {[]float64{1, 2, nan, 4, 5, 6, 8, 7, 9, 3, 5, 6}, stats.NotFinite},
		"infinite": {[]float64{1, 2, inf, 4, 5, 6, 8, 7, 9, 3, 5, 6}, stats.NotFinite},
		"constant": {[]float64{7, 7, 7, 7, 7, 7, 7, 7, 7, 7, 7, 7}, stats.Constant},
		"two":      {[]float64{1, 2}, stats.TooShort},
		"none":     {nil, stats.TooShort},
	} {
		at := make([]int, len(c.x))
		for i := range at {
			at[i] = i
		}
		for _, terms := range allTerms {
			_, err := unitroot.ADF(series.Runs{c.x}, terms, unitroot.Lags{Max: -1})
			undefined(t, name+": ADF", err, c.reason)
			if terms > unitroot.None {
				_, err = unitroot.JointF(series.Runs{c.x}, terms, unitroot.None, 0)
				undefined(t, name+": JointF", err, c.reason)
			}
		}
		for _, terms := range []unitroot.Terms{unitroot.Constant, unitroot.Trend} {
			_, err := unitroot.KPSS(series.Runs{c.x}, terms, -1)
			undefined(t, name+": KPSS", err, c.reason)
		}
		_, err := unitroot.CanovaHansen(c.x, at, 4)
		undefined(t, name+": CanovaHansen", err, c.reason)
	}
}

// Short series of every length end in a finite number or a typed error.
func TestEveryShortLength(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 4))
	for n := 0; n <= 30; n++ {
		x := make([]float64, n)
		for i := range x {
			x[i] = r.NormFloat64()
		}
		for _, terms := range allTerms {
			for rule := unitroot.AIC; rule <= unitroot.GeneralToSpecific; rule++ {
				got, err := unitroot.ADF(series.Runs{x}, terms, unitroot.Lags{Rule: rule, Max: -1})
				finiteOrTyped(t, err, got.Statistic, got.P, got.Critical[1])
				got, err = unitroot.ADF(series.Runs{x[:n/2], x[n/2:]}, terms, unitroot.Lags{Rule: rule, Max: -1})
				finiteOrTyped(t, err, got.Statistic, got.P, got.Critical[1])
			}
		}
		for _, terms := range []unitroot.Terms{unitroot.Constant, unitroot.Trend} {
			got, err := unitroot.KPSS(series.Runs{x[:n/3], x[n/3:]}, terms, -1)
			finiteOrTyped(t, err, got.Statistic, got.P)
		}
	}
}

func finiteOrTyped(t *testing.T, err error, values ...float64) {
	t.Helper()
	var u *stats.Undefined
	if err != nil && !errors.As(err, &u) {
		t.Errorf("error %v without a reason", err)
	}
	for _, v := range values {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			t.Errorf("%v with error %v", v, err)
		}
	}
}

// Series that leave nothing to estimate are named, not measured.
func TestExactSeries(t *testing.T) {
	line, sine, alternating := make([]float64, 120), make([]float64, 120), make([]float64, 120)
	for i := range line {
		line[i] = 0.1 * float64(i)
		sine[i] = math.Sin(0.3 * float64(i))
		alternating[i] = float64(i % 2)
	}
	lags := unitroot.Lags{Max: -1}
	_, err := unitroot.ADF(series.Runs{line}, unitroot.Constant, lags)
	undefined(t, "line, constant", err, stats.Singular)
	_, err = unitroot.ADF(series.Runs{line}, unitroot.Trend, lags)
	undefined(t, "line, trend", err, stats.Constant)
	_, err = unitroot.KPSS(series.Runs{line}, unitroot.Trend, -1)
	undefined(t, "line, KPSS", err, stats.Constant)
	for name, x := range map[string][]float64{"sine": sine, "alternating": alternating} {
		_, err = unitroot.ADF(series.Runs{x}, unitroot.Constant, lags)
		undefined(t, name, err, stats.Singular)
	}
	// With a little noise it can be measured again.
	r := rand.New(rand.NewPCG(5, 6))
	for i := range sine {
		sine[i] += 1e-3 * r.NormFloat64()
	}
	got, err := unitroot.ADF(series.Runs{sine}, unitroot.Constant, lags)
	if err != nil || got.Dependent != 0 {
		t.Errorf("noisy sine: %+v, %v", got, err)
	}
}

// Unit and sign change no test; an offset none that has a constant; a line none
// that has a trend.
func TestInvariance(t *testing.T) {
	x := walk(300, 11)
	at := make([]int, len(x))
	for i := range at {
		at[i] = i
	}
	for _, c := range []struct {
		name                 string
		scale, offset, slope float64
		least                unitroot.Terms
		tolerance            float64
	}{
		{"sign", -1, 0, 0, unitroot.None, 1e-10},
		{"tiny unit", 1e-300, 0, 0, unitroot.None, 1e-10},
		{"huge unit", 1e300, 0, 0, unitroot.None, 1e-10},
		{"offset", 1, 1e6, 0, unitroot.Constant, 1e-7},
		{"line", 1, 0, 1e3, unitroot.Trend, 1e-7},
	} {
		y := make([]float64, len(x))
		for i := range x {
			y[i] = c.scale*x[i] + c.offset + c.slope*float64(i)
		}
		for _, terms := range allTerms[c.least:] {
			want, err := unitroot.ADF(series.Runs{x}, terms, unitroot.Lags{Max: -1})
			if err != nil {
				t.Fatal(err)
			}
			got, err := unitroot.ADF(series.Runs{y}, terms, unitroot.Lags{Max: -1})
			if err != nil {
				t.Fatal(err)
			}
			near(t, c.name+": ADF", got.Statistic, want.Statistic, c.tolerance)
			if got.Lags != want.Lags {
				t.Errorf("%s: %d lags for %d", c.name, got.Lags, want.Lags)
			}
		}
		for _, terms := range []unitroot.Terms{unitroot.Constant, unitroot.Trend} {
			if terms < c.least {
				continue
			}
			want, _ := unitroot.KPSS(series.Runs{x}, terms, -1)
			got, err := unitroot.KPSS(series.Runs{y}, terms, -1)
			if err != nil {
				t.Fatal(err)
			}
			near(t, c.name+": KPSS", got.Statistic, want.Statistic, c.tolerance)
		}
		if c.least < unitroot.Trend {
			want, _ := unitroot.CanovaHansen(x, at, 12)
			got, err := unitroot.CanovaHansen(y, at, 12)
			if err != nil {
				t.Fatal(err)
			}
			near(t, c.name+": CanovaHansen", got.Statistic, want.Statistic, c.tolerance)
		}
	}
}

// An offset of 1e12 must leave the answer that the rounded values have without
// it: exact, since taking the offset off again is.
func TestLargeOffset(t *testing.T) {
	x := walk(300, 11)
	y := make([]float64, len(x))
	for i := range x {
		y[i] = x[i] + 1e12
		x[i] = y[i] - 1e12
	}
	for _, terms := range []unitroot.Terms{unitroot.Constant, unitroot.Trend} {
		want, err := unitroot.ADF(series.Runs{x}, terms, unitroot.Lags{Max: -1})
		if err != nil {
			t.Fatal(err)
		}
		got, err := unitroot.ADF(series.Runs{y}, terms, unitroot.Lags{Max: -1})
		if err != nil {
			t.Fatal(err)
		}
		near(t, "ADF", got.Statistic, want.Statistic, 1e-9)
		level, _ := unitroot.KPSS(series.Runs{x}, terms, -1)
		offset, err := unitroot.KPSS(series.Runs{y}, terms, -1)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "KPSS", offset.Statistic, level.Statistic, 1e-9)
	}
}

// A gap drops the rows that would cross it: with one lag, 2 for each further run.
func TestGaps(t *testing.T) {
	x := walk(200, 21)
	runs := series.Runs{x[:80], x[80:81], x[81:]}
	got, err := unitroot.ADF(runs, unitroot.Constant, unitroot.Lags{Rule: unitroot.Fixed, Fixed: 1})
	if err != nil {
		t.Fatal(err)
	}
	if got.N != 78+0+117 {
		t.Errorf("%d rows", got.N)
	}
	// KPSS by its formula: products inside runs only.
	k, err := unitroot.KPSS(runs, unitroot.Constant, 3)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "KPSS", k.Statistic, kpssByFormula(runs, 3), 1e-10)
}

func kpssByFormula(runs series.Runs, q int) float64 {
	all := runs.Concat()
	mean := 0.0
	for _, v := range all {
		mean += v / float64(len(all))
	}
	var sum, squares, variance float64
	for _, v := range all {
		sum += v - mean
		squares += sum * sum
		variance += (v - mean) * (v - mean)
	}
	for k := 1; k <= q; k++ {
		for _, run := range runs {
			for t := 0; t+k < len(run); t++ {
				variance += 2 * (1 - float64(k)/float64(q+1)) * (run[t] - mean) * (run[t+k] - mean)
			}
		}
	}
	n := float64(len(all))
	return squares / (n * n) / (variance / n)
}

// The p of KPSS ends with a bound on both sides of the table.
func TestKPSSBounds(t *testing.T) {
	rising := walk(500, 2)
	for i := range rising {
		rising[i] += 0.5 * float64(i)
	}
	drifting, err := unitroot.KPSS(series.Runs{rising}, unitroot.Constant, 2)
	if err != nil || drifting.Bound != -1 || drifting.P != 0.01 {
		t.Errorf("a rising walk: %+v, %v", drifting, err)
	}
	r := rand.New(rand.NewPCG(1, 9))
	x := make([]float64, 500)
	for i := range x {
		x[i] = r.NormFloat64()
	}
	still, err := unitroot.KPSS(series.Runs{x}, unitroot.Constant, 2)
	if err != nil || still.Bound != 1 || still.P != 0.10 {
		t.Errorf("noise: %+v, %v", still, err)
	}
}

// Over simulated series the Canova-Hansen test must keep a fixed season at about
// its level and find one that walks.
func TestCanovaHansenSizeAndPower(t *testing.T) {
	r := rand.New(rand.NewPCG(17, 4))
	const n, s, runs = 160, 4, 300
	fixed, walking := 0, 0
	for run := 0; run < runs; run++ {
		x, y, at := make([]float64, n), make([]float64, n), make([]int, n)
		pattern := []float64{3, -1, 0, -2}
		for i := range x {
			at[i] = i
			e := r.NormFloat64()
			x[i] = pattern[i%s] + e
			if i >= s {
				pattern2 := y[i-s] // a seasonal walk
				y[i] = pattern2 + e
			} else {
				y[i] = pattern[i] + e
			}
		}
		a, err := unitroot.CanovaHansen(x, at, s)
		if err != nil {
			t.Fatal(err)
		}
		b, err := unitroot.CanovaHansen(difference(y), at[1:], s)
		if err != nil {
			t.Fatal(err)
		}
		if a.DF != s-1 || a.Rejects != (a.Statistic > a.Critical5) {
			t.Fatalf("%+v", a)
		}
		if a.Rejects {
			fixed++
		}
		if b.Rejects {
			walking++
		}
	}
	// Binomial: 300 at 5 % is 15 with sd 3.8; the test is known to be cautious.
	if fixed > 30 {
		t.Errorf("a fixed season rejected in %d of %d", fixed, runs)
	}
	if walking < 200 {
		t.Errorf("a walking season found in %d of %d", walking, runs)
	}
}

func difference(x []float64) []float64 { return series.Differences(series.Runs{x}, 1)[0] }
