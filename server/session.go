package server

import (
	"context"
	"errors"
	"log"
	"path/filepath"
	"time"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"lagwise/lint/engine"
	"lagwise/lint/request"
)

// session is one client's view of the workspace.
type session struct {
	protocol.UnimplementedServer

	base    context.Context // ends with the session
	stop    context.CancelFunc
	client  protocol.Client
	options Options
	logger  *log.Logger
	clock   clock

	able      abilities       // set by initialize, read only afterwards
	aboutData map[string]bool // rules that wait for data
	folders   folders
	workspace *engine.Workspace // made by initialize
	documents documents
	publisher *publisher
	watch     *watch
	progress  progress
}

func newSession(base context.Context, stop context.CancelFunc, client protocol.Client, o Options, logger *log.Logger, c clock) *session {
	s := &session{
		base: base, stop: stop, client: client, options: o, logger: logger, clock: c,
		aboutData: rulesAboutData(o.Engine.Options().Rules),
		documents: documents{open: map[string]*openDocument{}},
		progress:  progress{cancel: map[string]context.CancelFunc{}},
	}
	s.publisher = newPublisher(s)
	s.watch = newWatch(s)
	if o.ParentPID != 0 {
		s.followParent(o.ParentPID)
	}
	return s
}

// start runs f beside the read loop; a panic in it is logged and goes no
// further.
func (s *session) start(what string, f func()) { go s.shielded(what, f) }

func (s *session) shielded(what string, f func()) {
	defer recovered(s.logger, what)
	f()
}

// after runs f when d has passed; stop takes it back.
func (s *session) after(d time.Duration, what string, f func()) (stop func() bool) {
	return s.clock.after(d, func() {
		if s.base.Err() == nil {
			s.shielded(what, f)
		}
	})
}

// repeatedly runs f every d until the session ends.
func (s *session) repeatedly(d time.Duration, what string, f func()) {
	s.after(d, what, func() {
		defer s.repeatedly(d, what, f)
		f()
	})
}

// editionKey is where a request's context keeps its edition.
type editionKey struct{}

func (s *session) snapshot(ctx context.Context) context.Context {
	return context.WithValue(ctx, editionKey{}, s.workspace.Edition())
}

// edition returns the state of the workspace at the moment the request came.
func edition(ctx context.Context) *engine.Edition {
	return ctx.Value(editionKey{}).(*engine.Edition)
}

// followed returns the document that a request is about; false when it is
// none of ours, or one whose text is not known.
func (s *session) followed(u uri.URI) (string, bool) {
	path, ok := pathOf(u)
	if !ok || !ours(path) {
		return "", false
	}
	doc, open := s.documents.get(path)
	return path, !open || !doc.astray
}

// ours reports whether a file is a document of one of the kinds that are
// judged; clients also open others of the same language.
func ours(path string) bool { return request.DocumentKind(path) != request.NoDoc }

// logFailure logs an error, but not that work was cancelled.
func (s *session) logFailure(what string, err error) {
	if !errors.Is(err, context.Canceled) {
		s.logger.Printf("%s: %v", what, err)
	}
}

// pathOf returns the file that a URI names; false for what is not a file.
func pathOf(u uri.URI) (string, bool) {
	if !u.IsFile() {
		return "", false
	}
	path := u.FsPath()
	if path == "" {
		return "", false
	}
	return filepath.Clean(path), true
}

// clock is the time a session lives by.
type clock struct {
	after func(d time.Duration, f func()) (stop func() bool)
}

var realClock = clock{after: func(d time.Duration, f func()) func() bool { return time.AfterFunc(d, f).Stop }}
