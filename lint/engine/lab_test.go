package engine

import (
	"path/filepath"
	"strings"
	"testing"

	"lagwise/lint/finding"
)

func TestConventionsAreTakenFromTheRootDown(t *testing.T) {
	root := lay(t, map[string]string{
		"lab.conventions.toml":         "[review]\nhold-at = \"error\"\nalpha = 0.01\n[weight]\nstray-key = \"hint\"\n",
		"shared/base.conventions.toml": "[review]\nhold-at = \"hint\"\nleast-effective-n = 9\n",
		"coast/coast.conventions.toml": "builds-on = [\"../shared/base.conventions.toml\"]\n[review]\nhold-at = \"information\"\n",
		"coast/deep/a.analysis.toml":   "stray = 1\n",
		"elsewhere/b.analysis.toml":    "",
	})
	ed := New(Options{Rules: problemRules()}).Workspace(root).Edition()
	a := filepath.Join(root, "coast/deep/a.analysis.toml")
	if got := ed.HoldAt(a); got != finding.Information {
		t.Errorf("the nearest file wins, got %s", got)
	}
	l := ed.lab(a)
	if l.settings.Alpha != 0.01 || l.settings.LeastEffectiveN != 9 {
		t.Errorf("alpha %v from the root, least effective n %v from what it builds on", l.settings.Alpha, l.settings.LeastEffectiveN)
	}
	if got := ed.HoldAt(filepath.Join(root, "elsewhere/b.analysis.toml")); got != finding.Error {
		t.Errorf("conventions of another folder reached here: %s", got)
	}
	j := judge(t, ed, a)
	wantRules(t, j, "stray-key")
	if j.Findings[0].Severity != finding.Hint {
		t.Errorf("weight hint, got %s", j.Findings[0].Severity)
	}
}

func TestConventionsProblems(t *testing.T) {
	root := lay(t, map[string]string{
		"a/a.conventions.toml":       "builds-on = [\"../b/b.conventions.toml\"]\n",
		"b/b.conventions.toml":       "builds-on = [\"../a/a.conventions.toml\"]\n",
		"c/c.conventions.toml":       "builds-on = [\"gone.conventions.toml\"]\n[weight]\nstray-keys = \"hint\"\n",
		"d/one.conventions.toml":     "",
		"d/two.conventions.toml":     "",
		"e/e.conventions.toml":       "[review]\nfinal = [\"weight.stray-key\"]\n[weight]\nstray-key = \"error\"\n",
		"e/below/f.conventions.toml": "[weight]\nstray-key = \"none\"\n",
		"e/below/a.analysis.toml":    "stray = 1\n",
	})
	ed := New(Options{Rules: problemRules()}).Workspace(root).Edition()
	for file, want := range map[string]string{
		"a/a.conventions.toml":       "circular-conventions",
		"b/b.conventions.toml":       "circular-conventions",
		"c/c.conventions.toml":       "missing-conventions unknown-rule",
		"d/one.conventions.toml":     "repeated-name",
		"d/two.conventions.toml":     "repeated-name",
		"e/e.conventions.toml":       "",
		"e/below/f.conventions.toml": "wrong-value",
		"e/below/a.analysis.toml":    "stray-key",
	} {
		wantRules(t, judge(t, ed, filepath.Join(root, file)), want)
	}
	unknown := spokenBy(judge(t, ed, filepath.Join(root, "c/c.conventions.toml")), "unknown-rule")[0]
	if !strings.Contains(unknown.Message, "stray-key.") {
		t.Errorf("no nearest rule in %q", unknown.Message)
	}
}

func TestGivenConventionsReplaceTheSearch(t *testing.T) {
	trusted := lay(t, map[string]string{"t.conventions.toml": "[review]\nhold-at = \"hint\"\n"})
	root := lay(t, map[string]string{
		"lab.conventions.toml": "[weight]\nstray-key = \"none\"\n",
		"a.analysis.toml":      "stray = 1\n",
	})
	a := filepath.Join(root, "a.analysis.toml")
	ed := New(Options{Rules: problemRules(), Conventions: filepath.Join(trusted, "t.conventions.toml")}).Workspace(root).Edition()
	wantRules(t, judge(t, ed, a), "stray-key")
	if ed.HoldAt(a) != finding.Hint {
		t.Error("hold-at comes from the given conventions")
	}
	ed = New(Options{Rules: problemRules(), Conventions: filepath.Join(trusted, "gone.conventions.toml")}).Workspace(root).Edition()
	if _, err := ed.Judge(t.Context(), a); err == nil {
		t.Error("conventions that were given and cannot be read must stop the review")
	}
}
