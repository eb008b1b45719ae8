package present

import (
	"io"

	"lagwise/lint/result"
)

type computeJSON struct {
	Head
	Results []computedJSON `json:"results"`
}

type computedJSON struct {
	File        string       `json:"file"`
	Request     string       `json:"request"`
	Kind        string       `json:"kind"`
	Pair        *[2]string   `json:"pair"`
	OnLevels    *outcomeJSON `json:"on-levels"`
	AsWritten   *outcomeJSON `json:"as-written"`
	Recommended *outcomeJSON `json:"recommended"`
	Changed     []string     `json:"changed"`
}

type outcomeJSON struct {
	On             []string   `json:"on"`
	Coefficient    *string    `json:"coefficient"`
	Inference      *string    `json:"inference"`
	Lag            int        `json:"lag"`
	N              int        `json:"n"`
	EffectiveN     number     `json:"effective-n"`
	Estimate       number     `json:"estimate"`
	Interval       *[2]number `json:"interval"`
	Statistic      number     `json:"statistic"`
	DF             number     `json:"df"`
	P              number     `json:"p"`
	PBound         *string    `json:"p-bound"`
	Level          number     `json:"level"`
	From           *string    `json:"from"`
	Until          *string    `json:"until"`
	Data           *string    `json:"data"`
	Detectable     number     `json:"detectable"`
	Approximate    bool       `json:"approximate"`
	Cautions       []string   `json:"cautions"`
	Error          *string    `json:"error"`
	*regressedJSON            // of a regression
}

type regressedJSON struct {
	Coefficients   []coefficientJSON `json:"coefficients"`
	Estimator      *string           `json:"estimator"`
	StandardErrors *string           `json:"standard-errors"`
	ResidualSD     number            `json:"residual-sd"`
	RSquared       number            `json:"r-squared"`
	LogLikelihood  number            `json:"log-likelihood"`
	AIC            number            `json:"aic"`
	BIC            number            `json:"bic"`
	ErrorProcess   *processJSON      `json:"error-process"`
	ResidualChecks []checkJSON       `json:"residual-checks"`
}

type coefficientJSON struct {
	Of            string     `json:"of"`
	Role          string     `json:"role"`
	Lag           int        `json:"lag"`
	Estimate      number     `json:"estimate"`
	StandardError number     `json:"standard-error"`
	Statistic     number     `json:"statistic"`
	DF            number     `json:"df"`
	P             number     `json:"p"`
	Interval      *[2]number `json:"interval"`
	EffectiveN    number     `json:"effective-n"`
}

type processJSON struct {
	Process    string       `json:"process"`
	Parameters []number     `json:"parameters"`
	Intervals  []*[2]number `json:"intervals"`
}

type checkJSON struct {
	Test      string   `json:"test"`
	Order     *int     `json:"order"`
	Statistic number   `json:"statistic"`
	DF        []number `json:"df"`
	P         number   `json:"p"`
}

// ComputeJSON writes what requests give.
func ComputeJSON(w io.Writer, head Head, all []result.Computed) error {
	out := computeJSON{Head: head, Results: []computedJSON{}}
	for _, c := range all {
		out.Results = append(out.Results, computedJSON{File: c.File, Request: c.Request, Kind: c.Kind, Pair: c.Pair,
			OnLevels: outcomeRow(c.OnLevels, c.Kind), AsWritten: outcomeRow(c.AsWritten, c.Kind),
			Recommended: outcomeRow(c.Recommended, c.Kind), Changed: orEmpty(c.Changed)})
	}
	return writeJSON(w, out)
}

func outcomeRow(o *result.Outcome, kind string) *outcomeJSON {
	if o == nil {
		return nil
	}
	row := &outcomeJSON{On: orEmpty(o.On), Coefficient: orNull(o.Coefficient), Inference: orNull(o.Inference), Lag: o.Lag, N: o.N,
		EffectiveN: number{o.EffectiveN}, Estimate: number{o.Estimate}, Interval: interval(o.Interval), Statistic: number{o.Statistic},
		DF: number{o.DF}, P: number{o.P}, PBound: bound(o.PBound), Level: levelOf(o), From: orNull(o.From), Until: orNull(o.Until),
		Data: orNull(o.Data), Detectable: number{o.Detectable}, Approximate: o.Approximate, Cautions: orEmpty(o.Cautions), Error: orNull(o.Error)}
	if kind == "regression" {
		row.regressedJSON = regressedRow(o)
	}
	return row
}

// levelOf is the level of the interval; null where nothing was computed.
func levelOf(o *result.Outcome) number {
	if o.Level == 0 {
		return number{}
	}
	return value(o.Level)
}

func regressedRow(o *result.Outcome) *regressedJSON {
	row := &regressedJSON{Coefficients: []coefficientJSON{}, Estimator: orNull(o.Estimator), StandardErrors: orNull(o.StandardErrors), ResidualSD: number{o.ResidualSD}, RSquared: number{o.RSquared},
		LogLikelihood: number{o.LogLikelihood}, AIC: number{o.AIC}, BIC: number{o.BIC}, ResidualChecks: []checkJSON{}}
	for _, c := range o.Coefficients {
		row.Coefficients = append(row.Coefficients, coefficientJSON{c.Of, c.Role, c.Lag, number{c.Estimate}, number{c.StandardError},
			number{c.Statistic}, number{c.DF}, number{c.P}, interval(c.Interval), number{c.EffectiveN}})
	}
	if p := o.ErrorProcess; p != nil {
		row.ErrorProcess = &processJSON{Process: p.Process, Parameters: numbers(p.Parameters), Intervals: []*[2]number{}}
		for _, i := range p.Intervals {
			row.ErrorProcess.Intervals = append(row.ErrorProcess.Intervals, interval(i))
		}
	}
	for _, c := range o.ResidualChecks {
		row.ResidualChecks = append(row.ResidualChecks, checkJSON{c.Test, c.Order, number{c.Statistic}, numbers(c.DF), number{c.P}})
	}
	return row
}
