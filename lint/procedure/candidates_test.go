package procedure

import (
	"slices"
	"strings"
	"testing"

	"lagwise/lint/evidence"
	"lagwise/lint/request"
)

func correlation(on ...string) request.Request {
	r := request.Request{Kind: request.Correlation, Aim: "association", Between: []string{"eelgrass", "boats"}, RemoveFrom: "both",
		Coefficient: "pearson", Inference: "usual", Replicates: 2000}
	r.On = join(nil, on...)
	return r
}

func regression(on ...string) request.Request {
	r := request.Request{Kind: request.Regression, Aim: "effect", Response: "eelgrass", Predictors: []request.Predictor{{Series: "nitrate"}},
		Estimator: "ols", Errors: "independent", Likelihood: "reml", StandardErrors: "usual", Form: "static"}
	r.On = join(nil, on...)
	return r
}

func facts(r request.Request, verdicts ...evidence.Verdict) Facts {
	return Facts{Request: r, Verdicts: verdicts, Even: true,
		Unsuited: func([]request.Transform) bool { return false }, Whitens: func(request.Request) int { return 1 }}
}

// short writes a candidate in a line: its transforms, then how it is inferred.
func short(c Candidate) string {
	r := c.Request
	words := []string{strings.Trim(request.FormatOn(r.On), `"`)}
	if r.Kind == request.Regression {
		words = append(words, r.Estimator, r.Errors, r.StandardErrors)
		if r.Trend {
			words = append(words, "trend")
		}
		if r.SeasonalTerms {
			words = append(words, "season")
		}
	} else {
		words = append(words, r.Inference)
		if r.Coefficient != "pearson" {
			words = append(words, r.Coefficient)
		}
	}
	return strings.ReplaceAll(strings.Join(words, " "), `"`, "")
}

// The order of the candidates is that of the decision procedure (design of
// this project, calibrated by simulation; see the benchmark of cmd/lagwise).
func TestOrderOfCandidates(t *testing.T) {
	const (
		st  = evidence.Stationary
		tr  = evidence.TrendStationary
		ds  = evidence.DifferenceStationary
		inc = evidence.Inconclusive
	)
	with := func(f Facts, change func(*Facts)) Facts { change(&f); return f }
	for _, row := range []struct {
		name  string
		facts Facts
		want  []string
	}{
		{"both walk", facts(correlation(), ds, ds), []string{"first-differences effective-n"}},
		{"one inconclusive", facts(correlation(), inc, st), []string{"first-differences effective-n"}},
		{"both hold a line", facts(correlation(), tr, tr),
			[]string{"first-differences effective-n", "prewhitened usual", "detrended effective-n"}},
		{"both hold a level, autocorrelated", with(facts(correlation(), st, st), func(f *Facts) { f.Autocorrelated = true }),
			[]string{"first-differences effective-n", "prewhitened usual", "levels effective-n"}},
		{"uneven", with(facts(correlation(), ds, ds), func(f *Facts) { f.Even = false }), []string{"rates-of-change effective-n"}},
		{"fixed season", with(facts(correlation(), ds, ds), func(f *Facts) { f.Season = FixedSeason }), []string{"[first-differences, anomalies] effective-n", "[seasonal-differences, first-differences] effective-n"}},
		{"stochastic season", with(facts(correlation(), ds, ds), func(f *Facts) { f.Season = StochasticSeason }),
			[]string{"[seasonal-differences, first-differences] effective-n"}},
		{"twice integrated", with(facts(correlation(), ds, ds), func(f *Facts) { f.Walking = true }),
			[]string{"first-differences effective-n", "[first-differences, first-differences] effective-n"}},
		{"logarithms stay", facts(correlation("log"), ds, ds), []string{"[log, first-differences] effective-n"}},
		{"differences already", facts(correlation("first-differences"), ds, ds), []string{"first-differences effective-n"}},
		{"a lab that always differences", with(facts(correlation(), tr, tr), func(f *Facts) { f.AlwaysDifference = true }),
			[]string{"first-differences effective-n"}},
		{"an unsuited scatter", with(facts(correlation(), ds, ds), func(f *Facts) {
			f.Unsuited = func(on []request.Transform) bool { return len(on) > 0 }
		}), []string{"first-differences effective-n spearman"}},
		{"regression of walks", facts(regression(), ds, ds),
			[]string{"first-differences ols independent effective-n", "levels gls ar(1) usual"}},
		{"regression around lines", facts(regression(), tr, st),
			[]string{"levels gls ar(1) usual trend", "first-differences ols independent effective-n"}},
		{"regression of levels", with(facts(regression(), st, st), func(f *Facts) { f.Whitens = func(request.Request) int { return 2 } }),
			[]string{"levels gls ar(2) usual", "first-differences ols independent effective-n", "levels ols independent effective-n"}},
		{"regression with a fixed season", with(facts(regression(), st, st), func(f *Facts) { f.Season = FixedSeason }),
			[]string{"levels gls ar(1) usual season", "[first-differences, anomalies] ols independent effective-n",
				"[seasonal-differences, first-differences] ols independent effective-n", "levels ols independent effective-n season"}},
	} {
		var got []string
		for _, c := range Propose(row.facts) {
			got = append(got, short(c))
		}
		if !slices.Equal(got, row.want) {
			t.Errorf("%s:\n got %q\nwant %q", row.name, got, row.want)
		}
	}
}

func TestQuestionsAreNeverFirst(t *testing.T) {
	r := correlation()
	r.Aim = ""
	var aims []string
	for _, c := range Propose(facts(r, evidence.Stationary, evidence.Stationary)) {
		if c.Question {
			aims = append(aims, c.Request.Aim)
		}
	}
	if !slices.Equal(aims, []string{"association", "effect", "prediction"}) {
		t.Errorf("offered aims: %q", aims)
	}
}

func TestOtherKind(t *testing.T) {
	r := correlation()
	r.Aim = "effect"
	all := Propose(facts(r, evidence.Stationary, evidence.Stationary))
	last := all[len(all)-1]
	if !last.Question || last.Request.Kind != request.Regression || last.Request.Response != "eelgrass" {
		t.Errorf("got %+v", last)
	}
	back, ok := otherKind(func() request.Request { x := last.Request; x.Aim = "association"; return x }())
	if !ok || !slices.Equal(back.Between, r.Between) {
		t.Errorf("the way back: %+v", back)
	}
}
