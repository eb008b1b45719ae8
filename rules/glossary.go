package rules

import (
	"embed"
	"slices"
	"strings"
)

//go:embed terms/*.md
var termPages embed.FS

// Term is one entry of the glossary.
type Term struct{ Term, Page string }

// Terms returns the glossary in the order of its terms. The term is the title
// of its page.
func Terms() []Term {
	var all []Term
	files, _ := termPages.ReadDir("terms") // it is embedded
	for _, file := range files {
		page, _ := termPages.ReadFile("terms/" + file.Name()) // it was just listed
		title, _, _ := strings.Cut(string(page), "\n")
		all = append(all, Term{Term: strings.TrimPrefix(title, "# "), Page: string(page)})
	}
	slices.SortFunc(all, func(a, b Term) int { return strings.Compare(strings.ToLower(a.Term), strings.ToLower(b.Term)) })
	return all
}
