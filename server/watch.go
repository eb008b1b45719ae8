package server

import (
	"context"
	"maps"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"sync"
	"time"

	"go.lsp.dev/protocol"

	"lagwise/lint/request"
)

// burst is how long file events are collected before anything is judged
// again: writing one file gives several.
const burst = 100 * time.Millisecond

// watch learns of changes on disk: from the client where it can watch files,
// else, and for files outside its folders, by looking (poll.go).
type watch struct {
	s *session

	mu         sync.Mutex          // guards everything below
	reached    map[string][]string // open document -> files it depends on
	registered map[string]bool     // patterns the client watches
	pending    map[string]bool     // changed files of the present burst
	polling    bool
	poll       poll
}

func newWatch(s *session) *watch {
	return &watch{s: s, reached: map[string][]string{}, registered: map[string]bool{}, pending: map[string]bool{},
		poll: poll{seen: map[string]stamp{}}}
}

// bearsOnOthers reports whether documents other than this one may be judged
// otherwise when it changes.
func bearsOnOthers(path string) bool {
	kind := request.DocumentKind(path)
	return kind == request.ManifestDoc || kind == request.ConventionsDoc
}

// reaches notes what an open document depends on; nil when it is closed.
func (w *watch) reaches(path string, files []string) {
	w.mu.Lock()
	defer w.mu.Unlock()
	if files == nil {
		delete(w.reached, path)
		return
	}
	if slices.Equal(w.reached[path], files) {
		return
	}
	w.reached[path] = slices.Clone(files)
	if w.s.able.watchFiles {
		w.register(files)
	}
	w.notice(w.unwatched())
	if !w.polling {
		w.polling = true
		w.s.repeatedly(pollEvery, "poll", w.look)
	}
}

// register has the client watch files of these names; the caller holds the
// mutex. Manifests and conventions are watched by kind, as new ones count.
func (w *watch) register(files []string) {
	patterns := []string{"**/*.series.toml", "**/*.conventions.toml"}
	for _, f := range files {
		if w.byClient(f) {
			patterns = append(patterns, "**/"+filepath.Base(f))
		}
	}
	var watchers []protocol.FileSystemWatcher
	for _, p := range patterns {
		if !w.registered[p] {
			w.registered[p] = true
			watchers = append(watchers, protocol.FileSystemWatcher{GlobPattern: protocol.Pattern(p)})
		}
	}
	if len(watchers) == 0 {
		return
	}
	raw, err := protocol.Marshal(&protocol.DidChangeWatchedFilesRegistrationOptions{Watchers: watchers})
	if err != nil {
		return
	}
	registration := protocol.Registration{ID: "files-" + strconv.Itoa(len(w.registered)), Method: protocol.MethodWorkspaceDidChangeWatchedFiles, RegisterOptions: raw}
	w.s.start("register", func() {
		err := w.s.client.RegisterCapability(w.s.base, &protocol.RegistrationParams{Registrations: []protocol.Registration{registration}})
		if err != nil {
			w.s.logFailure("watching files", err)
		}
	})
}

// byClient reports whether the client watches a file: it lies in a workspace
// folder, and its name means itself in a pattern.
func (w *watch) byClient(path string) bool {
	if !w.s.able.watchFiles || strings.ContainsAny(filepath.Base(path), "*?{}[],!\\") {
		return false
	}
	return slices.ContainsFunc(w.s.folders.list(), func(folder string) bool {
		rel, err := filepath.Rel(folder, path)
		return err == nil && filepath.IsLocal(rel)
	})
}

// DidChangeWatchedFiles is what the client saw.
func (s *session) DidChangeWatchedFiles(_ context.Context, p *protocol.DidChangeWatchedFilesParams) error {
	for _, c := range p.Changes {
		if path, ok := pathOf(c.URI); ok {
			s.watch.changed(strings.Clone(path))
		}
	}
	return nil
}

// changed takes in a change of a file, and acts once the burst is over.
func (w *watch) changed(path string) {
	w.mu.Lock()
	defer w.mu.Unlock()
	first := len(w.pending) == 0
	w.pending[path] = true
	if first {
		w.s.after(burst, "files", w.settle)
	}
}

// settle judges again what depends on the changed files.
func (w *watch) settle() {
	w.mu.Lock()
	paths := slices.Sorted(maps.Keys(w.pending))
	clear(w.pending)
	w.mu.Unlock()
	w.s.workspace.Touch(paths...)
	w.s.publisher.again(w.s.documents.paths()...)
	w.s.publisher.rest()
	w.s.publisher.refresh()
}
