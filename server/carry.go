package server

import (
	"bytes"
	"slices"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/engine"
	"lagwise/lint/finding"
)

// shown is what a client was told last of one document.
type shown struct {
	version  int32
	text     []byte
	findings []finding.Finding
	items    []byte // as they went out
}

// carried returns what is known, and for the requests that the rules have not
// judged yet the earlier findings about their data, so that nothing flickers
// while they are judged. A finding whose own text was edited is dropped.
func (s *session) carried(ed *engine.Edition, known *engine.Judgement, before shown) *engine.Judgement {
	text, err := ed.Text(known.Path)
	if err != nil || known.Complete || before.text == nil {
		return known
	}
	spoken, asked := map[string]bool{}, map[string]bool{}
	for _, f := range known.Findings {
		spoken[f.Request] = spoken[f.Request] || s.aboutData[f.Rule]
	}
	for _, a := range ed.Requests(known.Path) {
		asked[a.Name] = true
	}
	all := *known
	all.Findings = slices.Clone(known.Findings)
	moved := movedBy(before.text, text)
	for _, f := range before.findings {
		if !s.aboutData[f.Rule] || !asked[f.Request] || spoken[f.Request] {
			continue
		}
		if at, ok := moved(f.At); ok {
			f.At = at
			all.Findings = append(all.Findings, f)
		}
	}
	return &all
}

// movedBy returns where spans of one text stand in another that one stretch
// of editing made of it; false for a span that the editing touched.
func movedBy(before, after []byte) func(document.Span) (document.Span, bool) {
	most := min(len(before), len(after))
	start := 0
	for start < most && before[start] == after[start] {
		start++
	}
	end := 0
	for end < most-start && before[len(before)-1-end] == after[len(after)-1-end] {
		end++
	}
	if bytes.Equal(before, after) {
		start = len(before)
	}
	grown := len(after) - len(before)
	return func(s document.Span) (document.Span, bool) {
		switch {
		case s.End <= start:
			return s, true
		case s.Start >= len(before)-end:
			return document.Span{Start: s.Start + grown, End: s.End + grown}, true
		}
		return s, false
	}
}

// rulesAboutData lists the rules that wait for data.
func rulesAboutData(rules []lint.Rule) map[string]bool {
	all := map[string]bool{}
	for _, r := range rules {
		all[r.Name] = r.Need == lint.Data
	}
	return all
}
