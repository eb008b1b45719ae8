package engine

import (
	"context"
	"path/filepath"
	"testing"

	"lagwise/lint/document"
	"lagwise/lint/finding"
)

// FuzzJudge holds the judgement of any three texts to its promises: no panic,
// no broken rule, every place inside the text, and the same from what is
// known of the text as from the judgement as far as the text goes.
func FuzzJudge(f *testing.F) {
	f.Add(between("eelgrass", "boats"), shore, "[weight]\ndrift = \"hint\"\n")
	f.Add("[[correlation]]\nbetween = [\"a\", \"shore:b\", \"x:\"]\n[[correlation.deviation]]\nfrom = \"drft\"\nuntil = \"2026-99-99\"", "[record.r]\n[series.a]\nrecord = \"q\"", "builds-on = [\"lab.conventions.toml\", \"../../x\"]\n[review]\nexclude = [\"[\", \"**\"]")
	f.Add("manifests = [\"\", \"\\u0000\", \"//x\", \"shore.series.toml\"]\n[[regression]]\nresponse = 3", "[series.a]\n[series.a]\n", "[review]\nfinal = [\"weight\", \"\"]\n[weight]\n\"\" = 1\n[asked-for]\ndeviation-longest = \"P-1Y\"")
	folder := f.TempDir()
	e := New(Options{Rules: append(problemRules(), voice("drift", finding.Error)), OnDate: "2026-03-02"})
	f.Fuzz(func(t *testing.T, analysis, manifest, conventions string) {
		w := e.Workspace(folder)
		texts := map[string]string{"a.analysis.toml": analysis, "shore.series.toml": manifest, "lab.conventions.toml": conventions}
		for name, text := range texts {
			w.Open(filepath.Join(folder, name), []byte(text), 1)
		}
		ed := w.Edition()
		for name, text := range texts {
			path := filepath.Join(folder, name)
			j, err := ed.Judge(context.Background(), path)
			if err != nil || len(j.Broken) > 0 {
				t.Fatalf("%v %v", err, j)
			}
			for _, found := range j.Findings {
				if !inside(document.Span{End: len(text)}, found.At) || found.At.End < found.At.Start || found.Message == "" {
					t.Fatalf("finding %+v in %q", found, text)
				}
			}
			if known := ed.Known(path); known.Complete && len(known.Findings) > len(j.Findings) {
				t.Fatalf("known %v, judged %v", known.Findings, j.Findings)
			}
			ed.Reaches(path)
		}
	})
}
