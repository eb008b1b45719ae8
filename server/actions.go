package server

import (
	"context"
	"encoding/json"
	"fmt"
	"path/filepath"
	"slices"
	"strings"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"lagwise/lint/document"
	"lagwise/lint/engine"
	"lagwise/lint/finding"
)

// fixAll applies every preferred rewrite of a document.
const fixAll protocol.CodeActionKind = "source.fixAll.lagwise"

// CodeAction offers the rewrites that answer the findings in a range, and,
// when it is asked for, all preferred rewrites of the document at once.
func (s *session) CodeAction(ctx context.Context, p *protocol.CodeActionParams) ([]protocol.CommandOrCodeAction, error) {
	path, ok := s.followed(p.TextDocument.URI)
	if !ok {
		return nil, nil
	}
	ed := edition(ctx)
	var all []protocol.CommandOrCodeAction
	if len(p.Context.Only) == 0 || wanted(p.Context.Only, protocol.CodeActionKindQuickFix) {
		quick, err := working(ctx, s, p.WorkDoneToken, "Proving rewrites", func(ctx context.Context) ([]protocol.CommandOrCodeAction, error) {
			return s.quickFixes(ctx, ed, path, p.Range)
		})
		if err != nil {
			return nil, err
		}
		all = quick
	}
	if !wanted(p.Context.Only, fixAll) {
		return all, nil
	}
	one, err := s.fixEverything(ctx, ed, path, p.WorkDoneToken)
	if err != nil || one == nil {
		return all, err
	}
	return append(all, one), nil
}

// wanted reports whether a kind, or one that it belongs to, is asked for.
func wanted(only []protocol.CodeActionKind, kind protocol.CodeActionKind) bool {
	return slices.ContainsFunc(only, func(k protocol.CodeActionKind) bool {
		return k == kind || k == "" || strings.HasPrefix(string(kind), string(k)+".")
	})
}

// quickFixes makes one action of each rewrite of the findings that the range
// touches; a rewrite that answers several findings is offered once.
func (s *session) quickFixes(ctx context.Context, ed *engine.Edition, path string, r protocol.Range) ([]protocol.CommandOrCodeAction, error) {
	text, err := ed.Text(path)
	if err != nil {
		return nil, nil
	}
	judged, err := ed.Judge(ctx, path)
	if err != nil {
		return nil, err
	}
	at := s.places(text)
	asked := at.span(r)
	var order []string // identities of rewrites
	made := map[string]*protocol.CodeAction{}
	proven := map[string][]finding.Rewrite{}
	for i := range judged.Findings {
		f := &judged.Findings[i]
		if f.At.End < asked.Start || asked.End < f.At.Start {
			continue
		}
		rewrites, err := s.rewrites(ctx, ed, path, f, proven)
		if err != nil {
			return nil, err
		}
		for _, rw := range rewrites {
			id := identity(rw)
			if made[id] == nil {
				order = append(order, id)
				made[id] = s.quickFix(ed, judged.Root, rw)
			}
			if !slices.Contains(rw.Leaves, f.Rule) {
				made[id].Diagnostics = append(made[id].Diagnostics, s.diagnostic(ed, judged, f, at))
			}
		}
	}
	var all []protocol.CommandOrCodeAction
	for _, id := range order {
		all = append(all, made[id])
	}
	return all, nil
}

// rewrites returns those of a finding: its own, or those that its request
// has, proven once for all findings of that request.
func (s *session) rewrites(ctx context.Context, ed *engine.Edition, path string, f *finding.Finding, proven map[string][]finding.Rewrite) ([]finding.Rewrite, error) {
	if f.Deviation != nil || f.Request == "" || len(f.Rewrites) > 0 {
		return f.Rewrites, nil
	}
	if known, ok := proven[f.Request]; ok {
		return known, nil
	}
	for _, a := range ed.Requests(path) {
		if a.Name == f.Request && a.At.Contains(f.At.Start) {
			all, err := ed.ProveRequest(ctx, path, a.Index)
			proven[f.Request] = all
			return all, err
		}
	}
	return nil, nil
}

func (s *session) quickFix(ed *engine.Edition, root string, rw finding.Rewrite) *protocol.CodeAction {
	kind := protocol.CodeActionKindQuickFix
	return &protocol.CodeAction{Title: rw.Title, Kind: &kind, IsPreferred: &rw.Preferred, Edit: s.workspaceEdit(ed, root, rw.Edits)}
}

// everything is what an unresolved fixAll action carries.
type everything struct {
	Path    string `json:"path"`
	Version int32  `json:"version"`
}

// fixEverything makes the action that applies all preferred rewrites. Its
// proofs take time, so a client that can asks for the edit later.
func (s *session) fixEverything(ctx context.Context, ed *engine.Edition, path string, token protocol.ProgressToken) (*protocol.CodeAction, error) {
	kind := fixAll
	action := &protocol.CodeAction{Title: "Apply every preferred rewrite of this document", Kind: &kind}
	if s.able.resolveEdit {
		version, _ := ed.Version(path)
		var err error
		action.Data, err = json.Marshal(everything{path, version})
		return action, err
	}
	edit, err := s.preferred(ctx, ed, path, token)
	if err != nil || edit == nil {
		return nil, err
	}
	action.Edit = edit
	return action, nil
}

// CodeActionResolve fills in the edit of a fixAll action, for the version
// that it was offered for.
func (s *session) CodeActionResolve(ctx context.Context, action *protocol.CodeAction) (*protocol.CodeAction, error) {
	var asked everything
	if len(action.Data) == 0 || protocol.Unmarshal(action.Data, &asked) != nil || asked.Path == "" {
		return action, nil
	}
	ed := edition(ctx)
	if version, open := ed.Version(asked.Path); open && version != asked.Version {
		return nil, protocol.ErrContentModified
	}
	edit, err := s.preferred(ctx, ed, asked.Path, nil)
	if err != nil {
		return nil, err
	}
	action.Edit = edit
	return action, nil
}

// preferred joins the preferred rewrites of a document into one edit; nil
// when there is none. What is under a deviation stays as it is.
func (s *session) preferred(ctx context.Context, ed *engine.Edition, path string, token protocol.ProgressToken) (*protocol.WorkspaceEdit, error) {
	proved, err := working(ctx, s, token, "Proving rewrites", func(ctx context.Context) (*engine.Judgement, error) {
		return ed.Prove(ctx, path)
	})
	if err != nil {
		return nil, err
	}
	var edits []finding.Edit
	taken := map[string]bool{}
	for _, f := range proved.Findings {
		if f.Deviation != nil {
			continue
		}
		for _, rw := range f.Rewrites {
			id := identity(rw)
			if !rw.Preferred || taken[id] || overlap(edits, rw.Edits) {
				continue
			}
			taken[id] = true
			edits = append(edits, rw.Edits...)
		}
	}
	if len(edits) == 0 {
		return nil, nil
	}
	return s.workspaceEdit(ed, proved.Root, edits), nil
}

// identity tells one rewrite from another: several findings list the same.
func identity(rw finding.Rewrite) string { return fmt.Sprint(rw.Title, rw.Edits) }

// overlap reports whether two lists of edits touch the same text, so that a
// client would refuse them together.
func overlap(a, b []finding.Edit) bool {
	for _, x := range a {
		for _, y := range b {
			if x.File == y.File && x.At.Start < y.At.End && y.At.Start < x.At.End {
				return true
			}
		}
	}
	return false
}

// workspaceEdit converts edits, file by file in the order of their first
// edit; the version that they were made for goes with them where the client
// can take it.
func (s *session) workspaceEdit(ed *engine.Edition, root string, edits []finding.Edit) *protocol.WorkspaceEdit {
	var files []string
	byFile := map[string][]finding.Edit{}
	for _, e := range edits {
		if byFile[e.File] == nil {
			files = append(files, e.File)
		}
		byFile[e.File] = append(byFile[e.File], e)
	}
	var out protocol.WorkspaceEdit
	for _, file := range files {
		path := filepath.Join(root, filepath.FromSlash(file))
		text, err := ed.Text(path)
		if err != nil {
			continue
		}
		s.addEdits(&out, ed, path, s.places(text), byFile[file])
	}
	return &out
}

func (s *session) addEdits(out *protocol.WorkspaceEdit, ed *engine.Edition, path string, at places, edits []finding.Edit) {
	u := s.uriOf(path)
	slices.SortStableFunc(edits, func(a, b finding.Edit) int { return compareSpans(a.At, b.At) })
	if !s.able.documentChanges {
		if out.Changes == nil {
			out.Changes = map[uri.URI][]protocol.TextEdit{}
		}
		for _, e := range edits {
			out.Changes[u] = append(out.Changes[u], protocol.TextEdit{Range: at.rangeOf(e.At), NewText: e.Text})
		}
		return
	}
	change := &protocol.TextDocumentEdit{TextDocument: protocol.OptionalVersionedTextDocumentIdentifier{TextDocumentIdentifier: protocol.TextDocumentIdentifier{URI: u}}}
	if version, open := ed.Version(path); open {
		change.TextDocument.Version = &version
	}
	for _, e := range edits {
		change.Edits = append(change.Edits, &protocol.TextEdit{Range: at.rangeOf(e.At), NewText: e.Text})
	}
	out.DocumentChanges = append(out.DocumentChanges, change)
}

func compareSpans(a, b document.Span) int {
	if a.Start != b.Start {
		return a.Start - b.Start
	}
	return a.End - b.End
}
