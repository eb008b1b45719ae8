package rules_test

import (
	"testing"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

// asked returns the only request of an analysis.
func asked(t *testing.T, text string) lint.Inquiry {
	t.Helper()
	tree := document.Parse([]byte(text))
	a, problems := request.BindAnalysis("e.analysis.toml", tree)
	if len(a.Requests) != 1 {
		t.Fatalf("%d requests in %q: %+v", len(a.Requests), text, problems)
	}
	return lint.Inquiry{File: "e.analysis.toml", Tree: tree, Request: a.Requests[0]}
}

const (
	correlated = "[[correlation]]\nbetween = [\"eelgrass\", \"boats\"]\n"
	regressed  = "[[regression]]\nresponse = \"eelgrass\"\npredictors = [\"boats\"]\n"
)

func TestUnstatedAim(t *testing.T) {
	asks := &request.Conventions{AskedFor: request.AskedFor{Request: []string{"aim"}}}
	for _, c := range []struct {
		name, text string
		lab        *request.Conventions
		want       string
	}{
		{"stated", correlated + "aim = \"association\"\n", nil, ""},
		{"unstated, correlation", correlated, nil, "A correlation answers for an association"},
		{"unstated, regression", regressed, nil, "A regression answers for an effect or a prediction"},
		{"wrong, which wrong-value tells", correlated + "aim = \"fame\"\n", nil, ""},
		{"asked for, which absent-field tells", correlated, asks, ""},
	} {
		q := asked(t, c.text)
		q.Conventions = c.lab
		wantOne(t, c.name, ask(t, "unstated-aim", q), c.want, finding.Information)
	}
}

func TestAimAndMethod(t *testing.T) {
	for _, c := range []struct{ name, text, want string }{
		{"association by correlation", correlated + "aim = \"association\"\n", ""},
		{"effect by regression", regressed + "aim = \"effect\"\n", ""},
		{"unstated", correlated, ""},
		{"effect by correlation", correlated + "aim = \"effect\"\n", "The aim is an effect, and a correlation has no direction"},
		{"prediction by correlation", correlated + "aim = \"prediction\"\n", "The aim is a prediction"},
		{"association by regression", regressed + "aim = \"association\"\n", "makes eelgrass the response"},
	} {
		wantOne(t, c.name, ask(t, "aim-and-method", asked(t, c.text)), c.want, finding.Warning)
	}
}

func TestUnacceptedMethod(t *testing.T) {
	yes := true
	ranks := &request.Conventions{Accepted: request.Accepted{Coefficient: []string{"spearman"}}}
	changes := &request.Conventions{Accepted: request.Accepted{On: []string{"first-differences", "differences(2)"}}}
	always := &request.Conventions{Accepted: request.Accepted{AlwaysDifference: &yes}}
	gls := &request.Conventions{Accepted: request.Accepted{Estimator: []string{"gls"}}}
	for _, c := range []struct {
		name, text string
		lab        *request.Conventions
		want       string
	}{
		{"no conventions", correlated, nil, ""},
		{"nothing settled", correlated, &request.Conventions{}, ""},
		{"accepted coefficient", correlated + "coefficient = \"spearman\"\n", ranks, ""},
		{"another coefficient", correlated, ranks, `do not accept coefficient = "pearson"`},
		{"a coefficient is nothing of a regression", regressed, ranks, ""},
		{"another estimator", regressed, gls, `do not accept estimator = "ols"`},
		{"accepted transform among others", correlated + "on = [\"log\", \"first-differences\"]\n", changes, ""},
		{"accepted with its number", correlated + "on = \"differences(2)\"\n", changes, ""},
		{"another number", correlated + "on = \"differences(3)\"\n", changes, "ask for one of first-differences or differences(2)"},
		{"levels are not in the list", correlated, changes, "ask for one of"},
		{"always differences: levels", correlated, always, "on differences only"},
		{"always differences: rates", correlated + "on = \"rates-of-change\"\n", always, ""},
		{"always differences: of correlations only", regressed, always, ""},
	} {
		q := asked(t, c.text)
		q.Conventions = c.lab
		wantOne(t, c.name, ask(t, "unaccepted-method", q), c.want, finding.Warning)
	}
}
