package rules_test

import (
	"strings"
	"testing"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/finding"
	"lagwise/lint/request"
	"lagwise/rules"
)

// ask puts an inquiry to the rule of a name.
func ask(t *testing.T, name string, q lint.Inquiry) []finding.Finding {
	t.Helper()
	for _, r := range rules.All() {
		if r.Name == name {
			rule := r
			q.Rule = &rule
			rule.Run(&q)
			if err := q.Failure(); err != nil {
				t.Fatalf("%s failed: %v", name, err)
			}
			return q.Findings()
		}
	}
	t.Fatalf("there is no rule %s", name)
	return nil
}

// TestProblemsAreToldInTheNameOfTheirRule asks every rule about documents of
// a document with a problem of its own, and of one with another's.
func TestProblemsAreToldInTheNameOfTheirRule(t *testing.T) {
	for _, r := range rules.All() {
		if !r.Scope.Has(lint.OfDocument) || r.Name == "failed-rule" {
			continue // the engine tells failed-rule itself
		}
		at := document.Span{Start: 3, End: 7}
		mine := request.Problem{Rule: r.Name, At: at, Message: "What is wrong.", Detail: "More of it.", Request: "eelgrass-boats",
			Nearest: &document.Edit{At: at, Text: `"boats"`},
			Related: []request.RelatedPlace{{At: document.Span{Start: 1, End: 2}, Message: "the first"}}}
		got := ask(t, r.Name, lint.Inquiry{File: "eelgrass.analysis.toml", Problems: []request.Problem{{Rule: "another-rule"}, mine}})
		if len(got) != 1 {
			t.Errorf("%s: %d findings of one problem", r.Name, len(got))
			continue
		}
		want := r.Severity
		if r.Name == "absent-field" {
			want = finding.Error // what the schema needs is heavier than what a lab asks for
		}
		f := got[0]
		if f.Rule != r.Name || f.Severity != want || f.At != at || f.Message != mine.Message || f.Detail != mine.Detail || f.Request != mine.Request {
			t.Errorf("%s: the finding is %+v", r.Name, f)
		}
		if len(f.Related) != 1 || f.Related[0].File != "eelgrass.analysis.toml" {
			t.Errorf("%s: the related places are %+v", r.Name, f.Related)
		}
		if len(f.Rewrites) != 1 || !f.Rewrites[0].Preferred || f.Rewrites[0].Edits[0].Text != `"boats"` {
			t.Errorf("%s: the rewrites are %+v", r.Name, f.Rewrites)
		}
		if clean := ask(t, r.Name, lint.Inquiry{File: "eelgrass.analysis.toml"}); len(clean) != 0 {
			t.Errorf("%s speaks of a clean document: %+v", r.Name, clean)
		}
	}
}

func TestFailedRuleIsLeftToTheEngine(t *testing.T) {
	if got := ask(t, "failed-rule", lint.Inquiry{Problems: []request.Problem{{Rule: "failed-rule"}}}); len(got) != 0 {
		t.Errorf("failed-rule speaks by itself: %+v", got)
	}
}

func TestAbsentFieldOfAManifest(t *testing.T) {
	lab := &request.Conventions{AskedFor: request.AskedFor{Series: []string{"unit", "title"}}}
	for _, c := range []struct{ name, text, want string }{
		{"both are there", "[record.m]\nfile = \"m.csv\"\n[series.boats]\nunit = \"{count}\"\ntitle = \"Boats\"\n", ""},
		{"defaults give the unit", "[record.m]\nfile = \"m.csv\"\ndefaults = { unit = \"mg/L\" }\n[series.no3]\ntitle = \"Nitrate\"\n", ""},
		{"written empty", "[record.m]\nfile = \"m.csv\"\n[series.boats]\nunit = \"1\"\ntitle = \" \"\n", "boats lacks title,"},
		{"neither", "[record.m]\nfile = \"m.csv\"\n[series.boats]\ncolumn = \"b\"\n", "boats lacks unit and title,"},
	} {
		q := lint.Inquiry{File: "m.series.toml", Tree: document.Parse([]byte(c.text)), Conventions: lab}
		wantOne(t, c.name, ask(t, "absent-field", q), c.want, finding.Warning)
	}
}

func TestAbsentFieldOfARequest(t *testing.T) {
	lab := &request.Conventions{AskedFor: request.AskedFor{Request: []string{"question", "aim", "coefficient"}}}
	correlation := "[[correlation]]\nbetween = [\"eelgrass\", \"boats\"]\n"
	regression := "[[regression]]\nresponse = \"eelgrass\"\npredictors = [\"boats\"]\n"
	given := "question = \"Do they change together?\"\naim = \"association\"\n"
	for _, c := range []struct{ name, text, want string }{
		{"all of a correlation", correlation + given + "coefficient = \"pearson\"\n", ""},
		{"a regression has no coefficient", regression + given, ""},
		{"a correlation lacks it", correlation + given, "eelgrass-boats lacks coefficient,"},
	} {
		q := lint.Inquiry{File: "e.analysis.toml", Tree: document.Parse([]byte(c.text)), Conventions: lab}
		wantOne(t, c.name, ask(t, "absent-field", q), c.want, finding.Warning)
	}
}

// wantOne holds findings to one message that contains want, or to silence.
func wantOne(t *testing.T, name string, got []finding.Finding, want string, severity finding.Severity) {
	t.Helper()
	switch {
	case want == "" && len(got) != 0:
		t.Errorf("%s: speaks: %q", name, got[0].Message)
	case want == "":
	case len(got) != 1:
		t.Errorf("%s: %d findings, want one with %q", name, len(got), want)
	case !strings.Contains(got[0].Message, want):
		t.Errorf("%s: %q does not say %q", name, got[0].Message, want)
	case got[0].Severity != severity:
		t.Errorf("%s: is %s, want %s", name, got[0].Severity, severity)
	}
}
