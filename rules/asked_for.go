package rules

import (
	"strings"

	"lagwise/lint/document"
	"lagwise/lint/request"
)

// asksForRequest reports whether the lab asks for a field of every request.
func asksForRequest(c *request.Conventions, field string) bool {
	return c != nil && holds(c.AskedFor.Request, field)
}

// asksForSeries reports whether the lab asks for a field of every series.
func asksForSeries(c *request.Conventions, field string) bool {
	return c != nil && holds(c.AskedFor.Series, field)
}

func holds(list []string, word string) bool {
	for _, w := range list {
		if w == word {
			return true
		}
	}
	return false
}

func written(r *request.Asked, key string) bool {
	_, ok := r.Keys[key]
	return ok
}

// lacking lists the asked-for fields that are not written, or written empty.
func lacking(fields []string, keys map[string]request.Place, t *document.Tree) []string {
	var absent []string
	for _, field := range fields {
		p, ok := keys[field]
		if !ok || strings.Trim(t.Raw(p.Value), "\"' \t\r\n") == "" {
			absent = append(absent, field)
		}
	}
	return absent
}
