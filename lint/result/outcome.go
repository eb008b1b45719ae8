package result

import (
	"encoding/hex"
	"errors"
	"fmt"

	"lagwise/lint/dataset"
	"lagwise/lint/evidence"
	"lagwise/lint/request"
	"lagwise/stats/association"
)

const level = 0.95

// Outcomes computes what the request of a case gives: one outcome a pair of a
// correlation, or one for a regression. What the data do not allow stands in
// the outcome's Error; the error returned is that of the run alone
// (cancelled, broken down).
func Outcomes(c *evidence.Case) ([]*Outcome, error) {
	if c.Req().Kind == request.Regression {
		o := regression(c)
		return []*Outcome{o}, c.Failure()
	}
	var all []*Outcome
	for _, pair := range c.Pairs() {
		all = append(all, correlation(c, pair[0], pair[1]))
	}
	return all, c.Failure()
}

// heading is what every outcome holds of its request and rows.
func heading(c *evidence.Case) (*Outcome, *dataset.Frame, error) {
	r := c.Req()
	o := &Outcome{On: onNames(r.On), Lag: r.Lag, Level: level, Alpha: c.Settings.Alpha}
	frame, err := c.Used()
	if err != nil {
		o.Error = Words(err)
		return o, nil, err
	}
	o.N = len(frame.Positions)
	o.From, o.Until = frame.From, frame.Until
	o.Data = "sha256:" + hex.EncodeToString(frame.Digest[:])
	return o, frame, nil
}

func onNames(on []request.Transform) []string {
	names := make([]string, len(on))
	for i, t := range on {
		names[i] = t.String()
	}
	return names
}

// Words says in a sentence why something could not be computed.
func Words(err error) string {
	var u *evidence.Unavailable
	if errors.As(err, &u) {
		return u.Trouble.Message
	}
	return err.Error()
}

func correlation(c *evidence.Case, i, j int) *Outcome {
	o, _, err := heading(c)
	o.Coefficient, o.Inference = c.Req().Coefficient, c.Req().Inference
	if err != nil {
		return o
	}
	r, err := c.Pair(i, j)
	if err != nil {
		o.Error = Words(err)
		return o
	}
	fill(o, r)
	if *o.P >= c.Settings.Alpha {
		o.Detectable = c.Detectable(r)
	}
	return o
}

func fill(o *Outcome, r association.Result) {
	o.Estimate, o.Statistic, o.P = &r.Estimate, &r.Statistic, &r.P
	o.Interval = &[2]float64{r.Lower, r.Upper}
	if r.DF > 0 {
		o.DF = &r.DF
	}
	if o.Inference == "effective-n" {
		o.EffectiveN = &r.EffectiveN
		o.Approximate = true
	}
}

func regression(c *evidence.Case) *Outcome {
	o, _, err := heading(c)
	r := c.Req()
	o.Estimator, o.StandardErrors = r.Estimator, r.StandardErrors
	o.Inference = r.StandardErrors
	if err != nil {
		return o
	}
	fit, err := c.Fit()
	if err != nil {
		o.Error = Words(err)
		return o
	}
	coefficients(o, fit)
	summary(o, fit)
	checks(o, fit)
	return o
}

func coefficients(o *Outcome, fit *evidence.Fit) {
	f := fit.Fit
	for k, term := range fit.Terms {
		row := Coefficient{Of: term.Of, Role: term.Role, Lag: term.Lag,
			Estimate: &f.Coefficients[k], StandardError: &f.SE[k], Statistic: &f.T[k], DF: &f.DF[k], P: &f.P[k],
			Interval: &[2]float64{f.Lower[k], f.Upper[k]}}
		if f.EffectiveN != nil && term.Role != "constant" {
			row.EffectiveN = &f.EffectiveN[k]
		}
		o.Coefficients = append(o.Coefficients, row)
	}
	if len(o.Coefficients) < 2 {
		return
	}
	first := o.Coefficients[1]
	o.Estimate, o.Interval, o.Statistic, o.DF, o.P = first.Estimate, first.Interval, first.Statistic, first.DF, first.P
	o.EffectiveN = first.EffectiveN
}

func summary(o *Outcome, fit *evidence.Fit) {
	f := fit.Fit
	o.ResidualSD, o.LogLikelihood, o.AIC, o.BIC = &f.Sigma, &f.LogLik, &f.AIC, &f.BIC
	if fit.GLS == nil {
		o.RSquared = &f.R2
		return
	}
	o.ErrorProcess = &ErrorProcess{Process: fmt.Sprintf("ar(%d)", fit.GLS.Order), Parameters: fit.GLS.AR}
	for k := range fit.GLS.AR {
		if k < len(fit.GLS.Intervals) {
			o.ErrorProcess.Intervals = append(o.ErrorProcess.Intervals, &fit.GLS.Intervals[k])
		} else {
			o.ErrorProcess.Intervals = append(o.ErrorProcess.Intervals, nil)
		}
	}
	if fit.GLS.Boundary {
		o.Cautions = append(o.Cautions, "The likelihood rises towards a unit root of the errors: first differences say the same with fewer assumptions.")
	}
}

func checks(o *Outcome, fit *evidence.Fit) {
	if g := fit.Godfrey; g != nil {
		o.ResidualChecks = append(o.ResidualChecks, Check{Test: "Breusch-Godfrey", Order: &g.DF, Statistic: &g.Statistic, DF: []float64{float64(g.DF)}, P: &g.P})
	}
	if l := fit.LjungBox; l != nil {
		o.ResidualChecks = append(o.ResidualChecks, Check{Test: "Ljung-Box", Order: &l.Lags, Statistic: &l.Statistic, DF: []float64{float64(l.DF)}, P: &l.P})
	}
}
