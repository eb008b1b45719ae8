package request

import (
	"fmt"
	"maps"
	"slices"

	"lagwise/lint/document"
)

// correlationContradictions reports what a correlation cannot ask at once.
// What contradicts takes its default where another key is the better guess of
// what was meant.
func (c *checker) correlationContradictions(a *Asked, r reader) {
	if between := r.node("between"); between != nil {
		if len(a.Between) < 2 && !c.broken(r.n) {
			c.add(Problem{Rule: "wrong-value", At: between.At, Message: "A correlation is between two series or more."})
		}
		c.repeats(r.items(between), nil, "%s stands in between twice.")
	}
	if given := r.node("given"); given != nil {
		c.repeats(r.items(given), a.Between, "%s is in between or given already; a series is not controlled for itself.")
	}
	lag, lags := r.node("lag"), r.n.Get("lags")
	if lag != nil && lags != nil {
		c.wrong(lag, "lag is one lag and lags a window to scan; a request has one of them.")
		a.Lag = 0
	} else if lag != nil && a.Lag != 0 && len(a.Between) > 2 {
		c.wrong(lag, "lag says by how much the second series trails the first; this request has %d.", len(a.Between))
		a.Lag = 0
	}
	if a.Lags != nil && len(a.Between) > 2 {
		c.wrong(lags.Value, "lags says by how much the second series trails the first; this request has %d.", len(a.Between))
		a.Lags = nil
	}
	if from := r.node("remove-from"); from != nil && a.RemoveFrom != "both" && r.n.Get("given") == nil {
		c.wrong(from, "remove-from says where the series of given are removed; none is given.")
		a.RemoveFrom = "both"
	}
}

// repeats reports each name that was there before it, in the list or among
// those known already.
func (c *checker) repeats(items []*document.Node, known []string, format string) {
	seen := slices.Clone(known)
	for _, item := range items {
		name := scalar(item)
		if slices.Contains(seen, name) {
			c.add(Problem{Rule: "wrong-value", At: item.At, Message: fmt.Sprintf(format, shown(name))})
		}
		seen = append(seen, name)
	}
}

// regressionContradictions reports what a regression cannot ask at once.
func (c *checker) regressionContradictions(a *Asked, r reader) {
	if n := r.node("predictors"); n != nil && len(a.Predictors) == 0 && len(n.Items) == 0 && n.Kind == document.Array && !c.broken(r.n) {
		c.add(Problem{Rule: "wrong-value", At: n.At, Message: "A regression has one predictor or more."})
	}
	seen := map[Predictor]bool{}
	for _, p := range c.predictors(r) {
		switch {
		case a.Response != "" && p.Series == a.Response:
			c.add(Problem{Rule: "wrong-value", At: p.name,
				Message: fmt.Sprintf("%s is the response; for its own past as a predictor write form = \"dynamic\".", shown(p.Series))})
		case seen[p.Predictor]:
			c.add(Problem{Rule: "wrong-value", At: p.node.At, Message: fmt.Sprintf("%s stands among the predictors twice.", shown(p.Series))})
		}
		seen[p.Predictor] = true
	}
}

// seriesOfOnEach reports transforms of a series that the request does not
// name.
func (c *checker) seriesOfOnEach(a *Asked, r reader) {
	n := r.table("on-each")
	named := a.Series()
	if n == nil || len(named) == 0 || c.broken(r.n) {
		return
	}
	for _, m := range n.Members {
		if slices.Contains(named, m.Key.Text) {
			continue
		}
		p := Problem{Rule: "wrong-value", At: m.Key.At,
			Message: fmt.Sprintf("%s is not a series of this request.", shown(m.Key.Text))}
		free := slices.DeleteFunc(slices.Clone(named), func(s string) bool { return n.Get(s) != nil })
		if near := Nearest(m.Key.Text, free); near != "" {
			p.Message += fmt.Sprintf(" The nearest is %q.", near)
			p.Nearest = &document.Edit{At: m.Key.At, Text: quoteKey(near)}
		}
		c.add(p)
	}
	maps.DeleteFunc(a.OnEach, func(series string, _ []Transform) bool { return !slices.Contains(named, series) })
	if len(a.OnEach) == 0 {
		a.OnEach = nil
	}
}
