package engine

import (
	"fmt"
	"path/filepath"
	"slices"
	"strings"

	"lagwise/lint/document"
	"lagwise/lint/evidence"
	"lagwise/lint/request"
)

// conventionsProblems is what binding a conventions file to its surroundings
// finds: what it builds on, its neighbours, the catalogue, and what is final
// further up.
func (ed *Edition) conventionsProblems(s *snapshot) []request.Problem {
	c := s.conventions().Conventions
	problems := ed.baseProblems(s, c)
	problems = append(problems, ed.neighbourProblems(s)...)
	problems = append(problems, ed.unknownRules(c)...)
	problems = append(problems, ed.finalProblems(s, c)...)
	_, unfit := evidence.SettingsOf(c)
	return append(problems, unfit...)
}

func (ed *Edition) baseProblems(s *snapshot, c *request.Conventions) []request.Problem {
	var problems []request.Problem
	for i, written := range c.BuildsOn {
		at := document.Span{}
		if i < len(c.Places) {
			at = c.Places[i]
		}
		path, err := ed.resolve(s, written)
		if err != nil || !ed.exists(path) {
			problems = append(problems, request.Problem{Rule: "missing-conventions", At: at,
				Message: missing("conventions", written, s.file, err)})
			continue
		}
		if way := ed.wayBack(path, s.path, nil); way != nil {
			problems = append(problems, request.Problem{Rule: "circular-conventions", At: at,
				Message: fmt.Sprintf("These conventions build on themselves: %s. Take one of the links out.", ed.chainText(append([]string{s.path}, way...)))})
		}
	}
	return problems
}

// missing words that a document named by another is not to be had.
func missing(what, written, from string, err error) string {
	if err != nil {
		return fmt.Sprintf("The %s %q cannot be taken: %s", what, written, sentence(err.Error()))
	}
	return fmt.Sprintf("There are no %s at %q, seen from the folder of %s. Correct the path, or write the file.", what, written, from)
}

func sentence(text string) string {
	if strings.HasSuffix(text, ".") {
		return text
	}
	return text + "."
}

// wayBack returns the files from one conventions file to another along
// builds-on, both included; nil when there is no way.
func (ed *Edition) wayBack(from, to string, seen []string) []string {
	if from == to {
		return []string{from}
	}
	if slices.Contains(seen, from) {
		return nil
	}
	seen = append(slices.Clip(seen), from)
	s := ed.snapshot(from)
	for _, written := range s.conventions().BuildsOn {
		path, err := ed.resolve(s, written)
		if err != nil {
			continue
		}
		if way := ed.wayBack(path, to, seen); way != nil {
			return append([]string{from}, way...)
		}
	}
	return nil
}

func (ed *Edition) chainText(paths []string) string {
	var names []string
	for _, p := range paths {
		names = append(names, ed.snapshot(p).file)
	}
	return strings.Join(names, " -> ")
}

func (ed *Edition) neighbourProblems(s *snapshot) []request.Problem {
	files := ed.documentsIn(filepath.Dir(s.path), request.ConventionsDoc)
	if len(files) < 2 {
		return nil
	}
	var names []string
	for _, f := range files {
		names = append(names, filepath.Base(f))
	}
	return []request.Problem{{Rule: "repeated-name", Message: fmt.Sprintf(
		"Several conventions stand in this folder (%s), and only %s is taken. Keep one, and let it build on the others.",
		strings.Join(names, ", "), names[0])}}
}

func (ed *Edition) unknownRules(c *request.Conventions) []request.Problem {
	var problems []request.Problem
	for rule := range c.Weight {
		if ed.engine.byName[rule] == nil {
			problems = append(problems, ed.engine.unknownRule(rule, c.Keys["weight."+rule].Key, false))
		}
	}
	slices.SortFunc(problems, func(a, b request.Problem) int { return a.At.Start - b.At.Start })
	return problems
}

// finalProblems tells what the file sets although conventions above it call
// it final.
func (ed *Edition) finalProblems(s *snapshot, c *request.Conventions) []request.Problem {
	steps := ed.chain(filepath.Dir(s.path))
	own := slices.IndexFunc(steps, func(st step) bool { return st.file.path == s.path })
	if own < 0 {
		return nil
	}
	_, problems := request.MergeFinal(ed.layOver(steps[:own]).merged, c)
	return problems
}
