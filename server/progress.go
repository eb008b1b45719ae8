package server

import (
	"context"
	"strconv"
	"sync"
	"time"

	"go.lsp.dev/protocol"
)

// patience is how long work may take before the client is told of it.
const patience = 500 * time.Millisecond

// progress holds the work that the client is told of and may cancel.
type progress struct {
	mu     sync.Mutex
	last   int
	cancel map[string]context.CancelFunc // by token
}

// working runs f, and tells the client of it once it has taken longer than
// patience, with a way to cancel it. token is the client's own, if it gave
// one with its request.
func working[T any](ctx context.Context, s *session, token protocol.ProgressToken, title string, f func(context.Context) (T, error)) (T, error) {
	ctx, cancel := context.WithCancel(ctx)
	defer cancel()
	if token == nil && !s.able.workProgress {
		return f(ctx)
	}
	done := make(chan struct{})
	defer close(done)
	stop := s.after(patience, "progress", func() {
		s.start("progress", func() { s.tell(token, title, cancel, done) })
	})
	defer stop()
	return f(ctx)
}

// tell shows the work under way until done is closed.
func (s *session) tell(token protocol.ProgressToken, title string, cancel context.CancelFunc, done <-chan struct{}) {
	if token == nil {
		token = s.progress.next()
		if err := s.client.WorkDoneProgressCreate(s.base, &protocol.WorkDoneProgressCreateParams{Token: token}); err != nil {
			return
		}
	}
	select {
	case <-done:
		return
	default:
	}
	s.progress.put(key(token), cancel)
	defer s.progress.put(key(token), nil)
	yes := true
	s.report(token, &protocol.WorkDoneProgressBegin{Kind: "begin", Title: title, Cancellable: &yes})
	select {
	case <-done:
	case <-s.base.Done():
	}
	s.report(token, &protocol.WorkDoneProgressEnd{Kind: "end"})
}

func (s *session) report(token protocol.ProgressToken, value any) {
	raw, err := protocol.Marshal(value)
	if err != nil {
		return
	}
	if err := s.client.Progress(s.base, &protocol.ProgressParams{Token: token, Value: raw}); err != nil {
		s.logFailure("progress", err)
	}
}

// WorkDoneProgressCancel is the client's cancel button.
func (s *session) WorkDoneProgressCancel(_ context.Context, p *protocol.WorkDoneProgressCancelParams) error {
	s.progress.mu.Lock()
	cancel := s.progress.cancel[key(p.Token)]
	s.progress.mu.Unlock()
	if cancel != nil {
		cancel()
	}
	return nil
}

// next returns a token that was not used before.
func (p *progress) next() protocol.ProgressToken {
	p.mu.Lock()
	defer p.mu.Unlock()
	p.last++
	return protocol.String("lagwise-" + strconv.Itoa(p.last))
}

// put remembers how to cancel a token's work, or forgets it.
func (p *progress) put(token string, cancel context.CancelFunc) {
	p.mu.Lock()
	defer p.mu.Unlock()
	if cancel == nil {
		delete(p.cancel, token)
		return
	}
	p.cancel[token] = cancel
}

// key names a token of either type.
func key(token protocol.ProgressToken) string {
	switch t := token.(type) {
	case protocol.Integer:
		return "#" + strconv.Itoa(int(t))
	case protocol.String:
		return string(t)
	}
	return ""
}
