package engine

import (
	"context"
	"fmt"
	"path/filepath"
	"strings"
	"testing"

	"lagwise/lint/finding"
)

// BenchmarkKeystroke is one edit of an analysis of 200 requests: the new text
// is laid over, and everything that is known of it is told.
func BenchmarkKeystroke(b *testing.B) {
	root := b.TempDir()
	var text strings.Builder
	for i := range 200 {
		fmt.Fprintf(&text, "[[correlation]]\nname = \"r%d\"\nbetween = [\"eelgrass\", \"boats\"]\n\n", i)
	}
	path := filepath.Join(root, "a.analysis.toml")
	w := New(Options{Rules: append(problemRules(), voice("drift", finding.Error))}).Workspace(root)
	w.Open(filepath.Join(root, "shore.series.toml"), []byte(shore), 1)
	w.Open(path, []byte(text.String()), 1)
	if _, err := w.Edition().Judge(context.Background(), path); err != nil {
		b.Fatal(err)
	}
	for i := 0; b.Loop(); i++ {
		w.Change(path, fmt.Appendf(nil, "title = \"%d\"\n%s", i, text.String()), int32(i))
		if j := w.Edition().Known(path); !j.Complete || len(j.Findings) != 200 {
			b.Fatalf("%d findings", len(j.Findings))
		}
	}
}
