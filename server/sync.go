package server

import (
	"context"
	"errors"
	"fmt"
	"math"
	"path/filepath"
	"slices"
	"strings"
	"sync"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"lagwise/lint/engine"
)

// documents is what the client has open.
type documents struct {
	mu   sync.Mutex
	open map[string]*openDocument // by path
}

// openDocument is one text as the client has it.
type openDocument struct {
	uri     uri.URI // as the client writes it
	text    []byte  // never changed in place
	version int32
	// astray: an edit could not be followed; the text is not the client's
	// until it sends all of it.
	astray bool

	present  context.Context    // of this version; ends with the next
	outdated context.CancelFunc // ends it
}

// errEdited is why work on an earlier version ended.
var errEdited = errors.New("the document was edited")

// renew begins a version: work on the one before it ends.
func (s *session) renew(doc *openDocument) {
	if doc.outdated != nil {
		doc.outdated()
	}
	doc.present, doc.outdated = context.WithCancel(s.base)
}

// whilePresent runs f for the text that the edition has of a document, and
// gives errEdited instead once the client has another.
func whilePresent[T any](ctx context.Context, s *session, ed *engine.Edition, path string, f func(context.Context) (T, error)) (T, error) {
	doc, open := s.documents.get(path)
	if !open {
		return f(ctx)
	}
	var none T
	if version, _ := ed.Version(path); version != doc.version {
		return none, errEdited
	}
	ctx, cancel := context.WithCancel(ctx)
	defer cancel()
	defer context.AfterFunc(doc.present, cancel)()
	answer, err := f(ctx)
	if doc.present.Err() != nil {
		return none, errEdited
	}
	return answer, err
}

// get returns a copy of what is known of an open document.
func (d *documents) get(path string) (openDocument, bool) {
	d.mu.Lock()
	defer d.mu.Unlock()
	doc, ok := d.open[path]
	if !ok {
		return openDocument{}, false
	}
	return *doc, true
}

func (d *documents) put(path string, doc openDocument) {
	d.mu.Lock()
	defer d.mu.Unlock()
	d.open[path] = &doc
}

func (d *documents) remove(path string) {
	d.mu.Lock()
	defer d.mu.Unlock()
	delete(d.open, path)
}

// paths lists the open documents, sorted.
func (d *documents) paths() []string {
	d.mu.Lock()
	defer d.mu.Unlock()
	var paths []string
	for path := range d.open {
		paths = append(paths, path)
	}
	slices.Sort(paths)
	return paths
}

// uriOf names a file to the client: as the client itself does when it has the
// file open.
func (s *session) uriOf(path string) uri.URI {
	if doc, ok := s.documents.get(path); ok {
		return doc.uri
	}
	return uri.File(path)
}

// open takes in a document that the client opens.
func (s *session) open(params []byte) error {
	var p struct {
		TextDocument struct {
			URI     string          `json:"uri"`
			Version protocol.LSPAny `json:"version"`
			Text    *string         `json:"text"`
		} `json:"textDocument"`
	}
	if err := protocol.Unmarshal(params, &p); err != nil {
		return err
	}
	d := p.TextDocument
	if d.Text == nil {
		return errors.New("a document without a text")
	}
	path, ok := parsedPath(d.URI)
	if !ok || !ours(path) {
		return nil
	}
	doc := openDocument{uri: uri.URI(d.URI), text: []byte(*d.Text), version: versionOf(d.Version, 0)}
	s.renew(&doc)
	s.documents.put(path, doc)
	s.workspace.Open(path, doc.text, doc.version)
	s.publisher.edited(path)
	return nil
}

// change takes in the edits of a document. They are applied all or none: when
// one cannot be read, the text is out of step, and edits are passed over until
// one of them brings the whole text.
func (s *session) change(params []byte) error {
	var p struct {
		TextDocument struct {
			URI     string          `json:"uri"`
			Version protocol.LSPAny `json:"version"`
		} `json:"textDocument"`
		ContentChanges protocol.LSPAny `json:"contentChanges"`
	}
	if err := protocol.Unmarshal(params, &p); err != nil {
		return err
	}
	path, ok := parsedPath(p.TextDocument.URI)
	if !ok || !ours(path) {
		return nil
	}
	doc, ok := s.documents.get(path)
	if !ok {
		return fmt.Errorf("a change of %s, which is not open", p.TextDocument.URI)
	}
	edits, err := editsOf(p.ContentChanges)
	if err == nil {
		doc.text, doc.astray, err = s.apply(doc.text, doc.astray, edits)
	}
	if err != nil {
		s.lose(path, doc)
		return err
	}
	doc.version = versionOf(p.TextDocument.Version, doc.version)
	s.renew(&doc)
	s.documents.put(path, doc)
	if doc.astray {
		return nil
	}
	s.workspace.Change(path, doc.text, doc.version)
	s.publisher.edited(path)
	return nil
}

// lose marks a document as out of step and says so, once until it is back.
func (s *session) lose(path string, doc openDocument) {
	if doc.astray {
		return
	}
	doc.astray = true
	s.documents.put(path, doc)
	s.start("showMessage", func() {
		s.client.ShowMessage(s.base, &protocol.ShowMessageParams{Type: protocol.MessageTypeWarning,
			Message: "An edit of " + filepath.Base(path) + " could not be followed, so its findings are no longer kept up to date. Close and reopen the document."})
	})
}

// edit is one change as the wire has it.
type edit struct {
	Range protocol.LSPAny `json:"range"` // absent: the whole text
	Text  *string         `json:"text"`
}

func editsOf(raw protocol.LSPAny) ([]edit, error) {
	if len(raw) == 0 || raw[0] != '[' {
		return nil, errors.New("contentChanges is not a list")
	}
	var edits []edit
	if err := protocol.Unmarshal(raw, &edits); err != nil {
		return nil, err
	}
	for _, e := range edits {
		if e.Text == nil {
			return nil, errors.New("a change without a text")
		}
	}
	return edits, nil
}

// apply returns the text after the edits, and whether it is still out of step.
func (s *session) apply(text []byte, astray bool, edits []edit) ([]byte, bool, error) {
	for _, e := range edits {
		if len(e.Range) == 0 {
			text, astray = []byte(*e.Text), false
			continue
		}
		r, err := rangeOf(e.Range)
		if err != nil {
			return text, astray, err
		}
		if astray {
			continue
		}
		at := s.places(text).span(r)
		if at.Start > at.End {
			return text, astray, fmt.Errorf("a range that ends before it starts: %s", e.Range)
		}
		next := make([]byte, 0, len(text)-(at.End-at.Start)+len(*e.Text))
		text = append(append(append(next, text[:at.Start]...), *e.Text...), text[at.End:]...)
	}
	return text, astray, nil
}

// rangeOf reads a range strictly: the typed decoder takes a broken one for
// the start of the text, or for a change of all of it.
func rangeOf(raw protocol.LSPAny) (protocol.Range, error) {
	type place struct {
		Line      *float64 `json:"line"`
		Character *float64 `json:"character"`
	}
	var r struct {
		Start place `json:"start"`
		End   place `json:"end"`
	}
	if err := protocol.Unmarshal(raw, &r); err != nil {
		return protocol.Range{}, err
	}
	var whole [4]uint32
	for i, v := range []*float64{r.Start.Line, r.Start.Character, r.End.Line, r.End.Character} {
		if v == nil || *v < 0 || *v > math.MaxInt32 || *v != math.Trunc(*v) {
			return protocol.Range{}, fmt.Errorf("not a range: %s", raw)
		}
		whole[i] = uint32(*v)
	}
	return protocol.Range{Start: protocol.Position{Line: whole[0], Character: whole[1]},
		End: protocol.Position{Line: whole[2], Character: whole[3]}}, nil
}

// versionOf reads a version; before stands in for one that is no number of
// the protocol's range.
func versionOf(raw protocol.LSPAny, before int32) int32 {
	var v float64
	if len(raw) == 0 || raw[0] == 'n' || protocol.Unmarshal(raw, &v) != nil {
		return before
	}
	if v != math.Trunc(v) || math.Abs(v) > math.MaxInt32 {
		return before
	}
	return int32(v)
}

// parsedPath returns the file that a URI on the wire names.
func parsedPath(raw string) (string, bool) {
	u, err := uri.Parse(raw)
	if err != nil {
		return "", false
	}
	path, ok := pathOf(u)
	return strings.Clone(path), ok
}

// DidSave is when the file on disk becomes what the editor has.
func (s *session) DidSave(_ context.Context, p *protocol.DidSaveTextDocumentParams) error {
	if path, ok := pathOf(p.TextDocument.URI); ok {
		s.watch.changed(strings.Clone(path))
	}
	return nil
}

// DidClose gives the document back to the file on disk.
func (s *session) DidClose(_ context.Context, p *protocol.DidCloseTextDocumentParams) error {
	path, ok := pathOf(p.TextDocument.URI)
	if !ok {
		return nil
	}
	doc, ok := s.documents.get(path)
	if !ok {
		return nil
	}
	doc.outdated()
	s.documents.remove(path)
	s.workspace.Close(path)
	s.publisher.closed(path, doc.uri)
	return nil
}
