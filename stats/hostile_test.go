package stats_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	"lagwise/stats"
	"lagwise/stats/series"
	"lagwise/stats/trend"
	"lagwise/stats/unitroot"
)

// hostile is a short series of an odd kind: noise, ties, a line, a cycle, zeros
// after the first value, or a sine; in units from 1e-300 to 1e300, some on an
// offset of 1e12 units; at positions with gaps.
type hostile struct {
	x     []float64
	at    []int
	times []float64
	ends  []int
	runs  series.Runs
}

func newHostile(r *rand.Rand) hostile {
	unit := math.Pow(10, float64(r.IntN(7)*100-300))
	offset := 0.0
	if r.IntN(4) == 0 && unit < 1e290 {
		offset = 1e12 * unit
	}
	kind, n, position, start := r.IntN(6), r.IntN(60), r.IntN(100)-50, 0
	var h hostile
	for i := 0; i < n; i++ {
		v := []float64{r.NormFloat64(), math.Round(r.NormFloat64()), float64(i), float64(i % 4), float64(max(0, 1-i)), math.Sin(float64(i))}[kind]
		step := 1 + max(0, r.IntN(30)-24)
		position += step
		h.x = append(h.x, v*unit+offset)
		h.at = append(h.at, position)
		h.times = append(h.times, float64(position))
		if i > 0 && step > 1 {
			h.ends = append(h.ends, i)
		}
	}
	h.ends = append(h.ends, n)
	for _, end := range h.ends {
		h.runs = append(h.runs, h.x[start:end])
		start = end
	}
	return h
}

// Whatever the data: a finite answer or an error with a reason, and no panic.
func TestHostileData(t *testing.T) {
	r := rand.New(rand.NewPCG(77, 1))
	for i := 0; i < 2500 && !t.Failed(); i++ {
		h := newHostile(r)
		s, lags := 2+r.IntN(11), r.IntN(12)
		check := func(name string, err error, values ...float64) {
			var u *stats.Undefined
			if err != nil && !errors.As(err, &u) {
				t.Errorf("%s: error without a reason: %v", name, err)
			}
			for _, v := range values {
				if err == nil && (math.IsNaN(v) || math.IsInf(v, 0)) {
					t.Errorf("%s: %v of %v at %v", name, values, h.x, h.at)
				}
			}
		}
		h.describe(check, lags, s)
		h.drift(check, s)
		h.trend(check, lags, s)
	}
}

type checker func(name string, err error, values ...float64)

func (h hostile) describe(check checker, lags, s int) {
	m, err := series.Describe(h.x)
	check("Describe", err, m.Mean, m.SD, m.Skewness, m.Kurtosis)
	a, err := series.Autocorrelations(h.runs, lags)
	check("Autocorrelations", err, a...)
	a, err = series.PartialAutocorrelations(h.runs, lags)
	check("PartialAutocorrelations", err, a...)
	p, err := series.LjungBox(h.runs, lags, 1)
	check("LjungBox", err, p.Statistic, p.P)
	f, err := series.SeasonalF(h.x, h.at, s)
	check("SeasonalF", err, f.F, f.P)
	strength, err := series.SeasonalStrength(h.x, h.at, s)
	check("SeasonalStrength", err, strength)
	qs, rs, err := series.QS(h.runs, s)
	check("QS", err, qs, rs)
	for _, season := range []int{0, s} {
		fit, err := series.FitAR(h.x, h.at, h.ends, season == 0, season)
		check("FitAR", err, fit.Residuals...)
		check("FitAR", err, fit.Coefficients...)
	}
}

func (h hostile) drift(check checker, s int) {
	for terms := unitroot.None; terms <= unitroot.QuadraticTrend; terms++ {
		for rule := unitroot.AIC; rule <= unitroot.GeneralToSpecific; rule++ {
			for _, runs := range []series.Runs{h.runs, {h.x}} {
				a, err := unitroot.ADF(runs, terms, unitroot.Lags{Rule: rule, Fixed: 2, Max: -1})
				check("ADF", err, a.Statistic, a.P, a.Criterion)
			}
		}
		if terms > unitroot.None {
			f, err := unitroot.JointF(h.runs, terms, terms-1, 2)
			check("JointF", err, f)
		}
	}
	for _, terms := range []unitroot.Terms{unitroot.Constant, unitroot.Trend} {
		k, err := unitroot.KPSS(h.runs, terms, -1)
		check("KPSS", err, k.Statistic, k.P)
	}
	c, err := unitroot.CanovaHansen(h.x, h.at, s)
	check("CanovaHansen", err, c.Statistic, c.P)
}

func (h hostile) trend(check checker, lags, s int) {
	m, err := trend.MannKendallHamedRao(h.x, lags, false)
	check("MannKendallHamedRao", err, m.Z, m.P, m.VarS, m.TauB)
	sen, err := trend.TheilSen(h.times, h.x, 0.95)
	check("TheilSen", err, sen.Slope, sen.Lower, sen.Upper, sen.Intercept)
	l, err := trend.LinearCosine(h.x, h.times)
	check("LinearCosine", err, l.Slope, l.SE, l.T, l.P)
	seasonal, err := trend.SeasonalMannKendall(h.x, h.at, s, true)
	check("SeasonalMannKendall", err, seasonal.Z, seasonal.P, seasonal.Slope)
}
