package request

import (
	"fmt"
	"reflect"
	"strings"
	"testing"

	"lagwise/lint/document"
)

// change is a rewrite that the decision procedure or a rule may offer.
type change struct {
	name string
	make func(*Request)
}

func on(names ...string) []Transform {
	var ts []Transform
	for _, n := range names {
		t, ok := ParseTransform(n)
		if !ok {
			panic(n)
		}
		ts = append(ts, t)
	}
	return ts
}

var correlationChanges = []change{
	{"first differences, effective-n", func(r *Request) { r.On, r.Inference = on(FirstDifferences), "effective-n" }},
	{"effective-n", func(r *Request) { r.Inference = "effective-n" }},
	{"seasonal and first differences", func(r *Request) {
		r.On, r.Inference = on(SeasonalDifferences, FirstDifferences), "effective-n"
	}},
	{"anomalies and first differences", func(r *Request) { r.On, r.Inference = on(Anomalies, FirstDifferences), "effective-n" }},
	{"prewhitened", func(r *Request) { r.On, r.Inference = on(Prewhitened), "usual" }},
	{"detrended", func(r *Request) { r.On, r.Inference = on(Detrended), "effective-n" }},
	{"rates of change", func(r *Request) { r.On, r.Inference = on(RatesOfChange), "effective-n" }},
	{"increments", func(r *Request) { r.On = on(Increments) }},
	{"second difference", func(r *Request) { r.On = on(FirstDifferences, FirstDifferences) }},
	{"differences over steps", func(r *Request) { r.On = on("differences(2)") }},
	{"log and first differences", func(r *Request) { r.On = on(Log, FirstDifferences) }},
	{"levels", func(r *Request) { r.On = nil }},
	{"spearman", func(r *Request) { r.Coefficient = "spearman" }},
	{"kendall", func(r *Request) { r.Coefficient, r.Inference = "kendall", "effective-n" }},
	{"modified t", func(r *Request) { r.Inference = "modified-t" }},
	{"lag", func(r *Request) { r.Lag, r.Lags = 1, nil }},
	{"yearly means", func(r *Request) { r.Every, r.Aggregate = "P1Y", "mean" }},
	{"groups each", func(r *Request) { r.Groups, r.GroupList = "each", nil }},
	{"split by date", func(r *Request) { r.From, r.Until = "1990", "2010-12-31" }},
	{"back to defaults", func(r *Request) {
		*r = Request{Kind: r.Kind, Name: r.Name, Between: r.Between, Deviations: r.Deviations, RemoveFrom: "both", Coefficient: "pearson",
			Inference: "usual", Replicates: 2000, LeastShare: 0.8, YearStarts: "01-01", Tolerance: "0", Groups: "within"}
	}},
	{"nothing", func(*Request) {}},
	{"a regression instead", toRegression},
}

var regressionChanges = []change{
	{"ols on first differences", func(r *Request) {
		r.On, r.Estimator, r.Errors, r.StandardErrors = on(FirstDifferences), "ols", "independent", "effective-n"
	}},
	{"gls ar(1)", func(r *Request) { r.Estimator, r.Errors = "gls", "ar(1)" }},
	{"gls ar(3)", func(r *Request) { r.Estimator, r.Errors = "gls", "ar(3)" }},
	{"gls arma(1,1) by ml", func(r *Request) { r.Estimator, r.Errors, r.Likelihood = "gls", "arma(1,1)", "ml" }},
	{"gls with distance decay", func(r *Request) { r.Estimator, r.Errors = "gls", "nugget+exponential" }},
	{"gls with trend", func(r *Request) { r.Estimator, r.Errors, r.Trend = "gls", "ar(1)", true }},
	{"seasonal terms", func(r *Request) { r.SeasonalTerms = true }},
	{"no terms", func(r *Request) { r.Trend, r.SeasonalTerms = false, false }},
	{"hac", func(r *Request) { r.StandardErrors = "hac" }},
	{"dynamic", func(r *Request) { r.Form, r.Estimator, r.Errors = "dynamic", "ols", "independent" }},
	{"error correction", func(r *Request) { r.Form, r.Estimator, r.Errors, r.On = "error-correction", "ols", "independent", nil }},
	{"log and first differences", func(r *Request) { r.On = on(Log, FirstDifferences) }},
	{"a lagged predictor", func(r *Request) {
		r.Predictors = append([]Predictor{{r.Predictors[0].Series, 2}}, r.Predictors[1:]...)
	}},
	{"one predictor more", func(r *Request) {
		r.Predictors = append(append([]Predictor{}, r.Predictors...), Predictor{"turbidity", 0})
	}},
	{"nothing", func(*Request) {}},
	{"a correlation instead", toCorrelation},
}

func toRegression(r *Request) {
	to := Request{Kind: Regression, Name: r.Name, Question: r.Question, Aim: r.Aim, On: r.On, Response: r.Between[0],
		Estimator: "ols", Errors: "independent", Likelihood: "reml", StandardErrors: "usual", Form: "static",
		Every: r.Every, Aggregate: r.Aggregate, LeastShare: r.LeastShare, YearStarts: r.YearStarts, Tolerance: r.Tolerance,
		Grid: r.Grid, From: r.From, Until: r.Until, Groups: r.Groups, GroupList: r.GroupList,
		Expected: r.Expected, Planned: r.Planned, TimeScale: r.TimeScale, OnEach: r.OnEach, Deviations: r.Deviations}
	for _, s := range append(append([]string{}, r.Between[1:]...), r.Given...) {
		to.Predictors = append(to.Predictors, Predictor{Series: s})
	}
	*r = to
}

func toCorrelation(r *Request) {
	to := Request{Kind: Correlation, Name: r.Name, Question: r.Question, Aim: r.Aim, On: r.On, Between: []string{r.Response, r.Predictors[0].Series},
		RemoveFrom: "both", Coefficient: "pearson", Inference: "usual", Replicates: 2000,
		Every: r.Every, Aggregate: r.Aggregate, LeastShare: r.LeastShare, YearStarts: r.YearStarts, Tolerance: r.Tolerance,
		Grid: r.Grid, From: r.From, Until: r.Until, Groups: r.Groups, GroupList: r.GroupList,
		Expected: r.Expected, Planned: r.Planned, TimeScale: r.TimeScale, OnEach: r.OnEach, Deviations: r.Deviations}
	for _, p := range r.Predictors[1:] {
		to.Given = append(to.Given, p.Series)
	}
	*r = to
}

var correlationBodies = []string{
	"between = [\"eelgrass\", \"boats\"]\n",
	"name = \"n\"                # kept\nbetween = [\n  \"eelgrass\", # cover\n  \"boats\",\n]\non = \"levels\"   # as measured\n",
	"  between = ['eelgrass', 'boats']\n  on = [\"levels\"]\n  inference = \"usual\"\n  # the end\n",
	"between = [\"eelgrass\", \"boats\"]\non = [\"log\", # positive\n]\ninference = \"surrogates\"\nreplicates = 500\ncoefficient = \"kendall\"\n",
	"between = [\"eelgrass\", \"boats\"]\ngiven = \"nitrate\"\nremove-from = \"first\"\nlags = { from = -2, to = 2 }\nfrom = 1970\nuntil = 2020-12-31\n",
	"between = [\"eelgrass\", \"boats\"]\nlags.from = -2\nlags.to = 2\nevery = \"P1Y\"\naggregate = \"sum\"\n",
	"between = [\"eelgrass\", \"boats\"]\non = \"first-differences\"\n[correlation.lags]\nfrom = 0\nto = 3\n\n[[correlation.deviation]]\nfrom = \"short-record\"\nreason = \"pilot\"\n",
	"on-each = { boats = [\"log\"] }\nbetween = [\"eelgrass\", \"boats\"]\ngroups = [\"a\", \"b\"]\ngrid = { step = 0.5 }\nlag = 0",
}

var regressionBodies = []string{
	"response = \"eelgrass\"\npredictors = [\"nitrate\"]\n",
	"response = \"eelgrass\"\npredictors = \"nitrate\"\nestimator = \"ols\"   # usual\n",
	"predictors = [\"nitrate\", { series = \"rain\", lag = 1 }]  # two\nresponse = \"eelgrass\"\nestimator = \"gls\"\n",
	"response = 'eelgrass'\npredictors = [\n  \"nitrate\", # mg/L\n]\nerrors = \"ar(2)\"\nlikelihood = \"ml\"\ntrend = true\n",
	"response = \"eelgrass\"\npredictors = [\"nitrate\"]\non = []\nestimator = \"gls\"\nerrors = \"ar(1)\"\nstandard-errors = \"usual\"\nform = \"dynamic\"\ntrend = false\n[[regression.deviation]]\nfrom = \"short-record\"\nreason = \"pilot\"",
	"name = \"n\"\nquestion = \"Why?\"\nresponse = \"eelgrass\"\npredictors = [\"nitrate\"]\nestimator = \"ols\"\nerrors = \"ar(1)\"\n", // a contradiction
}

// Every rewrite that the design lists, on requests written in many ways: the
// text that results is read as the request that was wanted.
func TestRewrittenTextIsTheWantedRequest(t *testing.T) {
	frames := map[string]func(head, body string) string{
		"alone": func(head, body string) string { return head + "\n" + body },
		"amid others": func(head, body string) string {
			return "# top\ntitle = \"x\"\n\n[[correlation]]\nbetween = [\"a\", \"b\"]\n\n" + head + " # here\n" + strings.TrimRight(body, "\n") + "\n\n\n[[regression]]\nresponse = \"c\"\npredictors = [\"d\"]\n"
		},
		"CRLF": func(head, body string) string { return strings.ReplaceAll("\ufeff"+head+"\n"+body, "\n", "\r\n") },
	}
	try := func(head string, bodies []string, changes []change) {
		for frame, in := range frames {
			for i, body := range bodies {
				for _, ch := range changes {
					t.Run(fmt.Sprintf("%s/%s %d/%s", frame, head, i, ch.name), func(t *testing.T) {
						text := in(head, body)
						rewriteOnce(t, text, strings.Index(text, "eelgrass"), ch)
					})
				}
			}
		}
	}
	try("[[correlation]]", correlationBodies, correlationChanges)
	try("[[regression]]", regressionBodies, regressionChanges)
}

// rewriteOnce rewrites the request that holds the offset.
func rewriteOnce(t *testing.T, text string, offset int, ch change) {
	t.Helper()
	tree := document.Parse([]byte(text))
	a, before := BindAnalysis("x.analysis.toml", tree)
	var asked *Asked
	for _, r := range a.Requests {
		if r.At.Contains(offset) {
			asked = r
		}
	}
	to := asked.Request
	ch.make(&to)
	if asked.madeUp {
		to.Name = MadeName(&to)
	}
	edits := Rewrite(tree, asked, &to)
	if edits == nil {
		t.Fatalf("no edits for\n%s", text)
	}
	out, err := document.Apply([]byte(text), edits)
	if err != nil {
		t.Fatal(err)
	}
	again := document.Parse(out)
	b, after := BindAnalysis("x.analysis.toml", again)
	if len(after) > len(before) {
		t.Fatalf("%+v\n%s", after, out)
	}
	got, want := plainRequest(b.Requests[asked.Index].Request), plainRequest(to)
	if !reflect.DeepEqual(got, want) {
		t.Errorf("got %+v\nwant %+v\n%s", got, want, out)
	}
	for i, other := range a.Requests {
		if i != asked.Index && !reflect.DeepEqual(plainRequest(other.Request), plainRequest(b.Requests[i].Request)) {
			t.Errorf("request %d was changed\n%s", i, out)
		}
	}
	if reflect.DeepEqual(plainRequest(asked.Request), want) && len(edits) != 0 {
		t.Errorf("nothing was to change: %+v", edits)
	}
	if strings.Contains(text, "\r\n") && strings.Count(string(out), "\n") != strings.Count(string(out), "\r\n") {
		t.Errorf("line ends are mixed: %q", out)
	}
	if added := strings.Count(string(out), "\n") - strings.Count(text, "\n"); added > len(Changed(&asked.Request, &to)) {
		t.Errorf("%d lines more", added)
	}
}

// plainRequest is a request without places, its nil and empty lists one.
func plainRequest(r Request) Request {
	ds := append([]Deviation{}, r.Deviations...)
	clearPlaces(ds)
	r.Deviations = ds
	if len(r.On) == 0 {
		r.On = nil
	}
	return r
}

// The text itself: what stays, what goes, and the form it takes.
func TestRewrittenText(t *testing.T) {
	for _, tc := range []struct {
		name, text, want string
		make             func(*Request)
	}{
		{"a bare string is replaced, a key is added",
			"[[correlation]]\nbetween = [\"a\", \"b\"]\non = \"levels\"  # as measured\n\n# next\n",
			"[[correlation]]\nbetween = [\"a\", \"b\"]\non = \"first-differences\"  # as measured\ninference = \"effective-n\"\n\n# next\n",
			correlationChanges[0].make},
		{"a list stays a list, its comments stay",
			"[[correlation]]\nbetween = [\"a\", \"b\"]\non = [\n  \"log\", # positive\n]\n",
			"[[correlation]]\nbetween = [\"a\", \"b\"]\non = [\n  \"log\", \"first-differences\", # positive\n]\n",
			func(r *Request) { r.On = on(Log, FirstDifferences) }},
		{"a key that goes gives its line to one that comes",
			"[[regression]]\nresponse = \"a\"\nestimator = \"ols\"\npredictors = [\"b\"]\n",
			"[[regression]]\nresponse = \"a\"\nerrors = \"ar(2)\"\npredictors = [\"b\"]\n",
			func(r *Request) { r.Estimator, r.Errors = "gls", "ar(2)" }},
		{"what is at its default goes",
			"[[correlation]]\nbetween = [\"a\", \"b\"]\ninference = \"effective-n\" # by the log\ncoefficient = \"pearson\"\n",
			"[[correlation]]\nbetween = [\"a\", \"b\"]\ncoefficient = \"pearson\"\n",
			func(r *Request) { r.Inference = "usual" }},
		{"a correlation becomes a regression",
			"[[correlation]]\nbetween = [\"a\", \"b\"]\ncoefficient = \"spearman\"\naim = \"effect\"\n[[correlation.deviation]]\nfrom = \"x\"\nreason = \"y\"\n",
			"[[regression]]\nresponse = \"a\"\npredictors = [\"b\"]\naim = \"effect\"\n[[regression.deviation]]\nfrom = \"x\"\nreason = \"y\"\n",
			toRegression},
		{"positions keep their form",
			"[[correlation]]\nbetween = [\"a\", \"b\"]\nfrom = 1970\nuntil = 2020-12-31\n",
			"[[correlation]]\nbetween = [\"a\", \"b\"]\nfrom = 1980\nuntil = 2010-12-31\n",
			func(r *Request) { r.From, r.Until = "1980", "2010-12-31" }},
		{"an inline request",
			"correlation = [{ between = [\"a\", \"b\"], inference = \"surrogates\", replicates = 500 }]\n",
			"correlation = [{ between = [\"a\", \"b\"] }]\n",
			func(r *Request) { r.Inference, r.Replicates = "usual", 2000 }},
		{"an inline request gets a key",
			"correlation = [{ between = [\"a\", \"b\"] }]\n",
			"correlation = [{ between = [\"a\", \"b\"], on = \"first-differences\", inference = \"effective-n\" }]\n",
			correlationChanges[0].make},
		{"a table of lags goes whole",
			"[[correlation]]\nbetween = [\"a\", \"b\"]\n[correlation.lags]\nfrom = 0\nto = 3\n# end\n",
			"[[correlation]]\nbetween = [\"a\", \"b\"]\nlag = 1\n# end\n",
			func(r *Request) { r.Lag, r.Lags = 1, nil }},
	} {
		t.Run(tc.name, func(t *testing.T) {
			a := bindAnalysis(t, tc.text)
			to := a.Requests[0].Request
			tc.make(&to)
			out, err := document.Apply([]byte(tc.text), Rewrite(a.Tree, a.Requests[0], &to))
			if err != nil || string(out) != tc.want {
				t.Errorf("%v\n got %s\nwant %s", err, out, tc.want)
			}
		})
	}
}

func TestRewriteThatCannotBeWritten(t *testing.T) {
	a := bindAnalysis(t, "correlation = [{ between = [\"a\", \"b\"] }]\n")
	to := a.Requests[0].Request
	toRegression(&to)
	if edits := Rewrite(a.Tree, a.Requests[0], &to); edits != nil {
		t.Errorf("an inline entry changed its kind: %+v", edits)
	}
	if edits := Rewrite(document.Parse(nil), a.Requests[0], &to); edits != nil {
		t.Errorf("another text was edited: %+v", edits)
	}
}

func TestRewriteOfAnotherReadingOfTheText(t *testing.T) {
	text := []byte("[[correlation]]\nbetween = [\"c\", \"d\"]\n[[correlation]]\nbetween = [\"a\", \"b\"]\n")
	a := bindAnalysis(t, string(text))
	to := a.Requests[1].Request
	to.Coefficient = "kendall"
	out, err := document.Apply(text, Rewrite(document.Parse(text), a.Requests[1], &to))
	if want := string(text) + "coefficient = \"kendall\"\n"; err != nil || string(out) != want {
		t.Errorf("%v\n%s", err, out)
	}
}

func TestRewriteUnderATable(t *testing.T) {
	text := "[tool.lagwise]\ntitle = \"x\"\n[[tool.lagwise.correlation]]\nbetween = [\"a\", \"b\"]\n"
	tree := document.Parse([]byte(text))
	a, _ := BindAnalysisUnder("fit.py", tree, "tool", "lagwise")
	to := a.Requests[0].Request
	toRegression(&to)
	out, err := document.Apply([]byte(text), Rewrite(tree, a.Requests[0], &to))
	want := "[tool.lagwise]\ntitle = \"x\"\n[[tool.lagwise.regression]]\nresponse = \"a\"\npredictors = [\"b\"]\n"
	if err != nil || string(out) != want {
		t.Errorf("%v\n%s", err, out)
	}
}

func TestChanged(t *testing.T) {
	for _, tc := range []struct {
		body string
		make func(*Request)
		want []string
	}{
		{pair, correlationChanges[0].make, []string{"on", "inference"}},
		{pair, func(r *Request) { r.Name, r.Question = "x", "y" }, []string{"question"}},
		{effect, regressionChanges[1].make, []string{"estimator", "errors"}},
		{effect + "errors = \"ar(1)\"\n", regressionChanges[2].make, []string{"errors"}},
		{pair, toRegression, []string{"between", "response", "predictors"}},
		{pair, func(*Request) {}, nil},
	} {
		from := bindAnalysis(t, tc.body).Requests[0].Request
		to := from
		tc.make(&to)
		if got := Changed(&from, &to); !reflect.DeepEqual(got, tc.want) {
			t.Errorf("%q, want %q", got, tc.want)
		}
	}
}
