package engine

import (
	"context"
	"maps"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"lagwise/lint"
	"lagwise/lint/finding"
)

// lay writes files below a new folder that holds .git, and returns it.
func lay(t *testing.T, files map[string]string) string {
	t.Helper()
	root, err := filepath.EvalSymlinks(t.TempDir())
	if err != nil {
		t.Fatal(err)
	}
	if err := os.Mkdir(filepath.Join(root, ".git"), 0o755); err != nil {
		t.Fatal(err)
	}
	for name, text := range files {
		write(t, filepath.Join(root, name), text)
	}
	return root
}

func write(t *testing.T, path, text string) {
	t.Helper()
	if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
}

// problemRules are rules that tell the problems found in their names, which
// is how the catalogue does it.
func problemRules() []lint.Rule {
	severities := map[string]finding.Severity{
		"unreadable-document": finding.Error, "stray-key": finding.Warning, "wrong-value": finding.Error,
		"absent-field": finding.Error, "unknown-series": finding.Error, "ambiguous-series": finding.Error,
		"repeated-name": finding.Error, "missing-manifest": finding.Error, "unknown-rule": finding.Error,
		"circular-conventions": finding.Error, "missing-conventions": finding.Error, "reached-limit": finding.Error,
		"ended-deviation": finding.Error, "ending-deviation": finding.Information,
		"incomplete-deviation": finding.Warning, "idle-deviation": finding.Information,
	}
	var all []lint.Rule
	for _, name := range slices.Sorted(maps.Keys(severities)) {
		all = append(all, lint.Rule{Name: name, Severity: severities[name], Scope: lint.OfDocument, Need: lint.Text, NoDeviation: true,
			Run: func(q *lint.Inquiry) {
				for _, p := range q.Problems {
					if p.Rule == name {
						q.Report(finding.Finding{At: p.At, Message: p.Message, Request: p.Request})
					}
				}
			}})
	}
	return all
}

// voice is a rule of request scope that always says the same.
func voice(name string, s finding.Severity) lint.Rule {
	return lint.Rule{Name: name, Severity: s, Scope: lint.OfRequest, Need: lint.Data, Mendable: true,
		Run: func(q *lint.Inquiry) {
			q.Report(finding.Finding{At: q.Request.Key("between"), Pairs: q.Request.Pairs(), Message: name + " speaks."})
		}}
}

func judge(t *testing.T, ed *Edition, path string) *Judgement {
	t.Helper()
	j, err := ed.Judge(context.Background(), path)
	if err != nil {
		t.Fatal(err)
	}
	return j
}

// spokenBy returns the findings of one rule.
func spokenBy(j *Judgement, rule string) []finding.Finding {
	var all []finding.Finding
	for _, f := range j.Findings {
		if f.Rule == rule {
			all = append(all, f)
		}
	}
	return all
}

// rulesOf lists the rules that spoke, in the order of the findings.
func rulesOf(j *Judgement) string {
	var all []string
	for _, f := range j.Findings {
		all = append(all, f.Rule)
	}
	return strings.Join(all, " ")
}

func wantRules(t *testing.T, j *Judgement, want string) {
	t.Helper()
	if got := rulesOf(j); got != want {
		t.Errorf("%s: rules %q, want %q", j.File, got, want)
		for _, f := range j.Findings {
			t.Logf("%s: %s", f.Rule, f.Message)
		}
	}
}

const shore = `
[record.shore]
file = "shore.csv"
along = { column = "year", kind = "time", step = "P1Y" }

[series.eelgrass]
unit = "ha"

[series.boats]
unit = "{count}"

[series.nitrate]
unit = "mg/L"
`

// shoreData are a few rows of the record, of no other meaning.
const shoreData = "year,eelgrass,boats,nitrate\n2001,3,5,1\n2002,4,4,2\n2003,2,6,2\n2004,5,3,1\n"
