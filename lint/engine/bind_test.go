package engine

import (
	"path/filepath"
	"strings"
	"testing"
)

func between(names ...string) string {
	return "[[correlation]]\nbetween = [\"" + strings.Join(names, "\", \"") + "\"]\n"
}

func TestSeriesAreFound(t *testing.T) {
	for _, c := range []struct{ name, analysis, want, says string }{
		{"plain", between("eelgrass", "boats"), "", ""},
		{"qualified", between("shore:eelgrass", "shore:boats"), "", ""},
		{"misspelt", between("eelgras", "boats"), "unknown-series", `nearest is "eelgrass"`},
		{"far off", between("salinity", "boats"), "unknown-series", "There are eelgrass, boats, nitrate."},
		{"listed", "manifests = [\"../data/shore.series.toml\"]\n" + between("eelgrass", "boats"), "", ""},
		{"missing manifest mutes", "manifests = [\"../data/gone.series.toml\"]\n" + between("eelgrass", "boats"), "missing-manifest", "gone.series.toml"},
		{"no manifest", "manifests = [\"../../x.series.toml\"]\n" + between("eelgrass", "boats"), "missing-manifest", "outside"},
		{"two of a name", "manifests = [\"../data/shore.series.toml\", \"../more/inland.series.toml\"]\n" + between("eelgrass", "rain"), "ambiguous-series", `"shore:eelgrass" or "inland:eelgrass"`},
		{"two told apart", "manifests = [\"../data/shore.series.toml\", \"../more/inland.series.toml\"]\n" + between("inland:eelgrass", "rain"), "", ""},
	} {
		t.Run(c.name, func(t *testing.T) {
			root := lay(t, map[string]string{
				"data/shore.series.toml":     shore,
				"more/inland.series.toml":    "[record.r]\nfile = \"r.csv\"\n[series.eelgrass]\n[series.rain]\n",
				"analyses/a.analysis.toml":   c.analysis,
				"analyses/shore.series.toml": shore,
			})
			j := judge(t, New(Options{Rules: problemRules()}).Workspace(root).Edition(), filepath.Join(root, "analyses/a.analysis.toml"))
			wantRules(t, j, c.want)
			if len(j.Findings) > 0 && !strings.Contains(j.Findings[0].Message, c.says) {
				t.Errorf("message %q does not say %q", j.Findings[0].Message, c.says)
			}
		})
	}
}

func TestManifestOfTheNearestFolderAbove(t *testing.T) {
	root := lay(t, map[string]string{
		"shore.series.toml":             "[record.r]\nfile = \"r.csv\"\n[series.rain]\n",
		"coast/shore.series.toml":       shore,
		"coast/deep/er/a.analysis.toml": between("eelgrass", "boats"),
	})
	ed := New(Options{Rules: problemRules()}).Workspace(root).Edition()
	wantRules(t, judge(t, ed, filepath.Join(root, "coast/deep/er/a.analysis.toml")), "")
	reaches := strings.Join(ed.Reaches(filepath.Join(root, "coast/deep/er/a.analysis.toml")), " ")
	for _, want := range []string{"coast/shore.series.toml", "coast/shore.csv", "a.analysis.toml"} {
		if !strings.Contains(reaches, filepath.FromSlash(want)) {
			t.Errorf("reaches %s, want %s among them", reaches, want)
		}
	}
}

func TestUnsavedManifestCounts(t *testing.T) {
	root := lay(t, map[string]string{"a.analysis.toml": between("eelgrass", "boats")})
	w := New(Options{Rules: problemRules()}).Workspace(root)
	a := filepath.Join(root, "a.analysis.toml")
	wantRules(t, judge(t, w.Edition(), a), "missing-manifest")
	w.Open(filepath.Join(root, "shore.series.toml"), []byte(shore), 1)
	wantRules(t, judge(t, w.Edition(), a), "")
}

func TestDependsOn(t *testing.T) {
	root := lay(t, map[string]string{
		"coast/shore.series.toml":    shore,
		"coast/deep/a.analysis.toml": between("eelgrass", "boats"),
		"inland/x.series.toml":       shore,
	})
	ed := New(Options{}).Workspace(root).Edition()
	for changed, want := range map[string]bool{
		"coast/shore.csv":                  true,
		"coast/shore.series.toml":          true,
		"coast/deep/a.analysis.toml":       true,
		"coast/deep/new.series.toml":       true,
		"gone.conventions.toml":            true,
		"inland/x.series.toml":             false,
		"inland/x.conventions.toml":        false,
		"coast/deep/another.analysis.toml": false,
	} {
		if got := ed.DependsOn(filepath.Join(root, "coast/deep/a.analysis.toml"), filepath.Join(root, changed)); got != want {
			t.Errorf("depends on %s: %v", changed, got)
		}
	}
}

func TestIdleSeries(t *testing.T) {
	root := lay(t, map[string]string{
		"shore.series.toml":    shore,
		"a.analysis.toml":      between("eelgrass", "shore:boats"),
		"lab.conventions.toml": "[review]\nexclude = [\"old\"]\n",
		"old/b.analysis.toml":  "manifests = [\"../shore.series.toml\"]\n" + between("eelgrass", "nitrate"),
	})
	ed := New(Options{}).Workspace(root).Edition()
	r, err := ed.read(t.Context(), filepath.Join(root, "shore.series.toml"), withData)
	if err != nil {
		t.Fatal(err)
	}
	if got := strings.Join(r.idle(t.Context()), " "); got != "nitrate" {
		t.Errorf("idle: %q", got)
	}
}
