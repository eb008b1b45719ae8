package main

import (
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"lagwise/lint/present"
)

// What the README shows is what the program prints.
func TestReadmeShowsWhatIsPrinted(t *testing.T) {
	t.Chdir("../..")
	readme, err := os.ReadFile("README.md")
	if err != nil {
		t.Fatal(err)
	}
	first, _, _ := strings.Cut(lagwise(t, exitHeld, "review", "testdata/estuary"), "\n\n")
	for what, text := range map[string]string{"finding": first, "hover": hoverOf(t, "testdata/estuary/analyses/eelgrass.analysis.toml")} {
		if !strings.Contains(string(readme), "```\n"+text+"\n```") {
			t.Errorf("the %s of the README is not this:\n%s", what, text)
		}
	}
}

// hoverOf is the hover of the first request of a document, in plain text.
func hoverOf(t *testing.T, document string) string {
	t.Helper()
	path, err := filepath.Abs(document)
	if err != nil {
		t.Fatal(err)
	}
	e, err := (&options{onDate: "2026-01-01"}).engine()
	if err != nil {
		t.Fatal(err)
	}
	ed := e.Workspace(filepath.Dir(path)).Edition()
	j, err := ed.Prove(context.Background(), path)
	if err != nil {
		t.Fatal(err)
	}
	x, err := ed.Explain(context.Background(), path, 0)
	if err != nil {
		t.Fatal(err)
	}
	return present.Hover(x, j.Findings[:1], false)
}
