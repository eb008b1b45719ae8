package lint_test

import (
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// TestEveryRuleHasItsPage holds the catalogue to one page beside each rule,
// headed by the rule's name, and to no page without a rule.
func TestEveryRuleHasItsPage(t *testing.T) {
	files, err := filepath.Glob("../rules/*.*")
	if err != nil || len(files) == 0 {
		t.Fatalf("no rules found: %v", err)
	}
	for _, path := range files {
		base, ext := strings.TrimSuffix(path, filepath.Ext(path)), filepath.Ext(path)
		name := strings.ReplaceAll(filepath.Base(base), "_", "-")
		switch {
		case ext == ".md":
			if source := read(t, base+".go"); !strings.Contains(source, `"`+name+`"`) {
				t.Errorf("%s: no rule is named %s beside it", path, name)
			}
		case ext == ".go" && strings.Contains(read(t, path), "= lint.Rule{"):
			if page := read(t, base+".md"); !strings.HasPrefix(page, "# "+name+"\n") {
				t.Errorf("%s: its page is missing, or not headed %q", path, "# "+name)
			}
		}
	}
}

// read returns the text of a file, empty when there is none.
func read(t *testing.T, path string) string {
	t.Helper()
	text, err := os.ReadFile(path)
	if err != nil && !os.IsNotExist(err) {
		t.Fatal(err)
	}
	return string(text)
}
