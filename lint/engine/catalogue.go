package engine

import (
	"fmt"

	"lagwise/lint/document"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

// failedRule is the name under which a rule that broke down is told.
const failedRule = "failed-rule"

// place is the rank of a rule in the catalogue; what it does not hold comes
// last.
func (e *Engine) place(rule string) int {
	for i, r := range e.rules {
		if r.Name == rule {
			return i
		}
	}
	return len(e.rules)
}

// weighted is the severity of a rule under conventions: what they say, or
// what the rule said itself.
func weighted(c *request.Conventions, rule string, said finding.Severity) finding.Severity {
	if s, ok := finding.ParseSeverity(c.Weight[rule]); ok && rule != failedRule {
		return s
	}
	return said
}

// unknownRule words that the catalogue does not hold a rule; quoted says
// whether its name stands as a string rather than as a key.
func (e *Engine) unknownRule(name string, at document.Span, quoted bool) request.Problem {
	var names []string
	for _, r := range e.rules {
		names = append(names, r.Name)
	}
	p := request.Problem{Rule: "unknown-rule", At: at, Message: fmt.Sprintf("There is no rule %q.", name)}
	near := request.Nearest(name, names)
	if near == "" {
		p.Message += " `lagwise grounds` lists the rules."
		return p
	}
	p.Message += fmt.Sprintf(" The nearest is %s.", near)
	text := near
	if quoted {
		text = document.Quote(near)
	}
	p.Nearest = &document.Edit{At: at, Text: text}
	return p
}
