package evidence

import (
	"math"

	"lagwise/stats/series"
	"lagwise/stats/unitroot"
)

func sqrt(x float64) float64 { return math.Sqrt(x) }

// The names of the tests, as they are shown.
const (
	ADFName  = "augmented Dickey-Fuller"
	KPSSName = "KPSS"
)

// TermsName returns the words for the deterministic terms of a test.
func TermsName(t unitroot.Terms) string {
	switch t {
	case unitroot.None:
		return "none"
	case unitroot.Constant:
		return "constant"
	case unitroot.Trend:
		return "constant and trend"
	}
	return "constant, trend and squared trend"
}

// adf takes the test, notes it in the profile and returns it.
func (p *Profile) adf(runs series.Runs, terms unitroot.Terms, set Settings) (unitroot.ADFResult, bool) {
	got, err := unitroot.ADF(runs, terms, set.ADFLags)
	t := Test{Test: ADFName, Null: "unit root", Of: "levels", Terms: TermsName(terms), N: got.N}
	if err != nil {
		t.Error = err.Error()
	} else {
		t.Lags, t.Statistic, t.P = &got.Lags, &got.Statistic, &got.P
		for i, level := range []float64{0.01, 0.05, 0.10} {
			t.Critical = append(t.Critical, Critical{level, got.Critical[i]})
		}
	}
	p.Tests = append(p.Tests, t)
	return got, err == nil
}

// kpss takes the test, notes it in the profile and returns it.
func (p *Profile) kpss(runs series.Runs, terms unitroot.Terms, set Settings) (unitroot.KPSSResult, bool) {
	got, err := unitroot.KPSS(runs, terms, set.KPSSBandwidth)
	t := Test{Test: KPSSName, Null: "stationary", Of: "levels", Terms: TermsName(terms), N: got.N}
	if err != nil {
		t.Error = err.Error()
	} else {
		t.Bandwidth, t.Statistic, t.P, t.PBound = &got.Bandwidth, &got.Statistic, &got.P, boundOf(got.Bound)
		for i, level := range []float64{0.10, 0.05, 0.025, 0.01} {
			t.Critical = append(t.Critical, Critical{level, got.Critical[i]})
		}
	}
	p.Tests = append(p.Tests, t)
	return got, err == nil
}

func boundOf(sign int) PBound {
	switch {
	case sign < 0:
		return AtMost
	case sign > 0:
		return AtLeast
	}
	return ""
}

// adfCritical returns the critical value at the lab's alpha: the surfaces
// stand at 1, 5 and 10 %; another alpha takes the nearest below.
func adfCritical(r unitroot.ADFResult, alpha float64) float64 {
	switch {
	case alpha >= 0.10:
		return r.Critical[2]
	case alpha >= 0.05:
		return r.Critical[1]
	}
	return r.Critical[0]
}

// kpssCritical does the same on the published table of 10, 5, 2.5 and 1 %.
func kpssCritical(r unitroot.KPSSResult, alpha float64) float64 {
	switch {
	case alpha >= 0.10:
		return r.Critical[0]
	case alpha >= 0.05:
		return r.Critical[1]
	case alpha >= 0.025:
		return r.Critical[2]
	}
	return r.Critical[3]
}
