package engine

import (
	"context"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/procedure"
	"lagwise/lint/request"
	"lagwise/lint/result"
)

// speaksOn is a mendable rule that speaks of requests on the transforms
// listed: "levels", "first-differences", ….
func speaksOn(name string, s finding.Severity, on ...string) lint.Rule {
	return lint.Rule{Name: name, Severity: s, Scope: lint.OfRequest, Need: lint.Data, Mendable: true,
		Run: func(q *lint.Inquiry) {
			if slices.Contains(on, onOf(q.Request.On)) {
				q.Report(finding.Finding{At: q.Request.Key("between"), Pairs: q.Request.Pairs(), Message: name + " speaks."})
			}
		}}
}

func onOf(on []request.Transform) string {
	if len(on) == 0 {
		return "levels"
	}
	return on[len(on)-1].Name
}

// proposing is an engine whose procedure proposes these transforms, in their
// order, and for which every request gives r = -0.06.
func proposing(rules []lint.Rule, on ...string) *Engine {
	e := New(Options{Rules: append(problemRules(), rules...)})
	e.candidates = func(c *evidence.Case) ([]procedure.Candidate, error) {
		var all []procedure.Candidate
		for _, name := range on {
			r := *c.Req()
			r.On = []request.Transform{{Name: name}}
			if onOf(r.On) != onOf(c.Req().On) {
				all = append(all, procedure.Candidate{Request: r, Title: "Correlate " + name})
			}
		}
		return all, nil
	}
	e.outcomes = func(c *evidence.Case) ([]*result.Outcome, error) {
		estimate, p := -0.0601, 0.672
		o := &result.Outcome{Coefficient: c.Req().Coefficient, Estimate: &estimate, P: &p, N: 53}
		if onOf(c.Req().On) == request.Log {
			o = &result.Outcome{Error: "log of a value that is not above 0"}
		}
		return []*result.Outcome{o}, nil
	}
	return e
}

const (
	diffs = request.FirstDifferences
	white = request.Prewhitened
	lines = request.Detrended
	logs  = request.Log
)

// offered lists what a judgement offers for a rule: title, with a mark at the
// preferred one.
func offered(j *Judgement, rule string) string {
	var all []string
	for _, f := range spokenBy(j, rule) {
		for _, r := range f.Rewrites {
			title := strings.TrimPrefix(r.Title, "Correlate ")
			if r.Preferred {
				title += " (preferred)"
			}
			all = append(all, title)
		}
	}
	return strings.Join(all, " | ")
}

func TestPreferred(t *testing.T) {
	const gives = ": r = -0.06, p = 0.67, n = 53"
	drift := speaksOn("drift", finding.Error, "levels")
	unmendable := speaksOn("few-values", finding.Warning, "levels", diffs, white)
	unmendable.Mendable = false
	short := speaksOn("short-record", finding.Information, diffs)
	cannot := lint.Rule{Name: "short-record", Severity: finding.Information, Scope: lint.OfRequest, Run: func(q *lint.Inquiry) {
		if onOf(q.Request.On) == diffs {
			q.Report(finding.Finding{Severity: finding.Error, Message: "cannot be judged"})
		}
	}}
	for _, c := range []struct {
		name, conventions string
		rules             []lint.Rule
		on                []string
		want              string
	}{
		{"the first clean one", "", []lint.Rule{drift}, []string{diffs, white}, diffs + gives + " (preferred) | " + white + gives},
		{"not the first that is not clean", "", []lint.Rule{drift, speaksOn("left", finding.Warning, diffs)}, []string{diffs, white},
			diffs + gives + "; leaves left | " + white + gives + " (preferred)"},
		{"one that answers nothing is not clean for it", "", []lint.Rule{speaksOn("drift", finding.Error, "levels", diffs)}, []string{diffs}, ""},
		{"none clean: the first that lowers the worst", "", []lint.Rule{drift, speaksOn("left", finding.Warning, diffs, white)}, []string{diffs, white},
			diffs + gives + "; leaves left (preferred) | " + white + gives + "; leaves left"},
		{"none lowers", "", []lint.Rule{drift, speaksOn("left", finding.Error, diffs)}, []string{diffs}, diffs + gives + "; leaves left"},
		{"what no rewrite mends", "", []lint.Rule{drift, unmendable}, []string{diffs}, diffs + gives + " (preferred)"},
		{"what is told as information", "", []lint.Rule{drift, speaksOn("told", finding.Information, diffs)}, []string{diffs}, diffs + gives + " (preferred)"},
		{"what cannot be computed is not offered", "", []lint.Rule{drift}, []string{logs, diffs}, diffs + gives + " (preferred)"},
		{"a record that differencing made short", "[weight]\nshort-record = \"warning\"\n", []lint.Rule{drift, short}, []string{diffs}, diffs + gives + " (preferred)"},
		{"a record that cannot be judged", "", []lint.Rule{drift, cannot}, []string{diffs, white},
			diffs + gives + "; leaves short-record | " + white + gives + " (preferred)"},
		{"what the lab does not accept is not offered", "", []lint.Rule{drift, speaksOn(unacceptedMethod, finding.Warning, diffs)}, []string{diffs, white}, white + gives + " (preferred)"},
	} {
		t.Run(c.name, func(t *testing.T) {
			root := lay(t, map[string]string{"shore.series.toml": shore, "lab.conventions.toml": c.conventions, "a.analysis.toml": between("eelgrass", "boats")})
			j := prove(t, proposing(c.rules, c.on...).Workspace(root).Edition(), filepath.Join(root, "a.analysis.toml"))
			if got := offered(j, "drift"); got != c.want {
				t.Errorf("offered %q\nwant    %q", got, c.want)
			}
			if none := !strings.Contains(c.want, "preferred"); none != strings.Contains(spokenBy(j, "drift")[0].Detail, "No rewrite") {
				t.Errorf("the detail says why none is preferred, and only then: %q", spokenBy(j, "drift")[0].Detail)
			}
		})
	}
}

func prove(t *testing.T, ed *Edition, path string) *Judgement {
	t.Helper()
	j, err := ed.Prove(context.Background(), path)
	if err != nil {
		t.Fatal(err)
	}
	return j
}

func TestQuestionsAreNeverPreferred(t *testing.T) {
	_, path := oneRequest(t, "")
	unstated := lint.Rule{Name: "unstated-aim", Severity: finding.Information, Scope: lint.OfRequest, Question: true, Run: func(q *lint.Inquiry) {
		if q.Request.Aim == "" {
			q.Report(finding.Finding{At: q.Request.Header, Message: "no aim"})
		}
	}}
	e := proposing([]lint.Rule{unstated})
	e.candidates = func(c *evidence.Case) ([]procedure.Candidate, error) {
		r := *c.Req()
		r.Aim = "association"
		return []procedure.Candidate{{Request: r, Title: "State the aim: association", Question: true}}, nil
	}
	j := prove(t, e.Workspace().Edition(), path)
	if got := offered(j, "unstated-aim"); got != "State the aim: association" {
		t.Errorf("offered %q", got)
	}
	if r := j.Findings[0].Rewrites[0]; !r.Question || len(r.Edits) != 1 || r.Edits[0].Range.Start.Line != 1 {
		t.Errorf("rewrite %+v", r)
	}
}

func TestNothingIsProposedWhereNothingIsToBeMended(t *testing.T) {
	const given = "[[correlation.deviation]]\nfrom = \"drift\"\nreason = \"pilot series\"\n"
	for _, rest := range []string{given, "on = \"first-differences\"\n"} {
		_, path := oneRequest(t, rest)
		e := proposing([]lint.Rule{speaksOn("drift", finding.Error, "levels")})
		e.candidates = func(*evidence.Case) ([]procedure.Candidate, error) {
			t.Error("the procedure was asked")
			return nil, nil
		}
		prove(t, e.Workspace().Edition(), path)
	}
}

func TestBrokenProofIsTold(t *testing.T) {
	_, path := oneRequest(t, "")
	e := proposing([]lint.Rule{speaksOn("drift", finding.Error, "levels")}, diffs)
	e.outcomes = func(*evidence.Case) ([]*result.Outcome, error) { panic("singular") }
	j := prove(t, e.Workspace().Edition(), path)
	if len(j.Broken) != 1 || !strings.Contains(j.Broken[0], "singular") || offered(j, "drift") != "" {
		t.Errorf("broken %q, offered %q", j.Broken, offered(j, "drift"))
	}
}
