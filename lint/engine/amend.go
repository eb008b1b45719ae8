package engine

import (
	"bytes"
	"context"
	"fmt"
	"slices"
	"strings"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/finding"
)

// rounds is how often an amended document is judged and amended again.
const rounds = 4

// AmendOptions narrows what is amended.
type AmendOptions struct {
	Request string // only this request
	Rule    string // only what answers this rule
	Write   bool   // replace the files
}

// Amended is what amending did.
type Amended struct{ Files []AmendedFile }

// AmendedFile is one document before and after. Before and After are equal
// where nothing was to be amended; with an Err nothing was written.
type AmendedFile struct {
	Path, File    string // absolute; relative to the root
	Before, After []byte
	Applied       []string // "request: title", in their order
	Left          []string // what still stands, or why a request was left alone
	Err           error
}

// Amend applies the preferred rewrites to the documents that are named or
// stand in the folders named. All rewrites of one document are applied
// together and the text is judged again, up to four rounds. Each file is then
// replaced once, or left as it was. The error is that of the context, or of
// paths that cannot be searched; the documents found are amended all the same.
func (w *Workspace) Amend(ctx context.Context, paths []string, o AmendOptions) (*Amended, error) {
	ed := w.Edition()
	documents, trouble := ed.FindIn(ctx, paths...)
	all := &Amended{}
	for _, path := range documents {
		f := ed.amend(ctx, path, o)
		if err := ctx.Err(); err != nil {
			return all, err
		}
		if o.Write && f.Err == nil && !bytes.Equal(f.Before, f.After) {
			f.Err = ed.replace(path, f.Before, f.After)
			w.Touch(path)
		}
		all.Files = append(all.Files, f)
	}
	return all, trouble
}

// amending is the state of one document while it is amended.
type amending struct {
	AmendedFile
	o        AmendOptions
	seen     map[string]bool     // texts of requests
	promised map[string][]string // by request: rules that its last rewrite leaves
	done     map[string]bool     // requests whose text came back
}

func (ed *Edition) amend(ctx context.Context, path string, o AmendOptions) AmendedFile {
	s := ed.snapshot(path)
	m := &amending{AmendedFile: AmendedFile{Path: s.path, File: s.file, Before: s.text, After: s.text}, o: o,
		seen: map[string]bool{}, promised: map[string][]string{}, done: map[string]bool{}}
	first, err := ed.Prove(ctx, path)
	now, j := ed, first
	for range rounds {
		if err != nil {
			break
		}
		edits := m.choose(now, j)
		if len(edits) == 0 {
			break
		}
		if now, err = m.apply(now, edits); err == nil {
			j, err = now.Prove(ctx, path)
		}
	}
	if err == nil {
		err = m.keepsPromise(first, j)
	}
	if err != nil {
		m.After, m.Applied, m.Err = m.Before, nil, fmt.Errorf("%s is left as it was: %w", m.File, err)
		return m.AmendedFile
	}
	m.leave(j)
	return m.AmendedFile
}

// choose collects the edits of the preferred rewrites, one a request.
func (m *amending) choose(ed *Edition, j *Judgement) []finding.Edit {
	var edits []finding.Edit
	took := map[string]bool{}
	for _, f := range ed.textFirst(j.Findings) {
		r := preferredOf(f)
		if r == nil || f.Deviation != nil || !m.wanted(f) || took[f.Request] && f.Request != "" || m.done[f.Request] {
			continue
		}
		if f.Request != "" && !m.fresh(ed, f.Request) {
			m.done[f.Request] = true
			m.Left = append(m.Left, fmt.Sprintf("%s: the rewrites lead back to a text that stood here before, so it is left as it is now", f.Request))
			continue
		}
		if slices.ContainsFunc(r.Edits, func(e finding.Edit) bool { return e.File != m.File }) {
			continue // one document is amended at a time
		}
		if !apart(edits, r.Edits) {
			continue // the next round takes it
		}
		took[f.Request] = true
		edits = append(edits, r.Edits...)
		m.promised[f.Request] = append(slices.Clip(m.promised[f.Request]), r.Leaves...)
		m.Applied = append(m.Applied, strings.TrimPrefix(f.Request+": "+r.Title, ": "))
	}
	return edits
}

// textFirst puts the findings about the text before those about the data: a
// key that is mended may change what the request asks.
func (ed *Edition) textFirst(all []finding.Finding) []finding.Finding {
	all = slices.Clone(all)
	slices.SortStableFunc(all, func(a, b finding.Finding) int { return ed.aboutData(a) - ed.aboutData(b) })
	return all
}

func (ed *Edition) aboutData(f finding.Finding) int {
	if rule := ed.engine.byName[f.Rule]; rule != nil && rule.Need == lint.Data {
		return 1
	}
	return 0
}

func (m *amending) wanted(f finding.Finding) bool {
	return (m.o.Request == "" || m.o.Request == f.Request) && (m.o.Rule == "" || m.o.Rule == f.Rule)
}

func preferredOf(f finding.Finding) *finding.Rewrite {
	for i := range f.Rewrites {
		if f.Rewrites[i].Preferred && !f.Rewrites[i].Question {
			return &f.Rewrites[i]
		}
	}
	return nil
}

// fresh reports whether the text of a request is seen for the first time, and
// remembers it.
func (m *amending) fresh(ed *Edition, name string) bool {
	for _, asked := range ed.Requests(m.Path) {
		if asked.Name == name {
			text := name + "\x00" + string(m.After[asked.At.Start:asked.At.End])
			seen := m.seen[text]
			m.seen[text] = true
			return !seen
		}
	}
	return true
}

// apart reports whether no edit touches one that was chosen before.
func apart(chosen, more []finding.Edit) bool {
	for _, a := range chosen {
		for _, b := range more {
			if a.At.Start <= b.At.End && b.At.Start <= a.At.End {
				return false
			}
		}
	}
	return true
}

// apply makes the edition in which the edits are done.
func (m *amending) apply(ed *Edition, edits []finding.Edit) (*Edition, error) {
	var own []document.Edit
	for _, e := range edits {
		own = append(own, document.Edit{At: e.At, Text: e.Text})
	}
	slices.SortStableFunc(own, func(a, b document.Edit) int { return a.At.Start - b.At.Start })
	after, err := document.Apply(m.After, own)
	if err != nil {
		return nil, err
	}
	next := ed.with(m.Path, after)
	if ed.Tree(m.Path).Valid() && !next.Tree(m.Path).Valid() {
		return nil, fmt.Errorf("the amended text would not parse: %s", next.Tree(m.Path).Problems[0].Message)
	}
	m.After = after
	return next, nil
}

// keepsPromise checks that the amended document has no finding at warning or
// above that it did not have and that no rewrite announced.
func (m *amending) keepsPromise(before, after *Judgement) error {
	type voice struct{ request, rule string }
	had := map[voice]bool{}
	for _, f := range before.Findings {
		had[voice{f.Request, f.Rule}] = true
	}
	for _, f := range after.Findings {
		promised, amended := m.promised[f.Request]
		if !f.Severity.AtLeast(finding.Warning) || f.Deviation != nil || had[voice{f.Request, f.Rule}] {
			continue
		}
		if !amended || !slices.Contains(promised, f.Rule) {
			return fmt.Errorf("the amended text would bring on %s, which no rewrite announced: %s", f.Rule, f.Message)
		}
	}
	return nil
}

// leave lists what still stands at warning or above.
func (m *amending) leave(j *Judgement) {
	for _, f := range j.Findings {
		if f.Severity.AtLeast(finding.Warning) && f.Deviation == nil && m.wanted(f) {
			m.Left = append(m.Left, strings.TrimPrefix(f.Request+": "+f.Rule, ": "))
		}
	}
}
