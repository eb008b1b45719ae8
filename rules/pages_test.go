package rules_test

import (
	"regexp"
	"strings"
	"testing"

	"lagwise/lint"
	"lagwise/rules"
)

// sections are those of every page, in their order.
var sections = []string{"What it watches", "Why", "How it decides", "What is offered", "When a deviation is fair", "References"}

var kebab = regexp.MustCompile(`^[a-z]+(-[a-z]+)*$`)

func TestRulesAreNamedOnceAndWhole(t *testing.T) {
	seen := map[string]bool{}
	for _, r := range rules.All() {
		if !kebab.MatchString(r.Name) {
			t.Errorf("%q is no name in lower case with hyphens", r.Name)
		}
		if seen[r.Name] {
			t.Errorf("%s stands in the catalogue twice", r.Name)
		}
		seen[r.Name] = true
		if r.Title == "" || r.Severity.String() == "unset" || r.Scope == 0 || r.Need == 0 || r.Run == nil {
			t.Errorf("%s is not whole: %+v", r.Name, r)
		}
	}
}

func TestPagesHaveAllSections(t *testing.T) {
	for _, r := range rules.All() {
		if !strings.HasPrefix(r.Page, "# "+r.Name+"\n\n") {
			t.Errorf("%s: the page is not headed by the rule's name", r.Name)
			continue
		}
		var found []string
		for _, part := range strings.Split(r.Page, "\n## ")[1:] {
			heading, text, _ := strings.Cut(part, "\n")
			found = append(found, heading)
			if strings.TrimSpace(text) == "" {
				t.Errorf("%s: nothing stands under %q", r.Name, heading)
			}
		}
		if strings.Join(found, "|") != strings.Join(sections, "|") {
			t.Errorf("%s: the sections are %q, want %q", r.Name, found, sections)
		}
	}
}

// TestPagesSayWhatTheRuleSays holds the first lines of a page, and whether it
// admits a deviation, to the rule itself.
func TestPagesSayWhatTheRuleSays(t *testing.T) {
	for _, r := range rules.All() {
		lead, _, _ := strings.Cut(strings.TrimPrefix(r.Page, "# "+r.Name+"\n\n"), "\n\n")
		severity, _, _ := strings.Cut(lead, " ")
		if strings.ToLower(severity) != r.Severity.String() {
			t.Errorf("%s is %s, its page says %q", r.Name, r.Severity, lead)
		}
		if r.Need == lint.Data && !strings.Contains(lead, "data") {
			t.Errorf("%s needs the data, its page says %q", r.Name, lead)
		}
		_, fair, _ := strings.Cut(r.Page, "\n## When a deviation is fair\n\n")
		none := strings.HasPrefix(fair, "None is admitted") || strings.HasPrefix(fair, "Never")
		if none != r.NoDeviation {
			t.Errorf("%s: admits no deviation is %v, its page says %q", r.Name, r.NoDeviation, fair[:min(len(fair), 40)])
		}
	}
}

// TestPagesLeadToRules finds every rule that a page names in code font with
// "speaks" or "tells" behind it in the catalogue.
func TestPagesLeadToRules(t *testing.T) {
	known := map[string]bool{}
	for _, r := range rules.All() {
		known[r.Name] = true
	}
	link := regexp.MustCompile("`([a-z-]+)`\\s+(?:speaks|tells)")
	found := 0
	for _, r := range rules.All() {
		for _, m := range link.FindAllStringSubmatch(r.Page, -1) {
			found++
			if !known[m[1]] {
				t.Errorf("%s: its page sends the reader to %s, which is no rule", r.Name, m[1])
			}
		}
	}
	if found == 0 {
		t.Error("no page names another rule: the pattern finds nothing")
	}
}
