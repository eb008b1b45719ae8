package result

import (
	"fmt"
	"strings"

	"lagwise/lint/dataset"
	"lagwise/lint/evidence"
	"lagwise/lint/request"
	"lagwise/stats/series"
)

// Explain gathers what the hover and the text show of one request: the
// evidence of each series and the result on levels, as written and as
// recommended. recommended is nil where no rewrite is preferred; leaves are
// the rules that would still speak of it.
func Explain(c, recommended *evidence.Case, leaves []string) (*Explanation, error) {
	e := &Explanation{File: c.Asked.File, Request: c.Asked.Name, Kind: c.Req().Kind.String(), Title: titleOf(c.Req())}
	frame, err := c.Levels()
	if err != nil {
		return e, c.Failure()
	}
	e.From, e.Until, e.N = frame.From, frame.Until, len(frame.Positions)
	for i, name := range c.Names() {
		s, err := seriesEvidence(c, frame, i, name)
		if err != nil {
			return nil, err
		}
		e.Series = append(e.Series, s)
	}
	if e.Results, err = Compare(c, recommended); err != nil {
		return nil, err
	}
	e.Side = sides(c, recommended, e.Results, leaves, frame)
	return e, c.Failure()
}

func titleOf(r *request.Request) string {
	of := request.OnWords(r.On)
	if r.Kind == request.Correlation {
		kind := "correlation"
		switch {
		case len(r.Given) > 0 && r.RemoveFrom != "both":
			kind = "semipartial correlation"
		case len(r.Given) > 0:
			kind = "partial correlation"
		}
		return kind + " of " + of
	}
	if r.Estimator == "gls" {
		return fmt.Sprintf("regression of %s, GLS with %s errors", of, r.Errors)
	}
	return "regression of " + of
}

func seriesEvidence(c *evidence.Case, frame *dataset.Frame, i int, name string) (SeriesEvidence, error) {
	s := SeriesEvidence{Name: name, N: len(frame.Positions), Levels: Thin(frame.Columns[i])}
	s.Differences = Thin(series.Differences(frame.SeriesRuns(i), 1).Concat())
	p, err := c.BaseProfile(i)
	if err != nil {
		return s, c.Failure()
	}
	s.Verdict, s.Tests, s.Notes = string(p.Verdict), p.Tests, p.Notes
	return s, nil
}

// sides are the lines that put the choices side by side.
func sides(c, recommended *evidence.Case, results []Computed, leaves []string, frame *dataset.Frame) []Side {
	var all []Side
	for _, r := range results {
		label := ""
		if len(results) > 1 {
			label = r.Pair[0] + " and " + r.Pair[1] + ": "
		}
		all = append(all, Side{Label: label + "on levels", Symbol: symbol(r.OnLevels), Outcome: r.OnLevels, Remark: levelsRemark(c)})
		if len(request.Changed(c.Req(), ptr(Levels(*c.Req())))) > 0 {
			all = append(all, Side{Label: label + "as written", Symbol: symbol(r.AsWritten), Outcome: r.AsWritten, Remark: remark(c, frame)})
		}
		if recommended != nil && len(r.Changed) > 0 {
			note := remark(recommended, frame)
			if len(leaves) == 0 {
				note += "; leaves nothing to object to"
			} else {
				note += "; leaves " + strings.Join(leaves, ", ")
			}
			all = append(all, Side{Label: label + sideLabel(recommended.Req()), Symbol: symbol(r.Recommended), Outcome: r.Recommended, Remark: note})
		}
	}
	return all
}

func ptr(r request.Request) *request.Request { return &r }

func sideLabel(r *request.Request) string {
	of := request.OnWords(r.On)
	if r.Kind == request.Regression && r.Estimator == "gls" {
		label := "on " + of + ", GLS " + r.Errors
		if r.Trend {
			label += " + trend"
		}
		return label
	}
	return "on " + of
}

func symbol(o *Outcome) string {
	switch o.Coefficient {
	case "spearman":
		return "rho"
	case "kendall":
		return "tau"
	case "pearson":
		return "r"
	}
	return "slope"
}

// levelsRemark says what a number on levels speaks about.
func levelsRemark(c *evidence.Case) string {
	drifting := 0
	for i := range c.Names() {
		if p, err := c.BaseProfile(i); err == nil && p.Verdict.Drifts() {
			drifting++
		}
	}
	switch {
	case drifting >= 2:
		return "what their drifts share"
	case drifting == 1:
		return "one of them drifts"
	}
	return "the values as measured"
}

// remark says what a number on transformed values speaks about.
func remark(c *evidence.Case, frame *dataset.Frame) string {
	on := c.Req().On
	switch {
	case evidence.Differences(on):
		return StepWord(frame) + " movement"
	case evidence.Prewhitens(on):
		return "what is new in each value"
	case evidence.Detrends(on):
		return "departures from the fitted lines"
	case c.Req().Trend:
		return "given a common trend"
	}
	return "the values as measured"
}

// StepWord names the movement from one step to the next: year-to-year.
func StepWord(frame *dataset.Frame) string {
	switch frame.Unit {
	case dataset.Year:
		return "year-to-year"
	case dataset.Month:
		return "month-to-month"
	case dataset.Day:
		return "day-to-day"
	}
	return "step-to-step"
}
