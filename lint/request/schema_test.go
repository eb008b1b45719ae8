package request

import (
	"fmt"
	"reflect"
	"strings"
	"testing"

	"lagwise/lint/document"
)

// around puts statements of a table into the least document that may hold
// them. %s takes the statements; what the table cannot do without stands
// already unless the statements write it.
var around = map[string]string{
	"manifest":         "%s\n",
	"record":           "[record.w]\n%s\n",
	"along":            "[record.w]\nfile = \"w.csv\"\n[record.w.along]\n%s\n",
	"at":               "[record.w]\nfile = \"w.csv\"\n[record.w.at]\n%s\n",
	"defaults":         "[record.w]\nfile = \"w.csv\"\n[record.w.defaults]\n%s\n",
	"series":           "[record.moorings]\nfile = \"w.csv\"\n[series.boats]\n%s\n",
	"analysis":         "%s\n",
	"correlation":      "[[correlation]]\n%s\n",
	"regression":       "[[regression]]\n%s\n",
	"on-each":          "[[correlation]]\nbetween = [\"eelgrass\", \"boats\"]\n[correlation.on-each]\n%s\n",
	"lags":             "[[correlation]]\nbetween = [\"eelgrass\", \"boats\"]\n[correlation.lags]\n%s\n",
	"grid":             "[[correlation]]\nbetween = [\"eelgrass\", \"boats\"]\n[correlation.grid]\n%s\n",
	"predictor":        "[[regression]]\nresponse = \"eelgrass\"\n[[regression.predictors]]\n%s\n",
	"deviation":        "[[correlation]]\nbetween = [\"eelgrass\", \"boats\"]\n[[correlation.deviation]]\n%s\n",
	"conventions":      "%s\n",
	"review":           "[review]\n%s\n",
	"least-n":          "[review.least-n]\n%s\n",
	"asked-for":        "[asked-for]\n%s\n",
	"accepted-methods": "[accepted-methods]\n%s\n",
	"weight":           "[weight]\n%s\n",
	"limits":           "[limits]\n%s\n",
	"test-settings":    "[test-settings]\n%s\n",
	"adf":              "[test-settings.adf]\n%s\n",
	"kpss":             "[test-settings.kpss]\n%s\n",
}

// needs are statements without which an example would be a contradiction.
var needs = map[string]string{
	"manifest.series":         "record.moorings.file = \"moorings.csv\"",
	"record.decimal":          "delimiter = \";\"",
	"along.before":            "kind = \"age\"",
	"correlation.remove-from": "given = [\"nitrate\"]",
}

// other values where the example of a required key is what stands already, or
// where an example is the default.
var otherwise = map[string]string{
	"grid.by": "",
}

// documentFor writes a document with the required keys of a table, all but
// the one named, and one more statement.
func documentFor(k Key, statement string) string {
	var lines []string
	for _, other := range schemaTables[k.Table] {
		if other.Required && other.Name != k.Name {
			lines = append(lines, other.Example)
		}
	}
	if need := needs[k.Table+"."+k.Name]; need != "" {
		lines = append(lines, need)
	}
	lines = append(lines, statement)
	return fmt.Sprintf(around[k.Table], strings.Join(lines, "\n"))
}

func fileFor(table string) string {
	for _, doc := range []Doc{AnalysisDoc, ManifestDoc, ConventionsDoc} {
		for _, t := range tablesUnder(doc.String()) {
			if t == table {
				return map[Doc]string{ManifestDoc: "x.series.toml", AnalysisDoc: "x.analysis.toml", ConventionsDoc: "x.conventions.toml"}[doc]
			}
		}
	}
	return ""
}

// valuesOf binds a text and returns the typed values alone, places apart.
func valuesOf(file, text string) any {
	tree := document.Parse([]byte(text))
	switch DocumentKind(file) {
	case ManifestDoc:
		m, _ := BindManifest(file, tree)
		for _, r := range m.Records {
			r.Keys, r.Header = nil, document.Span{}
			clearPlaces(r.Deviations)
			if r.Along != nil {
				r.Along.Keys = nil
			}
		}
		for _, s := range m.Series {
			s.Keys, s.Header = nil, document.Span{}
			clearPlaces(s.Deviations)
		}
		m.Tree = nil
		return m
	case AnalysisDoc:
		a, _ := BindAnalysis(file, tree)
		values := []any{a.Title, a.Manifests}
		for _, r := range a.Requests {
			clearPlaces(r.Deviations)
			values = append(values, r.Request)
		}
		return values
	}
	c, _ := BindConventions(file, tree)
	c.Tree, c.Keys, c.Places = nil, nil, nil
	return c
}

func clearPlaces(ds []Deviation) {
	for i := range ds {
		ds[i].Keys, ds[i].At = nil, document.Span{}
	}
}

// Every key of the schema must be read by the binder: its example is bound
// without a problem and makes a difference. A key that only the binder knew
// would be told as stray by the example of the documents with every key.
func TestTheBinderReadsEveryKey(t *testing.T) {
	for _, k := range Schema {
		name := k.Table + "." + k.Name
		t.Run(name, func(t *testing.T) {
			file := fileFor(k.Table)
			with := documentFor(k, k.Example)
			for _, p := range problemsOf(file, with) {
				t.Errorf("%s: %s\n%s", p.Rule, p.Message, with)
			}
			if _, same := otherwise[name]; same || file == "" {
				return
			}
			if reflect.DeepEqual(valuesOf(file, with), valuesOf(file, documentFor(k, ""))) && k.Sub == "" {
				t.Errorf("%s makes no difference", k.Example)
			}
		})
	}
}

func TestTheSchemaIsWhole(t *testing.T) {
	seen := map[string]bool{}
	for _, k := range Schema {
		name := k.Table + "." + k.Name
		switch {
		case seen[name]:
			t.Errorf("%s stands twice", name)
		case k.Meaning == "" || !strings.HasSuffix(k.Meaning, "."):
			t.Errorf("%s has no sentence of meaning", name)
		case k.Example == "":
			t.Errorf("%s has no example", name)
		case k.Form == Words && len(k.Values) == 0:
			t.Errorf("%s takes words and has none", name)
		case k.Sub != "" && len(SchemaOf(k.Sub)) == 0:
			t.Errorf("%s holds the table %s, which has no keys", name, k.Sub)
		case fileFor(k.Table) == "":
			t.Errorf("%s stands in no document", name)
		case around[k.Table] == "":
			t.Errorf("%s is not tried", name)
		}
		seen[name] = true
	}
}

func TestTableAt(t *testing.T) {
	for _, tc := range []struct {
		doc  Doc
		path string
		want string
	}{
		{ManifestDoc, "", "manifest"}, {ManifestDoc, "record.w", "record"}, {ManifestDoc, "record.w.along", "along"},
		{ManifestDoc, "record", ""}, {ManifestDoc, "series.x.deviation", "deviation"}, {AnalysisDoc, "correlation.lags", "lags"},
		{AnalysisDoc, "correlation.on", ""}, {ConventionsDoc, "test-settings.adf", "adf"}, {NoDoc, "", ""},
	} {
		var path []string
		if tc.path != "" {
			path = strings.Split(tc.path, ".")
		}
		if got, ok := TableAt(tc.doc, path...); got != tc.want || ok != (tc.want != "") {
			t.Errorf("%v %q: %q, want %q", tc.doc, tc.path, got, tc.want)
		}
	}
}
