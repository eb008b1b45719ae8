package engine

import (
	"path/filepath"
	"strings"
	"testing"
)

func TestWhatCannotBeComputedSaysWhy(t *testing.T) {
	root := lay(t, map[string]string{"shore.series.toml": shore,
		"a.analysis.toml": between("eelgras", "boats", "nitrate") + "[[regression]]\nresponse = \"eelgrass\"\npredictors = [\"salinity\"]\n"})
	path := filepath.Join(root, "a.analysis.toml")
	ed := New(Options{Rules: problemRules()}).Workspace(root).Edition()
	all, err := ed.Compute(t.Context(), path)
	if err != nil || len(all) != 4 {
		t.Fatalf("%d results, %v: three pairs and a regression are asked for", len(all), err)
	}
	for i, want := range []string{"eelgras", "eelgras", "eelgras", "salinity"} {
		if c := all[i]; c.Recommended != nil || !strings.Contains(c.AsWritten.Error, want) || (c.Pair == nil) != (i == 3) {
			t.Errorf("result %d: %+v", i, c.AsWritten)
		}
	}
	e, err := ed.Explain(t.Context(), path, 1)
	if err != nil || !strings.Contains(e.NoPreferred, "salinity") {
		t.Errorf("%+v %v", e, err)
	}
	if _, err := ed.Explain(t.Context(), path, 2); err == nil || !strings.Contains(err.Error(), "no request number 3") {
		t.Errorf("error %v", err)
	}
	if _, err := ed.Screen(t.Context(), path); err == nil {
		t.Error("an analysis has no series to screen")
	}
}
