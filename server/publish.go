package server

import (
	"bytes"
	"context"
	"maps"
	"slices"
	"sync"
	"time"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"lagwise/lint/engine"
)

// quiet is how long the keys must rest before rewrites are proven in the
// background.
const quiet = 300 * time.Millisecond

// publisher keeps the findings of the open documents fresh. What is known of
// a new version goes out at once; judging the rest runs beside, and is
// cancelled by a newer version; the answer goes out when it is there. All of
// it is sent by one goroutine, in order.
type publisher struct {
	s    *session
	wake chan struct{}

	mu        sync.Mutex      // guards everything below
	dirty     map[string]bool // whether to judge although all is remembered
	judged    []judged
	gone      map[string]uri.URI
	unproved  func() bool // stops the timer of the proofs
	stopProof context.CancelFunc

	// Of the sending goroutine alone.
	running map[string]*run
	sent    map[string]shown
}

// judged is what the rules said of one document.
type judged struct {
	path  string
	run   *run
	ed    *engine.Edition
	found *engine.Judgement
}

// run is the judging of one version of one document.
type run struct{ cancel context.CancelFunc }

func newPublisher(s *session) *publisher {
	p := &publisher{s: s, wake: make(chan struct{}, 1), dirty: map[string]bool{}, gone: map[string]uri.URI{},
		running: map[string]*run{}, sent: map[string]shown{}}
	s.start("publish", p.loop)
	return p
}

// edited says that a document was opened or changed by a person. A manifest
// or conventions may bear on any other document.
func (p *publisher) edited(path string) {
	if bearsOnOthers(path) {
		p.again(p.s.documents.paths()...)
	} else {
		p.mark(false, path)
	}
	p.rest()
}

// again has documents judged again although their texts may be as they were.
func (p *publisher) again(paths ...string) { p.mark(true, paths...) }

func (p *publisher) mark(judge bool, paths ...string) {
	p.mu.Lock()
	for _, path := range paths {
		p.dirty[path] = p.dirty[path] || judge
	}
	p.mu.Unlock()
	p.signal()
}

// closed takes a document's findings back; what it leaves on disk bears on
// the others.
func (p *publisher) closed(path string, u uri.URI) {
	p.mu.Lock()
	delete(p.dirty, path)
	p.gone[path] = u
	p.mu.Unlock()
	if bearsOnOthers(path) {
		p.again(p.s.documents.paths()...)
	}
	p.signal()
}

func (p *publisher) signal() {
	select {
	case p.wake <- struct{}{}:
	default:
	}
}

// loop sends until the session ends.
func (p *publisher) loop() {
	for {
		select {
		case <-p.s.base.Done():
			return
		case <-p.wake:
		}
		p.mu.Lock()
		dirty, results, gone := p.dirty, p.judged, p.gone
		p.dirty, p.judged, p.gone = map[string]bool{}, nil, map[string]uri.URI{}
		p.mu.Unlock()
		for path, u := range gone {
			p.forget(path, u)
		}
		for _, j := range results {
			p.finish(j)
		}
		for _, path := range slices.Sorted(maps.Keys(dirty)) {
			p.begin(path, dirty[path])
		}
	}
}

// begin tells what is known of the present version, and has the rest judged,
// or all of it.
func (p *publisher) begin(path string, all bool) {
	if old := p.running[path]; old != nil {
		old.cancel()
		delete(p.running, path)
	}
	doc, open := p.s.documents.get(path)
	if !open || doc.astray {
		return
	}
	ed := p.s.workspace.Edition()
	if p.s.able.pull {
		p.s.watch.reaches(path, ed.Reaches(path))
		return
	}
	known := ed.Known(path)
	p.send(ed, p.s.carried(ed, known, p.sent[path]))
	if known.Complete && !all {
		p.s.watch.reaches(path, ed.Reaches(path))
		return
	}
	ctx, cancel := context.WithCancel(p.s.base)
	r := &run{cancel}
	p.running[path] = r
	p.s.start("judge", func() {
		defer cancel()
		found, err := working(ctx, p.s, nil, "Checking "+known.File, func(ctx context.Context) (*engine.Judgement, error) {
			return ed.Judge(ctx, path)
		})
		if err != nil {
			p.s.logFailure("judging "+known.File, err)
			return
		}
		p.mu.Lock()
		p.judged = append(p.judged, judged{path, r, ed, found})
		p.mu.Unlock()
		p.signal()
	})
}

// finish tells what the rules said, unless a newer version has begun.
func (p *publisher) finish(j judged) {
	if p.running[j.path] != j.run {
		return
	}
	delete(p.running, j.path)
	for _, b := range j.found.Broken {
		p.s.logger.Printf("a rule broke down: %s", b)
	}
	p.send(j.ed, j.found)
	p.s.watch.reaches(j.path, j.ed.Reaches(j.path))
}

// forget empties what the client shows of a closed document.
func (p *publisher) forget(path string, u uri.URI) {
	if old := p.running[path]; old != nil {
		old.cancel()
	}
	delete(p.running, path)
	delete(p.sent, path)
	p.s.watch.reaches(path, nil)
	if _, reopened := p.s.documents.get(path); !p.s.able.pull && !reopened {
		p.notify(&protocol.PublishDiagnosticsParams{URI: u, Diagnostics: []protocol.Diagnostic{}})
	}
}

// send pushes the findings of one version, unless the client has them.
func (p *publisher) send(ed *engine.Edition, j *engine.Judgement) {
	version, open := ed.Version(j.Path)
	text, err := ed.Text(j.Path)
	if !open || err != nil {
		return
	}
	items := p.s.diagnostics(ed, j)
	now := shown{version, text, j.Findings, encoded(items)}
	last, told := p.sent[j.Path]
	p.sent[j.Path] = now
	if told && last.version == version && bytes.Equal(last.items, now.items) {
		return
	}
	p.notify(&protocol.PublishDiagnosticsParams{URI: p.s.uriOf(j.Path), Version: protocol.NewOptional(version), Diagnostics: items})
}

func (p *publisher) notify(params *protocol.PublishDiagnosticsParams) {
	if err := p.s.client.PublishDiagnostics(p.s.base, params); err != nil {
		p.s.logFailure("publishing", err)
	}
}

// rest begins the wait for the keys to rest anew.
func (p *publisher) rest() {
	p.mu.Lock()
	defer p.mu.Unlock()
	p.still()
	ctx, cancel := context.WithCancel(p.s.base)
	p.stopProof = cancel
	p.unproved = p.s.after(quiet, "prove", func() { p.prove(ctx) })
}

// still ends a wait or the proofs under way; the caller holds the mutex.
func (p *publisher) still() {
	if p.unproved != nil {
		p.unproved()
		p.stopProof()
	}
}

// close stops what runs in the background.
func (p *publisher) close() {
	p.mu.Lock()
	defer p.mu.Unlock()
	p.still()
}

// prove proves the rewrites of every open document, so that they are at hand
// when a person asks, and has the client look again where that changed what
// it is told.
func (p *publisher) prove(ctx context.Context) {
	ed := p.s.workspace.Edition()
	changed := false
	for _, path := range p.s.documents.paths() {
		before := encoded(p.s.diagnostics(ed, ed.Known(path)))
		found, err := working(ctx, p.s, nil, "Proving rewrites", func(ctx context.Context) (*engine.Judgement, error) {
			return ed.Prove(ctx, path)
		})
		if err != nil {
			p.s.logFailure("proving", err)
			continue
		}
		if !bytes.Equal(before, encoded(p.s.diagnostics(ed, found))) {
			changed = true
			p.mark(false, path)
		}
	}
	if changed {
		p.refresh()
	}
}

// refresh asks a client that pulls to pull again.
func (p *publisher) refresh() {
	if !p.s.able.pull || !p.s.able.refreshPull {
		return
	}
	p.s.start("refresh", func() {
		if err := p.s.client.DiagnosticRefresh(p.s.base); err != nil {
			p.s.logFailure("refresh", err)
		}
	})
}
