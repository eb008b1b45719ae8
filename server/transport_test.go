package server

import (
	"context"
	"encoding/json"
	"fmt"
	"io"
	"runtime"
	"strconv"
	"strings"
	"sync/atomic"
	"testing"

	"go.lsp.dev/protocol"
)

// echo is an endpoint that shows what the transport does with it: a hover
// answers the version that its snapshot holds.
type echo struct {
	protocol.UnimplementedServer
	stop    context.CancelFunc
	version atomic.Int64
	block   chan struct{} // a request at line 1 waits for it, whatever happens
	began   chan struct{}
}

type versionKey struct{}

func (e *echo) open([]byte) error { panic("a broken open") }

func (e *echo) change(params []byte) error {
	var p struct {
		TextDocument struct {
			Version int64 `json:"version"`
		} `json:"textDocument"`
	}
	if err := json.Unmarshal(params, &p); err != nil {
		return err
	}
	e.version.Store(p.TextDocument.Version)
	return nil
}

// snapshot dawdles: taken off the read loop, it would come after later edits.
func (e *echo) snapshot(ctx context.Context) context.Context {
	for range 20 {
		runtime.Gosched()
	}
	return context.WithValue(ctx, versionKey{}, e.version.Load())
}

func (e *echo) answers(method string) bool { return requests[method] }

func (e *echo) Initialize(context.Context, *protocol.InitializeParams) (*protocol.InitializeResult, error) {
	return &protocol.InitializeResult{}, nil
}

func (e *echo) Shutdown(context.Context) error { return nil }

func (e *echo) Exit(context.Context) error { e.stop(); return nil }

func (e *echo) Hover(ctx context.Context, p *protocol.HoverParams) (*protocol.Hover, error) {
	switch p.Position.Line {
	case 1:
		e.began <- struct{}{}
		<-e.block
	case 2:
		e.began <- struct{}{}
		<-ctx.Done()
		return nil, ctx.Err()
	case 3:
		panic("a broken hover")
	}
	return &protocol.Hover{Contents: protocol.String(strconv.FormatInt(ctx.Value(versionKey{}).(int64), 10))}, nil
}

// converseWith connects a client to the transport alone.
func converseWith(t testing.TB) (*client, *echo) {
	e := &echo{block: make(chan struct{}), began: make(chan struct{}, 1)}
	return connect(t, e.run), e
}

func (e *echo) run(in io.Reader, out io.Writer, logged *lockedBuffer) int {
	return converse(context.Background(), in, out, logged.logger(), func(_ context.Context, stop context.CancelFunc, _ protocol.Client) endpoint {
		e.stop = stop
		return e
	})
}

func hoverAt(line int) object {
	return object{"textDocument": object{"uri": "file:///a"}, "position": position(line, 0)}
}

var initialize = object{"processId": nil, "rootUri": nil, "capabilities": object{}}

// The codes are those of the protocol's base section and of JSON-RPC 2.0.
func TestLifeCycle(t *testing.T) {
	c, _ := converseWith(t)
	if got := c.code("textDocument/hover", hoverAt(0)); got != -32002 {
		t.Errorf("before initialize: %d, want -32002", got)
	}
	if got := c.code("initialize", []int{1}); got != -32602 {
		t.Errorf("initialize with a list: %d, want -32602", got)
	}
	c.call("initialize", initialize, nil)
	c.notify("initialized", nil)
	if got := c.code("initialize", initialize); got != -32600 {
		t.Errorf("second initialize: %d, want -32600", got)
	}
	if got := c.code("textDocument/rename", object{}); got != -32601 {
		t.Errorf("a request that is not answered: %d, want -32601", got)
	}
	c.write(`{"jsonrpc":"2.0","id":"bare","method":"tides/ebb"}`)
	if m := c.answer(`"bare"`); m.Error == nil || m.Error.Code != -32601 {
		t.Errorf("an unknown request without parameters: %+v, want -32601", m.Error)
	}
	if got := c.code("textDocument/hover", 5); got != -32602 {
		t.Errorf("hover with a number: %d, want -32602", got)
	}
	c.call("shutdown", nil, nil)
	if got := c.code("textDocument/hover", hoverAt(0)); got != -32600 {
		t.Errorf("after shutdown: %d, want -32600", got)
	}
	c.notify("exit", nil)
	if got := c.ended(); got != 0 {
		t.Errorf("exit status %d after shutdown, want 0", got)
	}
}

func TestExitStatus(t *testing.T) {
	for name, end := range map[string]struct {
		do   func(*client)
		want int
	}{
		"exit alone":                {func(c *client) { c.notify("exit", nil) }, 1},
		"exit after initialize":     {func(c *client) { c.call("initialize", initialize, nil); c.notify("exit", nil) }, 1},
		"end of input":              {func(c *client) { c.in.Close() }, 1},
		"end of input in a message": {func(c *client) { c.raw("Content-Length: 10\r\n\r\n{"); c.in.Close() }, 1},
		"end of input after shutdown": {func(c *client) {
			c.call("initialize", initialize, nil)
			c.call("shutdown", nil, nil)
			c.in.Close()
		}, 0},
	} {
		t.Run(name, func(t *testing.T) {
			c, _ := converseWith(t)
			end.do(c)
			if got := c.ended(); got != end.want {
				t.Errorf("exit status %d, want %d", got, end.want)
			}
		})
	}
}

// A request must see the text as it was when the request was sent, however
// fast edits follow.
func TestRequestsSeeTheEditionTheyWereSentFor(t *testing.T) {
	c, _ := converseWith(t)
	c.call("initialize", initialize, nil)
	// All in one write, so that the next message is always there to be read.
	const pairs = 2000
	var all strings.Builder
	frame := func(body string) { fmt.Fprintf(&all, "Content-Length: %d\r\n\r\n%s", len(body), body) }
	for v := 1; v <= pairs; v++ {
		frame(fmt.Sprintf(`{"jsonrpc":"2.0","method":"textDocument/didChange","params":{"textDocument":{"uri":"file:///a","version":%d}}}`, v))
		frame(fmt.Sprintf(`{"jsonrpc":"2.0","id":"v%d","method":"textDocument/hover","params":%s}`, v, encode(hoverAt(0))))
	}
	if err := c.raw(all.String()); err != nil {
		t.Fatal(err)
	}
	for v := 1; v <= pairs; v++ {
		var hover struct{ Contents string }
		if err := json.Unmarshal(c.answer(fmt.Sprintf(`"v%d"`, v)).Result, &hover); err != nil {
			t.Fatal(err)
		}
		if hover.Contents != strconv.Itoa(v) {
			t.Fatalf("the hover sent after version %d saw version %s", v, hover.Contents)
		}
	}
}

// Each of these ends a session whose errors reach the library.
func TestNotificationsCannotEndTheSession(t *testing.T) {
	for _, body := range []string{
		`{"jsonrpc":"2.0","method":"$/x","params":{}}`,
		`{"jsonrpc":"2.0","method":"x"}`,
		`{"jsonrpc":"2.0","method":"initialized"}`,
		`{"jsonrpc":"2.0","method":"initialized","params":null}`,
		`{"jsonrpc":"2.0","method":"textDocument/didOpen","params":{}}`,
		`{"jsonrpc":"2.0","method":"textDocument/didChange","params":5}`,
		`{"jsonrpc":"2.0","method":"textDocument/didSave","params":5}`,
		`{"jsonrpc":"2.0","method":"textDocument/didClose"}`,
		`{"jsonrpc":"2.0","method":"$/cancelRequest","params":{"id":{}}}`,
		`{"jsonrpc":"2.0","method":"$/cancelRequest","params":{"id":1099511627776}}`,
		`{"jsonrpc":"2.0","method":"$/cancelRequest"}`,
		`{"jsonrpc":"2.0","method":"workspace/didChangeWatchedFiles","params":[]}`,
		`{"jsonrpc":"2.0","method":"window/workDoneProgress/cancel","params":{"token":{}}}`,
		`{"jsonrpc":"2.0","id":null,"method":"textDocument/hover","params":{}}`,
		`{"jsonrpc":"2.0","id":77,"result":null}`,
		`{"jsonrpc":"2.0","id":78,"error":{"code":1,"message":"m"}}`,
		`[{"jsonrpc":"2.0","method":"$/y"},{"jsonrpc":"2.0","method":"initialized"}]`,
	} {
		t.Run(body, func(t *testing.T) {
			c, _ := converseWith(t)
			c.call("initialize", initialize, nil)
			if err := c.write(body); err != nil {
				t.Fatal(err)
			}
			c.call("textDocument/hover", hoverAt(0), nil)
		})
	}
}

func TestPanicsStayInsideTheirRequest(t *testing.T) {
	c, _ := converseWith(t)
	c.call("initialize", initialize, nil)
	if got := c.code("textDocument/hover", hoverAt(3)); got != -32603 {
		t.Errorf("a request that panics: %d, want -32603", got)
	}
	c.call("textDocument/hover", hoverAt(0), nil)
	if log := c.log.String(); !strings.Contains(log, "a broken hover") {
		t.Errorf("the panic is not in the log: %q", log)
	}
}

func TestCancel(t *testing.T) {
	for _, id := range []string{"41", `"forty-one"`} {
		c, e := converseWith(t)
		c.call("initialize", initialize, nil)
		c.write(fmt.Sprintf(`{"jsonrpc":"2.0","id":%s,"method":"textDocument/hover","params":%s}`, id, encode(hoverAt(2))))
		<-e.began
		c.write(fmt.Sprintf(`{"jsonrpc":"2.0","method":"$/cancelRequest","params":{"id":%s}}`, id))
		if m := c.answer(id); m.Error == nil || m.Error.Code != -32800 {
			t.Errorf("a cancelled request with id %s: %+v, want -32800", id, m.Error)
		}
	}
}

// A handler that waits for its context, and one that waits for nothing, must
// not hold the process once the input has ended.
func TestEndOfInputWithABusyHandler(t *testing.T) {
	for _, line := range []int{1, 2} {
		c, e := converseWith(t)
		c.call("initialize", initialize, nil)
		c.ask("textDocument/hover", hoverAt(line))
		<-e.began
		c.in.Close()
		if got := c.ended(); got != 1 {
			t.Errorf("exit status %d, want 1", got)
		}
		close(e.block)
	}
}

// What makes the stream unreadable ends the session, at once and without
// allocating what the header claims.
func TestUnreadableFramesEndTheSession(t *testing.T) {
	for name, frame := range map[string]string{
		"no JSON":                 "Content-Length: 5\r\n\r\n{oops",
		"no length":               "Content-Type: text\r\n\r\n{}",
		"length 0":                "Content-Length: 0\r\n\r\n",
		"negative length":         "Content-Length: -4\r\n\r\n{}",
		"no number":               "Content-Length: many\r\n\r\n{}",
		"no colon":                "Content-Length 4\r\n\r\n{}",
		"a body of 64 MB and 1":   fmt.Sprintf("Content-Length: %d\r\n\r\n", 64<<20+1),
		"a body of 1 GB":          fmt.Sprintf("content-length:\t%d\r\n\r\n", 1<<30),
		"a body beyond 64 bits":   "Content-Length: 99999999999999999999999999\r\n\r\n",
		"a long header line":      "X-Tide: " + strings.Repeat("x", 5000),
		"a long second line":      "Content-Length: 2\r\nX-Tide: " + strings.Repeat("x", 5000),
		"a version that is not 2": `Content-Length: 28` + "\r\n\r\n" + `{"jsonrpc":"1.0","method":1}`,
	} {
		t.Run(name, func(t *testing.T) {
			c, _ := converseWith(t)
			c.call("initialize", initialize, nil)
			go c.raw(frame)
			if got := c.ended(); got != 1 {
				t.Errorf("exit status %d, want 1", got)
			}
		})
	}
}

func TestFrameLimitsLetOrdinaryFramesPass(t *testing.T) {
	c, _ := converseWith(t)
	c.call("initialize", initialize, nil)
	body := fmt.Sprintf(`{"jsonrpc":"2.0","id":"x","method":"textDocument/hover","params":%s}`, encode(hoverAt(0)))
	for _, header := range []string{
		"content-length: %d\r\nContent-Type: application/vscode-jsonrpc; charset=utf-8\r\n\r\n",
		"Content-Length: %d\n\n",
		"X-Tide: " + strings.Repeat("x", 4000) + "\r\nContent-Length: %d\r\n\r\n",
	} {
		// Byte by byte, as a slow pipe would bring it.
		for _, b := range []byte(fmt.Sprintf(header, len(body)) + body) {
			if err := c.raw(string(b)); err != nil {
				t.Fatal(err)
			}
		}
		if m := c.answer(`"x"`); m.Error != nil {
			t.Errorf("%q: %+v", header, m.Error)
		}
	}
}
