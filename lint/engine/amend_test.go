package engine

import (
	"bytes"
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"lagwise/lint"
	"lagwise/lint/finding"
)

func amend(t *testing.T, w *Workspace, o AmendOptions, paths ...string) *Amended {
	t.Helper()
	a, err := w.Amend(context.Background(), paths, o)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

func TestAmendAppliesThePreferredOnce(t *testing.T) {
	root, path := oneRequest(t, "# a comment that stays\r\n\n[[correlation]]\nname = \"second\"\nbetween = [\"boats\", \"nitrate\"]\n")
	if err := os.Chmod(path, 0o640); err != nil {
		t.Fatal(err)
	}
	link := filepath.Join(root, "link.analysis.toml")
	if err := os.Symlink("a.analysis.toml", link); err != nil {
		t.Fatal(err)
	}
	w := proposing([]lint.Rule{speaksOn("drift", finding.Error, "levels")}, diffs).Workspace(root)
	shown := amend(t, w, AmendOptions{}, link).Files[0]
	if shown.Err != nil || len(shown.Applied) != 2 || bytes.Equal(shown.Before, shown.After) {
		t.Fatalf("shown %+v", shown)
	}
	if now, _ := os.ReadFile(path); !bytes.Equal(now, shown.Before) {
		t.Fatal("nothing is written unless asked")
	}
	if got := amend(t, w, AmendOptions{Write: true}, link).Files[0]; got.Err != nil {
		t.Fatal(got.Err)
	}
	now, _ := os.ReadFile(path)
	if !bytes.Equal(now, shown.After) || strings.Count(string(now), `on = "first-differences"`) != 2 || !bytes.Contains(now, []byte("stays\r\n")) {
		t.Errorf("written:\n%s", now)
	}
	info, _ := os.Lstat(path)
	if target, err := os.Readlink(link); err != nil || target != "a.analysis.toml" || info.Mode().Perm() != 0o640 {
		t.Errorf("the link or the mode did not stay: %v %v", err, info.Mode())
	}
	again := amend(t, w, AmendOptions{Write: true}, path).Files[0]
	if len(again.Applied) != 0 || !bytes.Equal(again.Before, again.After) {
		t.Errorf("amending twice changes again: %v", again.Applied)
	}
	if left, _ := filepath.Glob(filepath.Join(root, ".lagwise-*")); len(left) > 0 {
		t.Errorf("temporary files left: %v", left)
	}
}

func TestAmendNarrowed(t *testing.T) {
	root, _ := oneRequest(t, "[[correlation]]\nname = \"second\"\nbetween = [\"boats\", \"nitrate\"]\n")
	rules := []lint.Rule{speaksOn("drift", finding.Error, "levels"), speaksOn("season", finding.Warning, "levels")}
	w := proposing(rules, diffs).Workspace(root)
	one := amend(t, w, AmendOptions{Request: "second"}, filepath.Join(root, "a.analysis.toml")).Files[0]
	if len(one.Applied) != 1 || !strings.HasPrefix(one.Applied[0], "second: ") {
		t.Errorf("applied %q", one.Applied)
	}
	none := amend(t, w, AmendOptions{Rule: "autocorrelation"}, filepath.Join(root, "a.analysis.toml")).Files[0]
	if len(none.Applied) != 0 {
		t.Errorf("applied %q for a rule that does not speak", none.Applied)
	}
}

func TestAmendStopsWhereItCameBy(t *testing.T) {
	_, path := oneRequest(t, "")
	rules := []lint.Rule{speaksOn("drift", finding.Error, "levels", white), speaksOn("over", finding.Error, diffs)}
	e := proposing(rules, white, diffs)
	got := amend(t, e.Workspace(), AmendOptions{}, path).Files[0]
	if got.Err != nil {
		t.Fatal(got.Err)
	}
	if len(got.Applied) > rounds || len(got.Left) == 0 {
		t.Errorf("applied %q, left %q", got.Applied, got.Left)
	}
}

func TestAmendBreaksNoPromise(t *testing.T) {
	_, path := oneRequest(t, "")
	surprise := lint.Rule{Name: "surprise", Severity: finding.Warning, Scope: lint.OfDocument, Run: func(q *lint.Inquiry) {
		if bytes.Contains(q.Tree.Text, []byte("first-differences")) {
			q.Report(finding.Finding{Message: "unannounced"})
		}
	}}
	got := amend(t, proposing([]lint.Rule{speaksOn("drift", finding.Error, "levels"), surprise}, diffs).Workspace(), AmendOptions{Write: true}, path).Files[0]
	if got.Err == nil || !strings.Contains(got.Err.Error(), "surprise") || !bytes.Equal(got.Before, got.After) {
		t.Errorf("%+v", got)
	}
	if now, _ := os.ReadFile(path); !bytes.Equal(now, got.Before) {
		t.Error("the file was written all the same")
	}
}

func TestAmendLeavesAChangedFileAlone(t *testing.T) {
	_, path := oneRequest(t, "")
	w := proposing([]lint.Rule{speaksOn("drift", finding.Error, "levels")}, diffs).Workspace()
	w.Edition().Tree(path)
	write(t, path, "title = \"somebody else\"\n")
	got := amend(t, w, AmendOptions{Write: true}, path).Files[0]
	if got.Err == nil || !strings.Contains(got.Err.Error(), "changed on disk") {
		t.Errorf("error %v", got.Err)
	}
	if now, _ := os.ReadFile(path); string(now) != "title = \"somebody else\"\n" {
		t.Errorf("overwritten: %s", now)
	}
}

func TestDeviationIsNotAmended(t *testing.T) {
	_, path := oneRequest(t, "[[correlation.deviation]]\nfrom = \"drift\"\nreason = \"pilot series\"\n")
	got := amend(t, proposing([]lint.Rule{speaksOn("drift", finding.Error, "levels")}, diffs).Workspace(), AmendOptions{}, path).Files[0]
	if len(got.Applied) != 0 || got.Err != nil {
		t.Errorf("%+v", got)
	}
}
