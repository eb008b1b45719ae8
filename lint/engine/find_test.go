package engine

import (
	"os"
	"path/filepath"
	"strings"
	"testing"
)

func TestFindSearchesFolders(t *testing.T) {
	root := lay(t, map[string]string{
		"lab.conventions.toml":           "[review]\nexclude = [\"archive/**\", \"*/draft-*\"]\n",
		"data/shore.series.toml":         shore,
		"data/shore.csv":                 "year\n",
		"analyses/a.analysis.toml":       "",
		"analyses/draft-b.analysis.toml": "",
		"archive/old/c.analysis.toml":    "",
		".hidden/d.analysis.toml":        "",
	})
	if err := os.Symlink(filepath.Join(root, "analyses"), filepath.Join(root, "again")); err != nil {
		t.Fatal(err)
	}
	w := New(Options{}).Workspace(root)
	unsaved := filepath.Join(root, "analyses", "z.analysis.toml")
	w.Open(unsaved, nil, 1)
	found, err := w.Edition().Find()
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, p := range found {
		rel, _ := filepath.Rel(root, p)
		got = append(got, filepath.ToSlash(rel))
	}
	want := "analyses/a.analysis.toml analyses/z.analysis.toml data/shore.series.toml lab.conventions.toml"
	if strings.Join(got, " ") != want {
		t.Errorf("found %v, want %s", got, want)
	}
	named := filepath.Join(root, "archive/old/c.analysis.toml")
	if found, err = w.Edition().Find(named); err != nil || len(found) != 1 {
		t.Errorf("a document that is named counts though it is excluded: %v, %v", found, err)
	}
}

func TestFindTellsWhatItCannotSearch(t *testing.T) {
	root := lay(t, map[string]string{"a.analysis.toml": "", "shore.csv": ""})
	found, err := New(Options{}).Workspace().Edition().Find(root, filepath.Join(root, "gone"), filepath.Join(root, "shore.csv"))
	if len(found) != 1 {
		t.Errorf("found %v, want the one document", found)
	}
	if err == nil || !strings.Contains(err.Error(), "gone is not there") || !strings.Contains(err.Error(), "shore.csv is no document") {
		t.Errorf("error %v must name both paths", err)
	}
}

func TestMatches(t *testing.T) {
	for _, c := range []struct {
		pattern, name string
		want          bool
	}{
		{"archive/**", "archive/old/a.analysis.toml", true},
		{"archive/**", "archive", false},
		{"archive", "archive/old/a.analysis.toml", true},
		{"**/old", "archive/old/a.analysis.toml", true},
		{"**/draft-*.toml", "draft-a.toml", true},
		{"*.toml", "deep/a.toml", false},
		{"a?c/[xy]", "abc/y", true},
		{"a[", "a[", false},
	} {
		if got := matches(c.pattern, c.name); got != c.want {
			t.Errorf("matches(%q, %q) = %v", c.pattern, c.name, got)
		}
	}
}
