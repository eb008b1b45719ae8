package server

import (
	"bytes"
	"encoding/json"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/finding"
)

// slip is a rule about text with a rewrite of its own, as misspelt words have.
var slip = lint.Rule{Name: "slip", Severity: finding.Warning, Scope: lint.OfDocument, Need: lint.Text, Run: func(q *lint.Inquiry) {
	for from := 0; ; {
		i := bytes.Index(q.Tree.Text[from:], []byte("shroe"))
		if i < 0 {
			return
		}
		at := document.Span{Start: from + i, End: from + i + 5}
		from = at.End
		q.Report(finding.Finding{At: at, Message: "A slip.", Rewrites: []finding.Rewrite{
			{Title: "Write shore", Preferred: true, Edits: []finding.Edit{{File: q.File, At: at, Text: "shore"}}}}})
	}
}}

type action struct {
	Title       string
	Kind        string
	IsPreferred bool
	Diagnostics []diagnostic
	Edit        *struct {
		Changes         map[string][]textEdit
		DocumentChanges []struct {
			TextDocument struct {
				URI     string
				Version *int
			}
			Edits []textEdit
		}
	}
	Data json.RawMessage
}

type textEdit struct {
	Range   struct{ Start, End struct{ Line, Character int } }
	NewText string
}

// able are the capabilities of a client with every kind of action.
func able(resolve, versioned bool) object {
	act := object{"codeActionLiteralSupport": object{"codeActionKind": object{"valueSet": []string{"quickfix", "source"}}}}
	if resolve {
		act["dataSupport"], act["resolveSupport"] = true, object{"properties": []string{"edit"}}
	}
	return object{"textDocument": object{"codeAction": act},
		"workspace": object{"workspaceEdit": object{"documentChanges": versioned}}}
}

func (c *client) actions(path string, line int, only ...string) []action {
	c.t.Helper()
	var all []action
	about := object{"diagnostics": []int{}}
	if only != nil {
		about["only"] = only
	}
	c.call("textDocument/codeAction", object{"textDocument": textDocument(path), "context": about,
		"range": object{"start": position(line, 0), "end": position(line, 99)}}, &all)
	return all
}

// applied is a text after edits of ASCII lines, done by hand.
func applied(t *testing.T, text string, edits []textEdit) string {
	t.Helper()
	offset := func(at struct{ Line, Character int }) int {
		lines := strings.SplitAfter(text, "\n")
		return len(strings.Join(lines[:at.Line], "")) + at.Character
	}
	edits = slices.Clone(edits)
	slices.SortFunc(edits, func(a, b textEdit) int { return offset(b.Range.Start) - offset(a.Range.Start) })
	for _, e := range edits {
		text = text[:offset(e.Range.Start)] + e.NewText + text[offset(e.Range.End):]
	}
	return text
}

// kept reports whether every line of before still stands in after.
func kept(before, after string) bool {
	for line := range strings.Lines(before) {
		if !strings.Contains(after, line) {
			return false
		}
	}
	return true
}

func TestThePreferredRewriteAnswersItsFinding(t *testing.T) {
	c := serving(t, realClock, levels)
	path := filepath.Join(c.begin(able(false, true), shore()), "shore.analysis.toml")
	c.open(path, 7, shoreAnalysis)
	c.findings(path, func(p published) bool { return p.says("levels") != "" })
	all := c.actions(path, 5)
	i := slices.IndexFunc(all, func(a action) bool { return a.IsPreferred })
	if i < 0 {
		t.Fatalf("no preferred action among %d\nlog: %s", len(all), c.log)
	}
	best := all[i]
	if best.Kind != "quickfix" || len(best.Diagnostics) != 1 || best.Diagnostics[0].Code != "levels" {
		t.Errorf("%+v", best)
	}
	for k, a := range all {
		if a.IsPreferred && k != i || a.Edit == nil {
			t.Errorf("action %d: preferred %v, edit %v; the one preferred is %d", k, a.IsPreferred, a.Edit, i)
		}
	}
	change := best.Edit.DocumentChanges[0]
	if change.TextDocument.URI != fileURI(path) || change.TextDocument.Version == nil || *change.TextDocument.Version != 7 {
		t.Errorf("the edit is for %+v, want version 7", change.TextDocument)
	}
	after := applied(t, shoreAnalysis, change.Edits)
	if !kept(shoreAnalysis, after) || !strings.Contains(after, "\non = ") {
		t.Errorf("after the rewrite:\n%s", after)
	}
	c.edit(path, 8, object{"text": after})
	c.findings(path, func(p published) bool { return *p.Version == 8 && p.says("levels") == "" })
	if far := c.actions(path, 0); len(far) != 0 {
		t.Errorf("actions where nothing is found: %+v", far)
	}
}

func TestAClientWithoutVersionedEdits(t *testing.T) {
	c := serving(t, realClock, slip)
	path := filepath.Join(c.begin(able(false, false), nil), "a.analysis.toml")
	c.open(path, 1, "title = \"shroe\"\n")
	all := c.actions(path, 0)
	if len(all) != 1 || all[0].Title != "Write shore" || all[0].Edit.DocumentChanges != nil {
		t.Fatalf("%+v", all)
	}
	if got := applied(t, "title = \"shroe\"\n", all[0].Edit.Changes[fileURI(path)]); got != "title = \"shore\"\n" {
		t.Errorf("after the edit: %q", got)
	}
}

func TestOnlyTheKindsAskedFor(t *testing.T) {
	c := serving(t, realClock, slip)
	path := filepath.Join(c.begin(able(false, true), nil), "a.analysis.toml")
	c.open(path, 1, "title = \"shroe\"\n")
	for _, asked := range []struct {
		only []string
		want string
	}{
		{nil, "quickfix"},
		{[]string{"quickfix"}, "quickfix"},
		{[]string{"refactor"}, ""},
		{[]string{"source"}, "source.fixAll.lagwise"},
		{[]string{"source.fixAll"}, "source.fixAll.lagwise"},
		{[]string{"source.fixAll.lagwise"}, "source.fixAll.lagwise"},
		{[]string{"source.fix"}, ""},
		{[]string{"source.organizeImports"}, ""},
		{[]string{"source.fixAll", "quickfix"}, "quickfix source.fixAll.lagwise"},
	} {
		var kinds []string
		for _, a := range c.actions(path, 0, asked.only...) {
			kinds = append(kinds, a.Kind)
		}
		if got := strings.Join(kinds, " "); got != asked.want {
			t.Errorf("only %v: %q, want %q", asked.only, got, asked.want)
		}
	}
}

// Every preferred rewrite of the document at once: with the edit for a client
// that wants it now, without for one that asks for it later.
func TestFixEverything(t *testing.T) {
	text := strings.Replace(shoreAnalysis, "The shore", "The shroe and the shroe", 1) + strings.Replace(shoreAnalysis[strings.Index(shoreAnalysis, "\n[["):], "eelgrass-boats", "again", 1)
	for _, resolve := range []bool{false, true} {
		c := serving(t, realClock, levels, slip)
		path := filepath.Join(c.begin(able(resolve, true), shore()), "shore.analysis.toml")
		c.open(path, 3, text)
		all := c.actions(path, 0, "source.fixAll")
		if len(all) != 1 || (all[0].Edit == nil) != resolve {
			t.Fatalf("resolve %v: %+v", resolve, all)
		}
		fix := all[0]
		if resolve {
			c.call("codeAction/resolve", object{"title": fix.Title, "kind": fix.Kind, "data": fix.Data}, &fix)
		}
		after := applied(t, text, fix.Edit.DocumentChanges[0].Edits)
		if strings.Count(after, "\non = ") != 2 || !strings.Contains(after, "The shore and the shore") {
			t.Errorf("resolve %v, after:\n%s", resolve, after)
		}
		c.edit(path, 4, object{"text": after})
		if resolve {
			if got := c.code("codeAction/resolve", object{"title": fix.Title, "data": all[0].Data}); got != -32801 {
				t.Errorf("an action for an earlier version: %d, want -32801", got)
			}
		}
		if again := c.actions(path, 0, "source.fixAll"); !resolve && len(again) != 0 {
			t.Errorf("something is left to fix: %+v", again)
		}
	}
}
