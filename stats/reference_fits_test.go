package stats_test

import (
	"fmt"
	"math"

	"lagwise/stats/regression"
	"lagwise/stats/residual"
)

func (c refCase) fit(data refData) (regression.Design, *regression.Fit, error) {
	d := c.design(data)
	f, err := regression.OLS(d, 0.95)
	return d, f, err
}

func driveOLS(c refCase, data refData) (map[string]any, error) {
	_, f, err := c.fit(data)
	if err != nil {
		return nil, err
	}
	aic, bic := f.WithoutSigma()
	return map[string]any{"n": f.N, "df": f.N - f.K, "coefficients": f.Coefficients, "se": f.SE, "t": f.T, "p": f.P,
		"r2": f.R2, "adj_r2": f.AdjustedR2, "F": f.F, "F_p": f.FP, "sigma": f.Sigma, "rss": f.RSS, "loglik": f.LogLik,
		"aic_with_sigma": f.AIC, "bic_with_sigma": f.BIC, "aic_without_sigma": aic, "bic_without_sigma": bic,
		"ci95_lower": f.Lower, "ci95_upper": f.Upper}, nil
}

func driveNIST(c refCase, data refData) (map[string]any, error) {
	d := c.design(data)
	d.NoConstant = !c.truth("intercept")
	x := d.X[0]
	for power := 2; power <= c.whole("degree", 1); power++ {
		column := make([]float64, len(x))
		for i, v := range x {
			column[i] = d.X[power-2][i] * v
		}
		d.X = append(d.X, column)
	}
	f, err := regression.OLS(d, 0.95)
	if err != nil {
		return nil, err
	}
	return map[string]any{"n": f.N, "df": f.N - f.K, "coefficients": f.Coefficients, "se": f.SE,
		"sigma": f.Sigma, "r2": f.R2, "rss": f.RSS, "F": f.F}, nil
}

func driveHAC(c refCase, data refData) (map[string]any, error) {
	d, f, err := c.fit(data)
	if err != nil {
		return nil, err
	}
	var g *regression.Fit
	if c.text("kernel") == "Quadratic Spectral" {
		g, err = f.WithQuadraticSpectral(d, c.number("bandwidth", 0), 0.95)
	} else {
		g, err = f.WithNeweyWest(d, c.whole("lag", 0), 0.95)
	}
	if err != nil {
		return nil, err
	}
	factor := math.Sqrt(float64(f.N) / float64(f.N-f.K))
	scaled := make([]float64, len(g.SE))
	for i, se := range g.SE {
		scaled[i] = se * factor
	}
	return map[string]any{"se": g.SE, "t": g.T, "p": g.P, "se_with_small_sample_factor": scaled,
		"vcov_first_row": g.Covariance[0]}, nil
}

func (c refCase) gls(data refData) (*regression.GLSFit, error) {
	g, err := regression.GLS(c.design(data), errorOrder(c), c.text("likelihood") == "REML", 0.95)
	if err != nil {
		return nil, err
	}
	return g.WithDegrees(float64(g.N-g.K), 0.95), nil
}

func parameters(g *regression.GLSFit) map[string]float64 {
	if len(g.AR) == 1 {
		return map[string]float64{"phi": g.AR[0]}
	}
	out := make(map[string]float64)
	for i, a := range g.AR {
		out[fmt.Sprintf("phi%d", i+1)] = a
	}
	return out
}

func driveGLS(c refCase, data refData) (map[string]any, error) {
	g, err := c.gls(data)
	if err != nil {
		return nil, err
	}
	if g.Boundary {
		return nil, fmt.Errorf("the parameter runs to 1: %v", g.AR)
	}
	return map[string]any{"n": g.N, "df": g.N - g.K, "coefficients": g.Coefficients, "se": g.SE, "t": g.T, "p": g.P,
		"correlation": parameters(g), "sigma": g.Sigma, "loglik": g.LogLik, "aic": g.AIC, "bic": g.BIC}, nil
}

func driveBoundary(c refCase, data refData) (map[string]any, error) {
	g, err := c.gls(data)
	if err != nil {
		return nil, err
	}
	if !g.Boundary {
		return nil, fmt.Errorf("an inner optimum at %v", g.AR)
	}
	return map[string]any{"n": g.N, "correlation": parameters(g), "loglik": g.LogLik,
		"slopes": g.Coefficients[1:], "slopes_se": g.SE[1:]}, nil
}

func driveDurbinWatson(c refCase, data refData) (map[string]any, error) {
	d, f, err := c.fit(data)
	if err != nil {
		return nil, err
	}
	t, err := residual.DurbinWatsonP(d, f)
	return map[string]any{"n": f.N, "statistic": t.Statistic,
		"p_exact_positive": t.Positive, "p_exact_two_sided": t.TwoSided,
		"p_normal_positive": t.PositiveByNormal, "p_normal_two_sided": t.TwoSidedByNormal}, err
}

func driveBreuschGodfrey(c refCase, data refData) (map[string]any, error) {
	d, f, err := c.fit(data)
	if err != nil {
		return nil, err
	}
	t, err := residual.BreuschGodfrey(d, f, c.whole("order", 1))
	return map[string]any{"chisq": t.Statistic, "df": t.DF, "p_chisq": t.P, "F": t.F, "df1": t.DF, "df2": t.DF2, "p_F": t.FP}, err
}

func driveRESET(c refCase, data refData) (map[string]any, error) {
	d, f, err := c.fit(data)
	if err != nil {
		return nil, err
	}
	test := residual.RESET
	if c.text("type") == "regressor" {
		test = residual.RESETOfPredictors
	}
	t, err := test(d, f)
	return map[string]any{"F": t.F, "df1": t.DF1, "df2": t.DF2, "p": t.P}, err
}

func driveBreuschPagan(c refCase, data refData) (map[string]any, error) {
	d, f, err := c.fit(data)
	if err != nil {
		return nil, err
	}
	s, err := residual.BreuschPagan(d, f, true)
	if err != nil {
		return nil, err
	}
	o, err := residual.BreuschPagan(d, f, false)
	return map[string]any{"studentized": s.Statistic, "p_studentized": s.P, "original": o.Statistic, "p_original": o.P,
		"df": s.DF}, err
}

func driveWhite(c refCase, data refData) (map[string]any, error) {
	d, f, err := c.fit(data)
	if err != nil {
		return nil, err
	}
	t, err := residual.White(d, f)
	return map[string]any{"LM": t.Statistic, "p_LM": t.P, "F": t.F, "p_F": t.FP, "df": t.DF}, err
}

func driveInfluence(c refCase, data refData) (map[string]any, error) {
	_, f, err := c.fit(data)
	if err != nil {
		return nil, err
	}
	in, err := residual.InfluenceOf(f)
	if err != nil {
		return nil, err
	}
	at := 0
	for i, d := range in.Cooks {
		if d > in.Cooks[at] {
			at = i
		}
	}
	most := 0.0
	for _, h := range in.Leverage {
		most = math.Max(most, h)
	}
	return map[string]any{"leverage": in.Leverage, "cooks_distance": in.Cooks, "max_cook": in.Cooks[at],
		"max_cook_index": at + 1, "max_leverage": most}, nil
}

func driveVIF(c refCase, data refData) (map[string]any, error) {
	d, f, err := c.fit(data)
	if err != nil {
		return nil, err
	}
	return map[string]any{"vif": residual.VIF(d, f)}, nil
}
