package server

import (
	"context"
	"errors"
	"io"
	"log"
	"runtime/debug"
	"sync/atomic"
	"time"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"
)

// grace is how long handlers may take to notice that the session is over.
const grace = time.Second

// endpoint is what the transport needs of a session beside the methods of the
// protocol.
type endpoint interface {
	protocol.Server
	// open and change take raw parameters: the typed ones cannot tell an
	// edit of a range from an edit whose range is broken.
	open(params []byte) error
	change(params []byte) error
	// snapshot puts the present state of the workspace into the context of
	// a request.
	snapshot(ctx context.Context) context.Context
	// answers reports whether a request of this name is answered at all.
	answers(method string) bool
}

// states of a session's life.
const (
	fresh int32 = iota
	running
	shutDown
)

// converse reads messages from in and writes answers to out until the session
// ends, and returns the exit status.
func converse(ctx context.Context, in io.Reader, out io.Writer, logger *log.Logger,
	build func(base context.Context, stop context.CancelFunc, client protocol.Client) endpoint) int {
	base, stop := context.WithCancel(ctx)
	defer stop()
	gate := &gatedWriter{out: out}
	defer gate.closed.Store(true)
	stream := readWriter{&endReader{newFrameReader(in), stop, logger}, gate}
	conn := jsonrpc2.NewConn(jsonrpc2.NewHeaderStream(stream), jsonrpc2.WithCodec(codec{}))
	// The session exists before the first message is read.
	t := &transport{logger: logger, end: build(base, stop, protocol.ClientDispatcher(conn))}
	t.inner = protocol.ServerHandler(t.end, jsonrpc2.MethodNotFoundHandler)
	t.calls = protocol.CancelHandler(jsonrpc2.AsyncHandler(t.guarded))
	conn.Go(base, t.handle)
	select {
	case <-conn.Done():
	case <-base.Done():
		select {
		case <-conn.Done():
		case <-time.After(grace):
		}
	}
	if err := conn.Err(); err != nil {
		logger.Printf("the session ended: %v", err)
	}
	if t.state.Load() == shutDown {
		return 0
	}
	return 1
}

// transport handles messages in the order in which they arrive.
type transport struct {
	logger *log.Logger
	end    endpoint
	inner  jsonrpc2.Handler
	calls  jsonrpc2.Handler
	state  atomic.Int32 // written by the read loop only
}

// handle runs on the read loop: it finishes notifications, and sends requests
// off once they hold their snapshot.
func (t *transport) handle(ctx context.Context, req *jsonrpc2.Request) (any, error) {
	if !req.IsCall() {
		t.notified(ctx, req)
		return nil, nil
	}
	switch state, m := t.state.Load(), req.Method(); {
	case state == shutDown, state == running && m == protocol.MethodInitialize:
		return nil, jsonrpc2.ErrInvalidRequest
	case state == fresh && m != protocol.MethodInitialize:
		return nil, jsonrpc2.NewError(jsonrpc2.ServerNotInitialized, "initialize comes first")
	case m == protocol.MethodInitialize:
		res, err := t.guarded(ctx, req)
		if err == nil {
			t.state.Store(running)
		}
		return res, err
	case m == protocol.MethodShutdown:
		t.state.Store(shutDown)
		return t.guarded(ctx, req)
	case !t.end.answers(m):
		return nil, jsonrpc2.ErrMethodNotFound
	}
	return t.calls(t.end.snapshot(ctx), req)
}

// notified handles a notification to its end. Whatever it does wrong is
// logged: an error that reached the library would end the session.
func (t *transport) notified(ctx context.Context, req *jsonrpc2.Request) {
	defer recovered(t.logger, req.Method())
	var err error
	switch m := req.Method(); {
	case m == protocol.MethodExit:
		_, err = t.guarded(ctx, req)
	case t.state.Load() != running:
		return
	case m == protocol.MethodCancelRequest:
		_, err = t.calls(ctx, req)
	case m == protocol.MethodTextDocumentDidOpen:
		err = t.end.open(req.Params())
	case m == protocol.MethodTextDocumentDidChange:
		err = t.end.change(req.Params())
	default:
		_, err = t.guarded(ctx, req)
	}
	if err != nil {
		t.logger.Printf("%s: %v", req.Method(), err)
	}
}

// guarded calls the session, turns a panic into an error and every error into
// one with the code that the protocol gives it.
func (t *transport) guarded(ctx context.Context, req *jsonrpc2.Request) (res any, err error) {
	defer func() {
		if p := recover(); p != nil {
			t.logger.Printf("%s: panic: %v\n%s", req.Method(), p, debug.Stack())
			res, err = nil, jsonrpc2.NewError(jsonrpc2.InternalError, "an internal error; the log of the server says more")
		}
	}()
	res, err = t.inner(ctx, req)
	return res, coded(err)
}

// recovered is deferred around work that must not take the session with it.
func recovered(logger *log.Logger, what string) {
	if p := recover(); p != nil {
		logger.Printf("%s: panic: %v\n%s", what, p, debug.Stack())
	}
}

// coded returns err as an error with a code of the protocol.
func coded(err error) error {
	var e *jsonrpc2.Error
	switch {
	case err == nil:
		return nil
	case errors.Is(err, context.Canceled):
		return protocol.ErrRequestCancelled
	case errors.Is(err, jsonrpc2.ErrParse):
		return jsonrpc2.NewError(jsonrpc2.InvalidParams, err.Error())
	case errors.As(err, &e):
		return err
	}
	return jsonrpc2.NewError(jsonrpc2.InternalError, err.Error())
}

// codec passes raw messages through and leaves the rest to the protocol.
type codec struct{}

func (codec) Marshal(v any) ([]byte, error) {
	if r, ok := v.(jsonrpc2.RawMessage); ok && r != nil {
		return r, nil
	}
	return protocol.Marshal(v)
}

func (codec) Unmarshal(b []byte, v any) error {
	if r, ok := v.(*jsonrpc2.RawMessage); ok {
		*r = append(jsonrpc2.RawMessage(nil), b...)
		return nil
	}
	return protocol.Unmarshal(b, v)
}

// readWriter joins the two directions; the caller of Serve closes them.
type readWriter struct {
	io.Reader
	io.Writer
}

func (readWriter) Close() error { return nil }

// gatedWriter refuses to write once the session is over.
type gatedWriter struct {
	out    io.Writer
	closed atomic.Bool
}

func (w *gatedWriter) Write(b []byte) (int, error) {
	if w.closed.Load() {
		return 0, io.ErrClosedPipe
	}
	return w.out.Write(b)
}
