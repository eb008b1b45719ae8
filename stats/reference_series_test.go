package stats_test

import (
	"fmt"
	"math"

	"lagwise/stats/normality"
	"lagwise/stats/series"
	"lagwise/stats/trend"
	"lagwise/stats/unitroot"
)

// seriesDrivers drive the methods on one series: description, portmanteau,
// unit roots, stationarity, monotone trend, shape.
var seriesDrivers = map[string]driver{
	"summary":                driveSummary,
	"acf":                    driveAutocorrelations,
	"pacf":                   drivePartial,
	"first-differences":      driveDifferences,
	"seasonal-differences":   driveDifferences,
	"ljung-box":              portmanteauDriver(series.LjungBox),
	"box-pierce":             portmanteauDriver(series.BoxPierce),
	"nist-univariate":        driveUnivariate,
	"jarque-bera":            driveJarqueBera,
	"anderson-darling":       driveAndersonDarling,
	"adf":                    driveADF,
	"mackinnon":              driveMacKinnon,
	"kpss":                   driveKPSS,
	"mann-kendall":           driveMannKendall,
	"mann-kendall-hamed-rao": driveHamedRao,
	"seasonal-mann-kendall":  driveSeasonal,
	"theil-sen":              driveTheilSen,
}

// values is the column of the case, differenced where its options say so.
func (c refCase) values(data refData) []float64 {
	x := data.complete(c.column("y"))[0]
	if c.text("transform") == "first-differences" {
		return series.Differences(series.Runs{x}, 1)[0]
	}
	return x
}

func driveSummary(c refCase, data refData) (map[string]any, error) {
	m, err := series.Describe(c.values(data))
	return map[string]any{"n": m.N, "mean": m.Mean, "sd": m.SD, "min": m.Min, "max": m.Max}, err
}

func driveAutocorrelations(c refCase, data refData) (map[string]any, error) {
	x := c.values(data)
	r, err := series.Autocorrelations(series.Runs{x}, min(20, len(x)-1))
	return map[string]any{"n": len(x), "acf": r, "white_noise_bound_95": 1.959963984540054 / math.Sqrt(float64(len(x)))}, err
}

func drivePartial(c refCase, data refData) (map[string]any, error) {
	x := c.values(data)
	r, err := series.PartialAutocorrelations(series.Runs{x}, min(20, len(x)-1))
	return map[string]any{"n": len(x), "pacf": r}, err
}

func driveDifferences(c refCase, data refData) (map[string]any, error) {
	d := series.Differences(series.Runs{c.values(data)}, c.whole("lag", 1))
	x := d.Concat()
	m, err := series.Describe(x)
	if err != nil {
		return nil, err
	}
	r, err := series.Autocorrelations(d, min(20, len(x)-1))
	return map[string]any{"n": m.N, "mean": m.Mean, "sd": m.SD,
		"first": x[:min(5, len(x))], "last": x[len(x)-1], "acf": r}, err
}

func portmanteauDriver(test func(series.Runs, int, int) (series.Portmanteau, error)) driver {
	return func(c refCase, data refData) (map[string]any, error) {
		p, err := test(series.Runs{c.values(data)}, c.whole("lags", 0), c.whole("fitdf", 0))
		return map[string]any{"statistic": p.Statistic, "df": p.DF, "p": p.P, "n": p.N}, err
	}
}

func driveUnivariate(c refCase, data refData) (map[string]any, error) {
	x := c.values(data)
	m, err := series.Describe(x)
	if err != nil {
		return nil, err
	}
	r, err := series.Autocorrelations(series.Runs{x}, 1)
	if err != nil {
		return nil, err
	}
	return map[string]any{"n": m.N, "mean": m.Mean, "sd": m.SD, "acf1": r[0]}, nil
}

func driveJarqueBera(c refCase, data refData) (map[string]any, error) {
	r, err := normality.JarqueBera(c.values(data))
	return map[string]any{"statistic": r.Statistic, "df": r.DF, "p": r.P,
		"skewness": r.Skewness, "kurtosis": r.Kurtosis, "n": r.N}, err
}

func driveAndersonDarling(c refCase, data refData) (map[string]any, error) {
	x := c.values(data)
	a, p, err := normality.AndersonDarling(x)
	return map[string]any{"A": a, "p": p, "n": len(x)}, err
}

func (c refCase) terms() unitroot.Terms {
	for i, name := range []string{"n", "c", "ct", "ctt"} {
		if c.text("terms") == name {
			return unitroot.Terms(i)
		}
	}
	panic(fmt.Sprintf("%s: unknown terms %q", c.ID, c.text("terms")))
}

func (c refCase) lags() unitroot.Lags {
	rule, ok := map[string]unitroot.LagRule{"fixed": unitroot.Fixed, "AIC": unitroot.AIC,
		"BIC": unitroot.BIC, "t-stat": unitroot.GeneralToSpecific}[c.text("lag_selection")]
	if !ok {
		panic(fmt.Sprintf("%s: unknown lag selection %q", c.ID, c.text("lag_selection")))
	}
	return unitroot.Lags{Rule: rule, Fixed: c.whole("lags", 0), Max: c.whole("max_lag", -1)}
}

func driveADF(c refCase, data refData) (map[string]any, error) {
	x := c.values(data)
	runs := series.Runs{x}
	terms := c.terms()
	r, err := unitroot.ADF(runs, terms, c.lags())
	if err != nil {
		return nil, err
	}
	out := map[string]any{"statistic": r.Statistic, "p": r.P, "lags": r.Lags, "n_used": r.N,
		"critical": threeLevels(r.Critical), "criterion": r.Criterion}
	if c.Expect["critical_fuller"] == nil {
		return out, nil
	}
	fuller, err := unitroot.FullerCritical(terms, len(x)-1)
	if err != nil {
		return nil, err
	}
	out["critical_fuller"] = threeLevels(fuller)
	joint := func(key string, under unitroot.Terms) {
		if err == nil {
			out[key], err = unitroot.JointF(runs, terms, under, r.Lags)
		}
	}
	switch terms {
	case unitroot.Constant:
		joint("phi1", unitroot.None)
	case unitroot.Trend:
		joint("phi2", unitroot.None)
		joint("phi3", unitroot.Constant)
	}
	return out, err
}

func threeLevels(v [3]float64) map[string]float64 {
	return map[string]float64{"1%": v[0], "5%": v[1], "10%": v[2]}
}

func driveMacKinnon(c refCase, _ refData) (map[string]any, error) {
	n := c.whole("N", 1)
	critical, err := unitroot.MacKinnonCritical(c.terms(), n, c.whole("n", 0))
	return map[string]any{"p": unitroot.MacKinnonP(c.number("statistic", 0), c.terms(), n),
		"critical": threeLevels(critical)}, err
}

func driveKPSS(c refCase, data refData) (map[string]any, error) {
	x := c.values(data)
	r, err := unitroot.KPSS(series.Runs{x}, c.terms(), c.kpssBandwidth(len(x)))
	return map[string]any{"statistic": r.Statistic, "p": r.P, "bandwidth": r.Bandwidth, "n": r.N,
		"critical": map[string]float64{"10%": r.Critical[0], "5%": r.Critical[1],
			"2.5%": r.Critical[2], "1%": r.Critical[3]}}, err
}

// kpssBandwidth is the bandwidth that the case asks for: a number, or the rule
// that it names.
func (c refCase) kpssBandwidth(n int) int {
	switch c.text("bandwidth_rule") {
	case "auto":
		return -1
	case "legacy":
		return min(int(math.Ceil(12*math.Pow(float64(n)/100, 0.25))), n-1)
	}
	if given := c.whole("bandwidth", -1); given >= 0 {
		return given
	}
	// Some cases state a given bandwidth only among the results.
	given, ok := c.Expect["bandwidth"].(float64)
	if !ok {
		panic("no bandwidth")
	}
	return int(given)
}

func driveMannKendall(c refCase, data refData) (map[string]any, error) {
	r, err := trend.MannKendall(c.values(data))
	return map[string]any{"n": r.N, "S": r.S, "var_S": r.VarS, "Z": r.Z, "p": r.P, "tau_b": r.TauB}, err
}

func driveHamedRao(c refCase, data refData) (map[string]any, error) {
	r, err := trend.MannKendallHamedRao(c.values(data), c.whole("max_lag", 0), c.truth("only_significant"))
	return map[string]any{"S": r.S, "correction": r.Correction, "n_effective": float64(r.N) / r.Correction,
		"var_S_corrected": r.VarS, "Z": r.Z, "p": r.P}, err
}

func driveSeasonal(c refCase, data refData) (map[string]any, error) {
	x := c.values(data)
	s := c.whole("seasons", 0)
	x = x[:len(x)/s*s] // the cases use full seasons
	at := make([]int, len(x))
	for i := range at {
		at[i] = i
	}
	r, err := trend.SeasonalMannKendall(x, at, s, c.text("covariance") != "none")
	return map[string]any{"S": r.S, "S_by_season": r.BySeason, "var_S": r.VarS, "Z": r.Z, "p": r.P,
		"seasonal_sen_slope_per_year": r.Slope}, err
}

func driveTheilSen(c refCase, data refData) (map[string]any, error) {
	x := c.values(data)
	t := make([]float64, len(x))
	for i := range t {
		t[i] = float64(i + 1)
	}
	r, err := trend.TheilSen(t, x, c.number("confidence", 0.95))
	return map[string]any{"slope": r.Slope, "lower": r.Lower, "upper": r.Upper, "intercept": r.Intercept,
		"n_slopes": r.Pairs, "rank_lower": r.RankLower, "rank_upper": r.RankUpper}, err
}
