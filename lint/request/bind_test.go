package request

import (
	"reflect"
	"strings"
	"testing"

	"lagwise/lint/document"
)

// problemsOf binds a text as the kind of document that its file name says.
func problemsOf(file, text string) []Problem {
	tree := document.Parse([]byte(text))
	var problems []Problem
	switch DocumentKind(file) {
	case ManifestDoc:
		_, problems = BindManifest(file, tree)
	case AnalysisDoc:
		_, problems = BindAnalysis(file, tree)
	case ConventionsDoc:
		_, problems = BindConventions(file, tree)
	}
	return problems
}

func bindAnalysis(t *testing.T, text string) *Analysis {
	t.Helper()
	a, problems := BindAnalysis("eelgrass.analysis.toml", document.Parse([]byte(text)))
	for _, p := range problems {
		t.Errorf("%s at %q: %s", p.Rule, text[p.At.Start:p.At.End], p.Message)
	}
	return a
}

func TestDocumentsWithoutAProblem(t *testing.T) {
	for _, tc := range []struct{ name, file, text string }{
		{"every key of a manifest", "estuary.series.toml", estuaryManifest},
		{"every key of an analysis", "eelgrass.analysis.toml", eelgrassAnalysis},
		{"every key of conventions", "estuary.conventions.toml", estuaryConventions},
		{"the least manifest", "w.series.toml", "[record.weir]\nfile = \"weir-annual.csv\"\n"},
		{"the least analysis", "w.analysis.toml", "[[correlation]]\nbetween = [\"nitrate\", \"boats\"]\n"},
		{"nothing", "w.analysis.toml", ""},
		{"a byte order mark and CRLF", "w.analysis.toml", "\ufeff[[correlation]]\r\nbetween = [\"nitrate\", \"boats\"]\r\n"},
		{"quoted keys", "w.analysis.toml", "[[\"correlation\"]]\n\"between\" = ['nitrate', 'boats']\n"},
		{"dotted keys", "w.series.toml", "record.weir.file = \"weir.csv\"\nrecord.weir.along.kind = \"sequence\"\n"},
		{"inline tables", "w.series.toml", "record = { weir = { file = \"w.csv\" } }\nseries = { flow = { record = \"weir\" } }\n"},
		{"inline requests", "w.analysis.toml", "correlation = [{ between = [\"a\", \"b\"] }, { between = [\"a\", \"c\"] }]\n"},
		{"names beyond ASCII", "w.series.toml", "[record.\"Ålesund µ\"]\nfile = \"data/Ålesund.csv\"\n[series.\"NO₃\"]\nrecord = \"Ålesund µ\"\n"},
		{"dates as dates and as text", "w.analysis.toml", "[[correlation]]\nbetween = [\"a\", \"b\"]\nfrom = 1970-01-01\nuntil = 2020\n"},
		{"tables with headers below a request", "w.analysis.toml", "[[correlation]]\nbetween = [\"a\", \"b\"]\n[correlation.lags]\nfrom = -2\nto = 2\n"},
		{"predictors as tables", "w.analysis.toml", "[[regression]]\nresponse = \"a\"\n[[regression.predictors]]\nseries = \"b\"\nlag = 2\n"},
		{"a season that is none", "w.series.toml", "[record.w]\nfile = \"w.csv\"\n[series.a]\nseason = false\n[series.b]\nseason = 12\n"},
	} {
		t.Run(tc.name, func(t *testing.T) {
			for _, p := range problemsOf(tc.file, tc.text) {
				t.Errorf("%s at %q: %s", p.Rule, tc.text[p.At.Start:p.At.End], p.Message)
			}
		})
	}
}

func TestBindAnalysis(t *testing.T) {
	a := bindAnalysis(t, eelgrassAnalysis)
	if a.Title != "What drives eelgrass decline" || !reflect.DeepEqual(a.Manifests, []string{"../data/estuary.series.toml"}) || len(a.Places) != 1 {
		t.Errorf("title %q, manifests %q at %v", a.Title, a.Manifests, a.Places)
	}
	planned := true
	want := Request{
		Kind: Correlation, Name: "eelgrass-boats", Question: "Do eelgrass cover and moored boats change together?",
		Aim: "association", Expected: "negative", Planned: &planned, TimeScale: "P10Y",
		Between: []string{"eelgrass", "boats"}, Given: []string{"nitrate"}, RemoveFrom: "both", Coefficient: "pearson",
		Inference: "usual", Replicates: 2000, OnEach: map[string][]Transform{"boats": {{Name: Log}}},
		Every: "P1Y", Aggregate: "mean", LeastShare: 0.8, YearStarts: "10-01", Tolerance: "P1D",
		Grid: &Grid{0.5, "linear"}, From: "1970", Until: "2020", Groups: "within",
	}
	got := a.Requests[0].Request
	d := got.Deviations[0]
	got.Deviations = nil
	if !reflect.DeepEqual(got, want) {
		t.Errorf("correlation:\n got %+v\nwant %+v", got, want)
	}
	if d.From != "short-record" || d.By != "RQ" || d.AcceptedBy != "TM" || d.Until != "2027-06-30" || d.Data != "sha256:…" {
		t.Errorf("deviation: %+v", d)
	}
	want = Request{
		Kind: Regression, Name: "nitrate-effect", Question: "Does nitrate lower eelgrass cover?", Aim: "effect",
		Response: "eelgrass", Predictors: []Predictor{{"nitrate", 0}, {"rain", 1}},
		Estimator: "gls", Errors: "ar(1)", Likelihood: "reml", StandardErrors: "usual", Form: "static",
		LeastShare: 0.8, YearStarts: "01-01", Tolerance: "0", Groups: "within",
	}
	if got := a.Requests[1].Request; !reflect.DeepEqual(got, want) {
		t.Errorf("regression:\n got %+v\nwant %+v", got, want)
	}
}

func TestPlacesOfARequest(t *testing.T) {
	a := bindAnalysis(t, eelgrassAnalysis)
	raw := a.Tree.Raw
	first, second := a.Requests[0], a.Requests[1]
	if got := raw(first.Header); got != "[[correlation]]" {
		t.Errorf("header %q", got)
	}
	if got := raw(first.At); !strings.HasPrefix(got, "[[correlation]]\nname") || !strings.HasSuffix(got, `data = "sha256:…"`) {
		t.Errorf("the request is %q", got)
	}
	if got := raw(first.Key("on")); got != `"levels"` {
		t.Errorf("the place of on is %q", got)
	}
	if got := raw(second.Key("inference")); got != "[[regression]]" {
		t.Errorf("the place of a key that is not written is %q", got)
	}
	for name, want := range map[string][]string{"eelgrass": {`"eelgrass"`}, "nitrate": {`"nitrate"`}, "rain": {`"rain"`}} {
		var got []string
		for _, s := range second.Names[name] {
			got = append(got, raw(s))
		}
		if !reflect.DeepEqual(got, want) {
			t.Errorf("places of %s: %q, want %q", name, got, want)
		}
	}
	p := second.Keys["errors"]
	if raw(p.Key) != "errors" || raw(p.Value) != `"ar(1)"` || raw(p.Statement) != `errors = "ar(1)"` {
		t.Errorf("place of errors: %q %q %q", raw(p.Key), raw(p.Value), raw(p.Statement))
	}
}

func TestRequestsStandInTheOrderOfTheText(t *testing.T) {
	a := bindAnalysis(t, `[[regression]]
response = "a"
predictors = "b"
[[correlation]]
between = ["a", "b"]
[[regression]]
response = "b"
predictors = ["a", "c"]
`)
	var names []string
	for i, r := range a.Requests {
		names = append(names, r.Name)
		if r.Index != i {
			t.Errorf("%s has index %d", r.Name, r.Index)
		}
	}
	if want := []string{"a-on-b", "a-b", "b-on-a-c"}; !reflect.DeepEqual(names, want) {
		t.Errorf("names %q, want %q", names, want)
	}
}

func TestMadeUpNamesAreUnique(t *testing.T) {
	a := bindAnalysis(t, `[[correlation]]
between = ["a", "b"]
[[correlation]]
between = ["a", "b"]
on = "first-differences"
[[correlation]]
name = "a-b"
between = ["a", "c"]
[[correlation]]
between = ["a", "b"]
given = "c"
`)
	var names []string
	for _, r := range a.Requests {
		names = append(names, r.Name)
	}
	if want := []string{"a-b-2", "a-b-3", "a-b", "a-b-given-c"}; !reflect.DeepEqual(names, want) {
		t.Errorf("names %q, want %q", names, want)
	}
}

func TestEstimatorAndErrorsFillEachOther(t *testing.T) {
	for _, tc := range []struct{ written, estimator, errors string }{
		{"", "ols", "independent"},
		{`estimator = "ols"`, "ols", "independent"},
		{`estimator = "gls"`, "gls", "ar(1)"},
		{`errors = "arma(1, 1)"`, "gls", "arma(1,1)"},
		{`errors = "independent"`, "ols", "independent"},
		{"estimator = \"gls\"\nerrors = \"nugget+gaussian\"", "gls", "nugget+gaussian"},
	} {
		r := bindAnalysis(t, "[[regression]]\nresponse = \"a\"\npredictors = \"b\"\n"+tc.written+"\n").Requests[0]
		if r.Estimator != tc.estimator || r.Errors != tc.errors {
			t.Errorf("%q: %s with %s", tc.written, r.Estimator, r.Errors)
		}
	}
}

func TestDigestIsOverWhatIsComputed(t *testing.T) {
	digest := func(lines string) [32]byte {
		return bindAnalysis(t, "[[correlation]]\nbetween = [\"a\", \"b\"]\n"+lines).Requests[0].Digest
	}
	base := digest("")
	for _, same := range []string{"name = \"x\"\n", "question = \"Why?\"\n", "on = \"levels\"\n", "# a remark\n", "lag = 0\n",
		"[[correlation.deviation]]\nfrom = \"short-record\"\nreason = \"pilot\"\n"} {
		if digest(same) != base {
			t.Errorf("%q changes the digest", same)
		}
	}
	seen := map[[32]byte]string{base: "nothing"}
	for _, k := range SchemaOf("correlation") {
		switch k.Name {
		case "name", "question", "deviation", "between", "remove-from", "on-each":
			continue
		}
		d := digest(k.Example + "\n")
		if other, ok := seen[d]; ok {
			t.Errorf("%s gives the digest of %s", k.Example, other)
		}
		seen[d] = k.Example
	}
}

func TestBindManifest(t *testing.T) {
	m, _ := BindManifest("data/estuary.series.toml", document.Parse([]byte(estuaryManifest)))
	if m.Name != "estuary" || m.Title != "Aldermere estuary, long records" || len(m.Records) != 4 || len(m.Series) != 1 {
		t.Fatalf("manifest %q %q with %d records and %d series", m.Name, m.Title, len(m.Records), len(m.Series))
	}
	moorings, core := m.Records[0], m.Records[1]
	if moorings.DefaultUnit != "mg/L" || moorings.Defaults["support"] != "mean" || moorings.HeaderRows != 1 ||
		!reflect.DeepEqual(moorings.Missing, []string{"-9999"}) || moorings.MissingOnly != nil {
		t.Errorf("record: %+v", moorings)
	}
	if a := moorings.Along; a.Column != "year" || a.Kind != Time || a.Step != "P1Y" {
		t.Errorf("along: %+v", a)
	}
	if a := core.Along; a.Kind != Age || *a.Before != 1950 || a.Unit != "ka" {
		t.Errorf("along: %+v", a)
	}
	if at := m.Records[3].At; *at != (Sites{"easting_km", "northing_km", "km"}) {
		t.Errorf("at: %+v", at)
	}
	s := m.Series[0]
	if s.Name != "boats" || s.Unit != "{count}" || s.Support != "instant" || *s.DetectionLimit != 0.05 || s.Season != "P1Y" || len(s.Deviations) != 1 {
		t.Errorf("series: %+v", s)
	}
	if got := m.Tree.Raw(s.Keys["unit"].Value); got != `"{count}"` {
		t.Errorf("place of unit: %q", got)
	}
}

func TestSeriesTakeTheDefaultsOfTheirRecord(t *testing.T) {
	m, problems := BindManifest("w.series.toml", document.Parse([]byte(`[record.w]
file = "w.csv"
defaults = { unit = "mg/L", support = "mean", detection-limit = 0.1 }
[series.nitrate]
[series.level]
unit = "m"
`)))
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	nitrate, level, column := m.Series[0], m.Series[1], m.Records[0].Implicit("rain")
	if nitrate.Unit != "mg/L" || nitrate.Support != "mean" || *nitrate.DetectionLimit != 0.1 || nitrate.Column != "nitrate" || nitrate.Measures != "amount" {
		t.Errorf("nitrate: %+v", nitrate)
	}
	if level.Unit != "m" {
		t.Errorf("level: %+v", level)
	}
	if !column.Implicit || column.Unit != "mg/L" || column.Column != "rain" || column.Record != "w" {
		t.Errorf("column: %+v", column)
	}
}

func TestDocumentKind(t *testing.T) {
	for path, want := range map[string]Doc{
		"data/estuary.series.toml": ManifestDoc, `C:\lab\e.analysis.toml`: AnalysisDoc, "x.conventions.toml": ConventionsDoc,
		"series.toml": NoDoc, ".series.toml": NoDoc, "a.series.toml.bak": NoDoc, "a.toml": NoDoc, "": NoDoc,
	} {
		if got := DocumentKind(path); got != want {
			t.Errorf("%q is %v, want %v", path, got, want)
		}
	}
}

func TestAnalysisUnderATable(t *testing.T) {
	tree := document.Parse([]byte("dependencies = [\"pandas\"]\n[tool.lagwise]\ntitle = \"x\"\n[[tool.lagwise.correlation]]\nbetween = [\"a\", \"b\"]\n"))
	a, problems := BindAnalysisUnder("fit.py", tree, "tool", "lagwise")
	if len(problems) > 0 || len(a.Requests) != 1 || a.Title != "x" {
		t.Errorf("%v, %+v", problems, a)
	}
	if a, problems := BindAnalysisUnder("fit.py", tree, "tool", "other"); len(a.Requests) != 0 || len(problems) != 0 {
		t.Errorf("beside the table: %v, %+v", problems, a)
	}
}
