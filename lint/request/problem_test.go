package request

import (
	"math/rand"
	"strings"
	"testing"

	"lagwise/lint/document"
)

const (
	pair   = "[[correlation]]\nbetween = [\"eelgrass\", \"boats\"]\n"
	effect = "[[regression]]\nresponse = \"eelgrass\"\npredictors = [\"nitrate\"]\n"
	weir   = "[record.weir]\nfile = \"weir.csv\"\n"
)

// Each text has exactly one thing wrong: told by one rule, at one place, with
// the nearest right word where there is one.
func TestProblems(t *testing.T) {
	for _, tc := range []struct{ doc, text, rule, at, nearest, says string }{
		// keys
		{"analysis", pair + "coeficient = \"pearson\"\n", "stray-key", "coeficient", "coefficient", "not a key of [[correlation]]"},
		{"analysis", pair + "\"inferense\" = \"usual\"\n", "stray-key", `"inferense"`, "inference", ""},
		{"analysis", pair + "estimator = \"ols\"\n", "stray-key", "estimator", "", "belongs to [[regression]]"},
		{"analysis", effect + "lag = 1\n", "stray-key", "lag", "", "stands with its predictor"},
		{"analysis", "tittle = \"x\"\n", "stray-key", "tittle", "title", "not a key of an analysis"},
		{"analysis", pair + "grid = { step = 1, buy = \"linear\" }\n", "stray-key", "buy", "by", ""},
		{"analysis", pair + "qzx = 1\n", "stray-key", "qzx", "", ""},
		{"series", weir + "delimeter = \";\"\n", "stray-key", "delimeter", "delimiter", "[record.…]"},
		{"series", weir + "along.colum = \"year\"\n", "stray-key", "colum", "column", ""},
		{"series", weir + "[series.flow]\nfile = \"x\"\n", "stray-key", "file", "", "belongs to [record.…]"},
		{"conventions", "[review]\nhold_at = \"error\"\n", "stray-key", "hold_at", "hold-at", ""},
		{"conventions", "[reviews]\nalpha = 0.05\n", "stray-key", "reviews", "review", ""},

		// absent
		{"analysis", "[[correlation]]\naim = \"effect\"\n", "absent-field", "[[correlation]]", "", "between"},
		{"analysis", "[[regression]]\nresponse = \"a\"\n", "absent-field", "[[regression]]", "", "predictors"},
		{"analysis", pair + "[[correlation.deviation]]\nfrom = \"short-record\"\n", "absent-field", "[[correlation.deviation]]", "", "reason"},
		{"analysis", pair + "lags = { from = 1 }\n", "absent-field", "{ from = 1 }", "", "to"},
		{"series", "[record.weir]\ncomment = \"#\"\n", "absent-field", "[record.weir]", "", "file"},
		{"series", "record.weir.comment = \"#\"\n", "absent-field", "weir", "", "file"},
		{"series", weir + "[record.b]\nfile = \"b.csv\"\n[series.x]\n", "absent-field", "[series.x]", "", "which record"},
		{"series", "[series.x]\n", "absent-field", "[series.x]", "", "[record.NAME]"},

		// wrong type
		{"analysis", pair + "planned = \"yes\"\n", "wrong-value", `"yes"`, "", "true or false"},
		{"analysis", pair + "replicates = 2000.5\n", "wrong-value", "2000.5", "", "whole number"},
		{"analysis", pair + "on = 3\n", "wrong-value", "3", "", "text or a list"},
		{"analysis", pair + "given = [\"a\", 4]\n", "wrong-value", "4", "", "list of series"},
		{"analysis", "correlation = \"a and b\"\n", "wrong-value", `"a and b"`, "", "list of tables"},
		{"analysis", "[correlation]\nbetween = [\"a\", \"b\"]\n", "wrong-value", "[correlation]", "[[correlation]]", "double brackets"},
		{"series", weir + "header-rows = \"1\"\n", "wrong-value", `"1"`, "", "whole number"},
		{"series", "record = \"weir.csv\"\n", "wrong-value", `"weir.csv"`, "", "[record.NAME]"},
		{"series", weir + "along = \"year\"\n", "wrong-value", `"year"`, "", "a table"},
		{"conventions", "limits.variance-inflation = \"ten\"\n", "wrong-value", `"ten"`, "", "a number"},

		// wrong words and forms
		{"analysis", pair + "coefficient = \"pearsn\"\n", "wrong-value", `"pearsn"`, `"pearson"`, "pearson, spearman or kendall"},
		{"analysis", pair + "on = \"first-diferences\"\n", "wrong-value", `"first-diferences"`, `"first-differences"`, "not a transform"},
		{"analysis", pair + "on = [\"log\", \"differences(0)\"]\n", "wrong-value", `"differences(0)"`, `"differences(2)"`, "1 or more"},
		{"analysis", pair + "on = \"moving-mean(1)\"\n", "wrong-value", `"moving-mean(1)"`, `"moving-mean(3)"`, "2 or more"},
		{"analysis", pair + "on = [\"levels\", \"log\"]\n", "wrong-value", `"levels"`, "", "stands alone"},
		{"analysis", pair + "on-each = { boat = [\"log\"] }\n", "wrong-value", "boat", "boats", "not a series of this request"},
		{"analysis", pair + "every = \"1Y\"\n", "wrong-value", `"1Y"`, "", "ISO 8601"},
		{"analysis", pair + "every = 0\n", "wrong-value", "0", "", "above 0"},
		{"analysis", pair + "every = \"P0Y\"\n", "wrong-value", `"P0Y"`, "", "has none"},
		{"analysis", pair + "year-starts = \"13-01\"\n", "wrong-value", `"13-01"`, "", "month and day"},
		{"analysis", pair + "least-share = 1.5\n", "wrong-value", "1.5", "", "0 to 1"},
		{"analysis", pair + "tolerance = -1\n", "wrong-value", "-1", "", "0 or more"},
		{"series", weir + "[series.a]\nseason = 1\n", "wrong-value", "1", "", "2 or more"},
		{"series", weir + "[series.a]\nmeasurement-sd = -1\n", "wrong-value", "-1", "", "from 0 up"},
		{"analysis", pair + "least-share = nan\n", "wrong-value", "nan", "", "finite"},
		{"analysis", pair + "replicates = 50\n", "wrong-value", "50", "", "100 to 100000"},
		{"analysis", pair + "groups = \"witin\"\n", "wrong-value", `"witin"`, `"within"`, ""},
		{"analysis", pair + "name = \"\"\n", "wrong-value", `""`, "", "empty"},
		{"analysis", pair + "deviation = [{ from = \"x\", reason = \"y\", until = \"soon\" }]\n", "wrong-value", `"soon"`, "", "date"},
		{"analysis", pair + "deviation = [{ from = \"x\", reason = \"y\", pair = [\"a\"] }]\n", "wrong-value", `["a"]`, "", "two series"},
		{"analysis", effect + "errors = \"ar(0)\"\n", "wrong-value", `"ar(0)"`, `"ar(1)"`, "ar(p)"},
		{"series", weir + "along = { kind = \"tme\" }\n", "wrong-value", `"tme"`, `"time"`, ""},
		{"series", weir + "delimiter = \"||\"\n", "wrong-value", `"||"`, "", "single character"},
		{"series", weir + "[series.a]\nseason = true\n", "wrong-value", "true", "", "false where there is none"},
		{"series", weir + "[series.a]\nrecord = \"wier\"\n", "wrong-value", `"wier"`, `"weir"`, "No record"},
		{"conventions", "[weight]\nshared-drift = \"eror\"\n", "wrong-value", `"eror"`, `"error"`, "severity"},
		{"conventions", "[review]\nalpha = 5\n", "wrong-value", "5", "", "0.0001 to 0.5"},
		{"conventions", "[review]\nfinal = [\"weights.x\"]\n", "wrong-value", `"weights.x"`, "", "names keys or tables"},
		{"conventions", "[asked-for]\nrequest = [\"queston\"]\n", "wrong-value", `"queston"`, `"question"`, ""},
		{"conventions", "[test-settings]\nadf = { lags = \"aci\" }\n", "wrong-value", `"aci"`, `"aic"`, "or a number"},

		// contradictions
		{"analysis", effect + "estimator = \"ols\"\nerrors = \"ar(1)\"\n", "wrong-value", `"ar(1)"`, "", "independent"},
		{"analysis", effect + "estimator = \"gls\"\nerrors = \"independent\"\n", "wrong-value", `"independent"`, "", "ols"},
		{"analysis", pair + "lag = 1\nlags = { from = 0, to = 2 }\n", "wrong-value", "1", "", "one of them"},
		{"analysis", pair + "lags = { from = 2, to = 0 }\n", "wrong-value", "{ from = 2, to = 0 }", "", "lower lag"},
		{"analysis", "[[correlation]]\nbetween = [\"a\", \"b\", \"c\"]\nlag = 1\n", "wrong-value", "1", "", "has 3"},
		{"analysis", "[[correlation]]\nbetween = [\"a\", \"b\", \"c\"]\nlags = { from = 0, to = 2 }\n", "wrong-value", "{ from = 0, to = 2 }", "", "has 3"},
		{"analysis", "[[correlation]]\nbetween = [\"a\"]\n", "wrong-value", `["a"]`, "", "two series"},
		{"analysis", "[[correlation]]\nbetween = \"a\"\n", "wrong-value", `"a"`, "", "two series"},
		{"analysis", "[[correlation]]\nbetween = [\"a\", \"b\", 'a']\n", "wrong-value", `'a'`, "", "twice"},
		{"analysis", pair + "given = [\"boats\"]\n", "wrong-value", `"boats"`, "", "already"},
		{"analysis", pair + "remove-from = \"first\"\n", "wrong-value", `"first"`, "", "none is given"},
		{"analysis", "[[regression]]\nresponse = \"a\"\npredictors = [\"b\", \"a\"]\n", "wrong-value", `"a"`, "", "is the response"},
		{"analysis", "[[regression]]\nresponse = \"a\"\npredictors = [\"b\", \"b\"]\n", "wrong-value", `"b"`, "", "twice"},
		{"analysis", "[[regression]]\nresponse = \"a\"\npredictors = []\n", "wrong-value", `[]`, "", "one predictor"},
		{"series", weir + "decimal = \",\"\ndelimiter = \",\"\n", "wrong-value", `","`, "", "decimal sign"},
		{"series", weir + "thousands = \".\"\n", "wrong-value", `"."`, "", "same sign"},
		{"series", weir + "along = { kind = \"time\", step = 1 }\n", "wrong-value", "1", "", "duration"},
		{"series", weir + "along = { kind = \"depth\", step = \"P1Y\" }\n", "wrong-value", `"P1Y"`, "", "number"},
		{"series", weir + "along = { kind = \"time\", before = 1950 }\n", "wrong-value", "1950", "", "ages"},
		{"series", weir + "along = { column = \"year\" }\nat = { x = \"a\", y = \"b\" }\n", "wrong-value", "at", "", "not both"},

		// names
		{"analysis", "[[correlation]]\nname = \"n\"\nbetween = [\"a\", \"b\"]\n[[regression]]\nname = \"n\"\nresponse = \"a\"\npredictors = \"b\"\n", "repeated-name", `"n"`, "", "named"},

		// half-typed text: the break is told, and nothing that follows from it
		{"analysis", pair + "coefficient = \n", "unreadable-document", "", "", ""},
		{"analysis", "[[correlation]]\nbetw\n", "unreadable-document", "", "", ""},
		{"analysis", "[[correlation]]\nbetween = [\"eelgrass\", \n", "unreadable-document", "", "", ""},
		{"analysis", pair + "[[corr\n", "unreadable-document", "", "", ""},
		{"series", "[record.weir]\nfil", "unreadable-document", "", "", ""},
	} {
		t.Run(tc.text, func(t *testing.T) {
			problems := problemsOf("x."+tc.doc+".toml", tc.text)
			if len(problems) != 1 {
				t.Fatalf("%d problems: %+v", len(problems), problems)
			}
			p := problems[0]
			if p.Rule != tc.rule {
				t.Errorf("rule %s: %s", p.Rule, p.Message)
			}
			if got := tc.text[p.At.Start:p.At.End]; tc.at != "" && got != tc.at {
				t.Errorf("at %q, want %q", got, tc.at)
			}
			if !strings.Contains(p.Message, tc.says) {
				t.Errorf("message %q does not say %q", p.Message, tc.says)
			}
			if (p.Nearest != nil) != (tc.nearest != "") || p.Nearest != nil && p.Nearest.Text != tc.nearest {
				t.Errorf("nearest %+v, want %q; %s", p.Nearest, tc.nearest, p.Message)
			}
			if p.Nearest != nil {
				mended(t, "x."+tc.doc+".toml", tc.text, *p.Nearest)
			}
		})
	}
}

// mended holds that the nearest word answers the problem.
func mended(t *testing.T, file, text string, e document.Edit) {
	t.Helper()
	out, err := document.Apply([]byte(text), []document.Edit{e})
	if err != nil {
		t.Fatal(err)
	}
	for _, p := range problemsOf(file, string(out)) {
		t.Errorf("after the nearest word: %s: %s", p.Rule, p.Message)
	}
}

func TestAWrongValueCostsOnlyItself(t *testing.T) {
	text := pair + "coefficient = \"pearsn\"\non = [\"log\", 7]\nreplicates = true\ninference = \"effective-n\"\n"
	a, problems := BindAnalysis("x.analysis.toml", document.Parse([]byte(text)))
	r := a.Requests[0]
	if len(problems) != 3 {
		t.Errorf("problems: %+v", problems)
	}
	for _, p := range problems {
		if p.Request != "eelgrass-boats" {
			t.Errorf("the problem %q is of request %q", p.Message, p.Request)
		}
	}
	if r.Coefficient != "pearson" || FormatOn(r.On) != `"log"` || r.Replicates != 2000 || r.Inference != "effective-n" {
		t.Errorf("%+v", r.Request)
	}
}

func TestABrokenLineCostsOnlyItself(t *testing.T) {
	a, _ := BindAnalysis("x.analysis.toml", document.Parse([]byte(pair+"aim = \ninference = \"effective-n\"\n"+effect)))
	if len(a.Requests) != 2 || a.Requests[0].Inference != "effective-n" || a.Requests[1].Response != "eelgrass" {
		t.Errorf("%+v", a.Requests)
	}
}

// Bad input never panics: seeded mutations of every document, bound as every
// kind, and rewritten.
func TestMutationsDoNotPanic(t *testing.T) {
	pieces := []string{"[", "]", "{", "}", "=", "\"", "'''", "\n", ".", ",", "#", "\\", "\x00", "µ", "\ufeff", "[[correlation]]\n", "nan", "-1", "1e999"}
	for d, text := range []string{estuaryManifest, eelgrassAnalysis, estuaryConventions} {
		rng := rand.New(rand.NewSource(int64(d)))
		for range 200 {
			b := []byte(text)
			for range 1 + rng.Intn(4) {
				at := rng.Intn(len(b))
				end := min(len(b), at+rng.Intn(20))
				piece := pieces[rng.Intn(len(pieces))]
				b = append(append(append([]byte{}, b[:at]...), piece...), b[end:]...)
			}
			tree := document.Parse(b)
			BindManifest("x", tree)
			BindConventions("x", tree)
			a, problems := BindAnalysis("x", tree)
			for _, p := range problems {
				if p.At.Start < 0 || p.At.End > len(b) || p.At.End < p.At.Start {
					t.Fatalf("%s at %v of %d bytes", p.Rule, p.At, len(b))
				}
			}
			for _, asked := range a.Requests {
				to := asked.Request
				to.On, to.Inference, to.Errors, to.Estimator = []Transform{{Name: FirstDifferences}}, "effective-n", "ar(2)", "gls"
				if _, err := document.Apply(b, Rewrite(tree, asked, &to)); err != nil {
					t.Fatalf("%v\n%s", err, b)
				}
			}
		}
	}
}
