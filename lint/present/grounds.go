package present

import (
	"fmt"
	"io"
	"strings"

	"lagwise/lint/request"
)

// Grounds is the catalogue of rules and the glossary.
type Grounds struct {
	Rules []Rule
	Terms []Term
}

// Rule is one rule as the catalogue shows it.
type Rule struct {
	Name     string `json:"rule"`
	Severity string `json:"severity"`
	Title    string `json:"title"`
	Needs    string `json:"needs"`
	Page     string `json:"page"`
}

// Term is one entry of the glossary.
type Term struct {
	Name string `json:"term"`
	Page string `json:"page"`
}

// Empty reports whether nothing is in it.
func (g Grounds) Empty() bool { return len(g.Rules)+len(g.Terms) == 0 }

// Only returns the rule or the term of that name; where there is none, the
// nearest name, if one is near.
func (g Grounds) Only(word string) (only Grounds, nearest string) {
	var names []string
	for _, r := range g.Rules {
		if r.Name == word {
			only.Rules = append(only.Rules, r)
		}
		names = append(names, r.Name)
	}
	for _, t := range g.Terms {
		if strings.EqualFold(t.Name, word) {
			only.Terms = append(only.Terms, t)
		}
		names = append(names, t.Name)
	}
	return only, request.Nearest(word, names)
}

// GroundsText writes the catalogue, or pages where pages are asked for.
func GroundsText(w io.Writer, g Grounds, pages bool) error {
	var b strings.Builder
	if pages {
		for _, r := range g.Rules {
			b.WriteString(strings.TrimSpace(r.Page) + "\n")
		}
		for _, t := range g.Terms {
			b.WriteString(strings.TrimSpace(t.Page) + "\n")
		}
		_, err := io.WriteString(w, b.String())
		return err
	}
	var rows [][]string
	for _, r := range g.Rules {
		rows = append(rows, []string{r.Name, r.Severity, r.Title})
	}
	for _, line := range aligned(rows) {
		b.WriteString(line + "\n")
	}
	var terms []string
	for _, t := range g.Terms {
		terms = append(terms, t.Name)
	}
	fmt.Fprintf(&b, "\nTerms: %s.\n", strings.Join(terms, ", "))
	b.WriteString("lagwise grounds WORD shows the page of a rule or a term.\n")
	_, err := io.WriteString(w, b.String())
	return err
}

// GroundsJSON writes the catalogue with its pages.
func GroundsJSON(w io.Writer, head Head, g Grounds) error {
	return writeJSON(w, struct {
		Head
		Rules []Rule `json:"rules"`
		Terms []Term `json:"terms"`
	}{head, orEmpty(g.Rules), orEmpty(g.Terms)})
}
