package request

import (
	"crypto/sha256"
	"fmt"
	"maps"
	"slices"
)

// digest is over every key of the request that bears on what is computed or
// judged: all but its name, question and deviations. Each part is quoted, so
// that no two requests share one text.
func (r *Request) digest() [32]byte {
	h := sha256.New()
	put := func(parts ...any) {
		for _, p := range parts {
			fmt.Fprintf(h, "%q;", fmt.Sprint(p))
		}
		fmt.Fprintln(h)
	}
	list := func(words []string) {
		put(len(words))
		for _, w := range words {
			put(w)
		}
	}
	put(r.Kind, r.Aim, r.Expected, r.Planned != nil, r.Planned != nil && *r.Planned, r.TimeScale)
	list(r.Between)
	list(r.Given)
	put(r.RemoveFrom, r.Coefficient, r.Inference, r.Replicates, r.Response)
	for _, p := range r.Predictors {
		put(p.Series, p.Lag)
	}
	put(r.Estimator, r.Errors, r.Likelihood, r.StandardErrors, r.Trend, r.SeasonalTerms, r.Form, r.Lag)
	put(r.On)
	for _, s := range slices.Sorted(maps.Keys(r.OnEach)) {
		put(s, r.OnEach[s])
	}
	put(r.Every, r.Aggregate, r.LeastShare, r.YearStarts, r.Tolerance, r.From, r.Until, r.Groups)
	list(r.GroupList)
	if r.Lags != nil {
		put("lags", r.Lags.From, r.Lags.To)
	}
	if r.Grid != nil {
		put("grid", r.Grid.Step, r.Grid.By)
	}
	return [32]byte(h.Sum(nil))
}
