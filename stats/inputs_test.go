package stats_test

import (
	"math"
	"slices"
	"testing"

	"lagwise/stats/normality"
	"lagwise/stats/series"
	"lagwise/stats/trend"
	"lagwise/stats/unitroot"
)

// No function of one series may change what it is given. The values are in
// disorder, tied, and on an offset, so that a sort, a centring or a scaling in
// place would show.
func TestInputsStayAsTheyAre(t *testing.T) {
	const n = 120
	x, at, times := make([]float64, n), make([]int, n), make([]float64, n)
	for i := range x {
		x[i] = 1000 + math.Round(10*math.Sin(float64(i*i)))/10
		at[i] = 2 + i + i/50
		times[i] = float64((i * 37) % n)
	}
	ends := []int{50, 100, n}
	runs := series.Runs{x[:50], x[50:100], x[100:]}
	whole := series.Runs{x}
	lags := unitroot.Lags{Max: -1}
	for name, call := range map[string]func() error{
		"Describe":                func() error { _, err := series.Describe(x); return err },
		"Autocorrelations":        func() error { _, err := series.Autocorrelations(runs, 9); return err },
		"PartialAutocorrelations": func() error { _, err := series.PartialAutocorrelations(runs, 9); return err },
		"LjungBox":                func() error { _, err := series.LjungBox(runs, 9, 1); return err },
		"BoxPierce":               func() error { _, err := series.BoxPierce(runs, 9, 1); return err },
		"Differences":             func() error { series.Differences(runs, 3); return nil },
		"Scaled":                  func() error { _, _, err := series.Scaled("x", x); return err },
		"Concat":                  func() error { runs.Concat()[0] = 5; return nil },
		"SeasonalStrength":        func() error { _, err := series.SeasonalStrength(x, at, 12); return err },
		"SeasonalF":               func() error { _, err := series.SeasonalF(x, at, 12); return err },
		"QS":                      func() error { _, _, err := series.QS(runs, 12); return err },
		"FitAR":                   func() error { _, err := series.FitAR(x, at, ends, true, 12); return err },
		"ADF":                     func() error { _, err := unitroot.ADF(whole, unitroot.Trend, lags); return err },
		"ADF with gaps":           func() error { _, err := unitroot.ADF(runs, unitroot.Constant, lags); return err },
		"JointF":                  func() error { _, err := unitroot.JointF(whole, unitroot.Trend, unitroot.None, 2); return err },
		"KPSS":                    func() error { _, err := unitroot.KPSS(runs, unitroot.Trend, -1); return err },
		"CanovaHansen":            func() error { _, err := unitroot.CanovaHansen(x, at, 4); return err },
		"MannKendall":             func() error { _, err := trend.MannKendall(x); return err },
		"MannKendallHamedRao":     func() error { _, err := trend.MannKendallHamedRao(x, 5, false); return err },
		"SeasonalMannKendall":     func() error { _, err := trend.SeasonalMannKendall(x, at, 12, true); return err },
		"TheilSen":                func() error { _, err := trend.TheilSen(times, x, 0.95); return err },
		"LinearCosine":            func() error { _, err := trend.LinearCosine(x, times); return err },
		"JarqueBera":              func() error { _, err := normality.JarqueBera(x); return err },
		"AndersonDarling":         func() error { _, _, err := normality.AndersonDarling(x); return err },
	} {
		wasX, wasAt, wasTimes, wasEnds := slices.Clone(x), slices.Clone(at), slices.Clone(times), slices.Clone(ends)
		if err := call(); err != nil {
			t.Errorf("%s: %v", name, err)
		}
		if !slices.Equal(x, wasX) || !slices.Equal(at, wasAt) || !slices.Equal(times, wasTimes) || !slices.Equal(ends, wasEnds) {
			t.Errorf("%s changed its input", name)
		}
	}
}
