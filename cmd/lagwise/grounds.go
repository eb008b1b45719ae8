package main

import (
	"context"
	"fmt"
	"io"

	"lagwise/lint/present"
	"lagwise/rules"
)

func grounds(_ context.Context, s streams, args []string) (int, error) {
	o := &options{}
	f := newFlags("grounds", s, o, "text", "json")
	if err := f.parse(args, o); err != nil {
		return exitFailed, err
	}
	if len(o.paths) > 1 {
		return exitFailed, &usageError{"grounds takes one word: a rule or a term"}
	}
	g := present.Grounds{}
	for _, r := range rules.All() {
		g.Rules = append(g.Rules, present.Rule{Name: r.Name, Severity: r.Severity.String(), Title: r.Title, Needs: r.Need.String(), Page: r.Page})
	}
	for _, t := range rules.Terms() {
		g.Terms = append(g.Terms, present.Term{Name: t.Term, Page: t.Page})
	}
	if len(o.paths) == 1 {
		word := o.paths[0]
		var near string
		if g, near = g.Only(word); g.Empty() {
			if near != "" {
				return exitFailed, fmt.Errorf("there is no rule or term %q; the nearest is %q", word, near)
			}
			return exitFailed, fmt.Errorf("there is no rule or term %q; lagwise grounds lists them", word)
		}
	}
	return exitFine, o.write(s, forms{
		"text": func(w io.Writer) error { return present.GroundsText(w, g, len(o.paths) == 1) },
		"json": func(w io.Writer) error { return present.GroundsJSON(w, present.NewHead(version, "", o.onDate), g) },
	})
}
