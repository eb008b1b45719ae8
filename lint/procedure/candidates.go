package procedure

import (
	"fmt"
	"slices"

	"lagwise/lint/evidence"
	"lagwise/lint/request"
)

// Candidate is one request that could stand in place of the one asked.
type Candidate struct {
	Request  request.Request
	Title    string // what it does, in the imperative, without a full stop
	Question bool   // it asks something else; never preferred
}

// Candidates gathers the facts of a case and proposes.
func Candidates(c *evidence.Case) ([]Candidate, error) {
	f, err := GatherFacts(c)
	if err != nil {
		return nil, err
	}
	return Propose(f), nil
}

// Propose returns the candidates in the order of preference: the first that
// leaves nothing to object to is the preferred one.
func Propose(f Facts) []Candidate {
	var all []Candidate
	if f.Request.Kind == request.Regression {
		all = f.regressions()
	} else {
		all = f.correlations()
	}
	all = append(all, f.questions()...)
	return distinct(f.Request, all)
}

// correlations, in this order:
//  1. the differencing that the request already has, with effective-n
//  2. first differences (rates of change when uneven; with the season taken
//     off first when it is fixed, differenced when it is stochastic)
//     and, in case the season proves to change all the same, with it differenced
//  3. the second differences where the first still walk
//  4. prewhitened, when every series holds a level or a line
//  5. levels or detrended with effective-n, for the same
//  6. the same values with a rank coefficient
func (f Facts) correlations() []Candidate {
	var all []Candidate
	head, tail := evidence.SplitOn(f.Request.On)
	if evidence.Differences(tail) {
		all = append(all, f.correlate(f.Request.On, "effective-n"))
	}
	if f.walks() || f.drifts() || f.Autocorrelated || f.Season != NoSeason || evidence.Differences(tail) {
		all = append(all, f.correlate(f.differenced(), "effective-n"))
		if f.Season == FixedSeason {
			all = append(all, f.correlate(f.seasonallyDifferenced(), "effective-n"))
		}
	}
	if f.Walking {
		all = append(all, f.correlate(twice(f.differenced()), "effective-n"))
	}
	if f.walks() || f.AlwaysDifference {
		return append(all, f.ranked()...)
	}
	all = append(all, f.correlate(join(head, request.Prewhitened), "usual"))
	all = append(all, f.correlate(f.held(head), "effective-n"))
	return append(all, f.ranked()...)
}

// held is the levels, without the line or the season where there is one.
func (f Facts) held(head []request.Transform) []request.Transform {
	on := slices.Clone(head)
	if f.Season != NoSeason {
		on = join(on, request.Anomalies)
	}
	if f.trends() {
		on = join(on, request.Detrended)
	}
	return on
}

// ranked is the request as written with a rank coefficient, where Pearson's
// does not suit.
func (f Facts) ranked() []Candidate {
	if f.Request.Coefficient != "pearson" || !f.Unsuited(f.Request.On) {
		return nil
	}
	r := f.Request
	r.Coefficient = "spearman"
	return []Candidate{{Request: r, Title: title(r)}}
}

func (f Facts) correlate(on []request.Transform, inference string) Candidate {
	r := f.Request
	r.On, r.Inference = on, inference
	if r.Coefficient == "pearson" && f.Unsuited(on) {
		r.Coefficient = "spearman"
	}
	return Candidate{Request: r, Title: title(r)}
}

// differenced is the usual differencing of the request's series. A fixed
// season is taken off the differences, never off the levels before them: the
// seasonal means of a level that moves through the year hold a twelfth of its
// yearly movement each, and taking them off first would leave that movement
// as a jump at every turn of the year, in all series alike.
func (f Facts) differenced() []request.Transform {
	head, _ := evidence.SplitOn(f.Request.On)
	step := request.FirstDifferences
	if !f.Even {
		step = request.RatesOfChange
	}
	switch f.Season {
	case FixedSeason:
		return join(head, step, request.Anomalies)
	case StochasticSeason:
		return f.seasonallyDifferenced()
	}
	return join(head, step)
}

// seasonallyDifferenced is the differencing for a season that changes over
// time: of the values one season apart, then along the axis.
func (f Facts) seasonallyDifferenced() []request.Transform {
	head, _ := evidence.SplitOn(f.Request.On)
	return join(head, request.SeasonalDifferences, request.FirstDifferences)
}

// twice differences once more, before a season is taken off.
func twice(on []request.Transform) []request.Transform {
	for i, t := range on {
		if evidence.Differences(on[i : i+1]) {
			return slices.Insert(slices.Clone(on), i, t)
		}
	}
	return on
}

func join(head []request.Transform, names ...string) []request.Transform {
	on := slices.Clone(head)
	for _, n := range names {
		on = append(on, request.Transform{Name: n})
	}
	return on
}

// regressions, in this order:
//  1. anything walks: least squares on first differences with effective-n
//     (second differences where these still walk)
//  2. a line: GLS with a trend term, of the smallest order that whitens
//  3. a level: GLS of the smallest order that whitens
//
// and after 2 and 3 least squares on first differences, after 1 GLS as it
// stands, so that both are always among what is offered. Where nothing drifts,
// least squares on the levels with effective-n comes last: no order may whiten
// the errors, and differencing may be once too often.
func (f Facts) regressions() []Candidate {
	differences := f.regressDifferences()
	gls := f.generalized()
	if f.walks() || f.AlwaysDifference && f.drifts() {
		return append(differences, gls)
	}
	if evidence.Differences(f.Request.On) {
		kept := f.Request
		leastSquares(&kept, "effective-n")
		return append([]Candidate{gls, {Request: kept, Title: title(kept)}}, differences...)
	}
	all := append([]Candidate{gls}, differences...)
	if !f.drifts() {
		all = append(all, f.countedLevels())
	}
	return all
}

// countedLevels is least squares on the levels, with seasonal terms where the
// season is fixed, and standard errors that count how many values there are.
func (f Facts) countedLevels() Candidate {
	r := f.Request
	r.On, _ = evidence.SplitOn(r.On)
	r.SeasonalTerms = r.SeasonalTerms || f.Season == FixedSeason
	leastSquares(&r, "effective-n")
	return Candidate{Request: r, Title: title(r)}
}

func (f Facts) regressDifferences() []Candidate {
	r := f.Request
	r.On, r.Trend, r.SeasonalTerms = f.differenced(), false, false
	leastSquares(&r, "effective-n")
	all := []Candidate{{Request: r, Title: title(r)}}
	if f.Season == FixedSeason {
		changing := r
		changing.On = f.seasonallyDifferenced()
		all = append(all, Candidate{Request: changing, Title: title(changing)})
	}
	if f.Walking {
		second := r
		second.On = twice(r.On)
		all = append(all, Candidate{Request: second, Title: title(second)})
	}
	return all
}

func leastSquares(r *request.Request, errors string) {
	r.Estimator, r.Errors, r.StandardErrors = "ols", "independent", errors
}

func (f Facts) generalized() Candidate {
	r := f.Request
	head, _ := evidence.SplitOn(r.On)
	r.On = head
	r.Estimator, r.StandardErrors, r.Likelihood = "gls", "usual", "reml"
	r.Trend = r.Trend || f.trends()
	r.SeasonalTerms = r.SeasonalTerms || f.Season == FixedSeason
	r.Errors = autoregressive(f.Whitens(r))
	return Candidate{Request: r, Title: title(r)}
}

func autoregressive(order int) string { return fmt.Sprintf("ar(%d)", order) }

// questions are the rewrites that ask something else: they are offered, and
// never preferred.
func (f Facts) questions() []Candidate {
	r := f.Request
	var all []Candidate
	if r.Aim == "" {
		for _, aim := range []string{"association", "effect", "prediction"} {
			with := r
			with.Aim = aim
			all = append(all, Candidate{Request: with, Title: fmt.Sprintf("State the aim: %s", aim), Question: true})
		}
	}
	if other, ok := otherKind(r); ok {
		all = append(all, Candidate{Request: other, Title: title(other), Question: true})
	}
	return all
}

// otherKind is the kind of request that suits the stated aim: a response and
// a direction call for a regression, mutual association for a correlation.
func otherKind(r request.Request) (request.Request, bool) {
	switch {
	case r.Kind == request.Correlation && (r.Aim == "effect" || r.Aim == "prediction") && len(r.Between) == 2 && r.Lag == 0:
		o := r
		o.Kind = request.Regression
		o.Response = r.Between[0]
		for _, name := range append(slices.Clone(r.Between[1:]), r.Given...) {
			o.Predictors = append(o.Predictors, request.Predictor{Series: name})
		}
		o.Between, o.Given, o.Coefficient, o.Inference, o.RemoveFrom = nil, nil, "", "", ""
		o.Estimator, o.Errors, o.StandardErrors, o.Likelihood, o.Form = "ols", "independent", "usual", "reml", "static"
		if r.Inference == "effective-n" {
			o.StandardErrors = "effective-n"
		}
		return o, true
	case r.Kind == request.Regression && r.Aim == "association" && len(r.Predictors) == 1 && r.Predictors[0].Lag == 0:
		o := r
		o.Kind = request.Correlation
		o.Between = []string{r.Response, r.Predictors[0].Series}
		o.Response, o.Predictors = "", nil
		o.Estimator, o.Errors, o.StandardErrors, o.Likelihood, o.Form = "", "", "", "", ""
		o.Trend, o.SeasonalTerms = false, false
		o.Coefficient, o.Inference, o.RemoveFrom, o.Replicates = "pearson", "usual", "both", 2000
		if r.StandardErrors == "effective-n" {
			o.Inference = "effective-n"
		}
		return o, true
	}
	return r, false
}

// distinct drops candidates that say what the request says, or what an
// earlier candidate says.
func distinct(asked request.Request, all []Candidate) []Candidate {
	var kept []Candidate
	for _, c := range all {
		same := len(request.Changed(&asked, &c.Request)) == 0 && asked.Kind == c.Request.Kind
		for _, k := range kept {
			same = same || k.Request.Kind == c.Request.Kind && len(request.Changed(&k.Request, &c.Request)) == 0
		}
		if !same {
			kept = append(kept, c)
		}
	}
	return kept
}
