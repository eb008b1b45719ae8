package engine_test

import (
	"context"
	"fmt"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"lagwise/lint/engine"
	"lagwise/lint/finding"
	"lagwise/rules"
)

// walks writes two seeded random walks as a CSV file; sign multiplies the
// second.
func walks(t *testing.T, folder string, sign float64) {
	t.Helper()
	r := rand.New(rand.NewPCG(7, 11))
	var text strings.Builder
	text.WriteString("year,eelgrass,boats\n")
	x, y := 0.0, 0.0
	for year := 1967; year <= 2020; year++ {
		x += r.NormFloat64()
		y += r.NormFloat64()
		fmt.Fprintf(&text, "%d,%.6f,%.6f\n", year, x, sign*y)
	}
	put(t, filepath.Join(folder, "shore.csv"), text.String())
}

func put(t *testing.T, path, text string) {
	t.Helper()
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
}

const walkManifest = `[record.shore]
file = "shore.csv"
along = { column = "year", kind = "time", step = "P1Y" }
[series.eelgrass]
unit = "ha"
[series.boats]
unit = "{count}"
`

const walkRequests = `[[correlation]]
aim = "association"
between = ["eelgrass", "boats"]

[[regression]]
aim = "effect"
response = "eelgrass"
predictors = ["boats"]
`

// TestChoiceNeverLooksAtTheResult multiplies one series by -1: every rewrite
// that is offered, what it leaves and which is preferred stay the same; only
// the sign of the estimate turns.
func TestChoiceNeverLooksAtTheResult(t *testing.T) {
	plain, turned := proven(t, 1), proven(t, -1)
	if len(plain.Findings) != len(turned.Findings) {
		t.Fatalf("%d findings became %d", len(plain.Findings), len(turned.Findings))
	}
	offers := 0
	for i, f := range plain.Findings {
		g := turned.Findings[i]
		if f.Rule != g.Rule || f.Severity != g.Severity || len(f.Rewrites) != len(g.Rewrites) {
			t.Fatalf("%s (%d rewrites) became %s (%d rewrites)", f.Rule, len(f.Rewrites), g.Rule, len(g.Rewrites))
		}
		for k := range f.Rewrites {
			offers++
			sameButForTheSign(t, f.Rewrites[k], g.Rewrites[k])
		}
	}
	if offers == 0 {
		t.Error("nothing was offered for two random walks")
	}
}

func sameButForTheSign(t *testing.T, a, b finding.Rewrite) {
	t.Helper()
	if a.Preferred != b.Preferred || a.Question != b.Question || strings.Join(a.Leaves, " ") != strings.Join(b.Leaves, " ") {
		t.Errorf("%q became %q", a.Title, b.Title)
	}
	if len(a.Edits) != len(b.Edits) || a.Edits[0].Text != b.Edits[0].Text {
		t.Errorf("%v became %v", a.Edits, b.Edits)
	}
	if a.Gives.Estimate != nil && !a.Question && (b.Gives.Estimate == nil || !near(*a.Gives.Estimate, -*b.Gives.Estimate)) {
		t.Errorf("%q: the estimate did not turn its sign in %q", a.Title, b.Title)
	}
}

// near allows for sums that are taken in another order.
func near(a, b float64) bool { return a-b < 1e-9 && b-a < 1e-9 }

func proven(t *testing.T, sign float64) *engine.Judgement {
	t.Helper()
	folder := t.TempDir()
	walks(t, folder, sign)
	put(t, filepath.Join(folder, "shore.series.toml"), walkManifest)
	put(t, filepath.Join(folder, "a.analysis.toml"), walkRequests)
	ed := engine.New(engine.Options{Rules: rules.All(), OnDate: "2026-03-02"}).Workspace(folder).Edition()
	j, err := ed.Prove(context.Background(), filepath.Join(folder, "a.analysis.toml"))
	if err != nil {
		t.Fatal(err)
	}
	if len(j.Broken) > 0 {
		t.Fatalf("broken: %q", j.Broken)
	}
	return j
}
