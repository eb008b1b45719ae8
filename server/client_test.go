package server

import (
	"bufio"
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"log"
	"net/textproto"
	"net/url"
	"strconv"
	"sync"
	"testing"
	"time"
)

// deadline bounds every wait of the tests; nothing waits for it when all is
// well.
const deadline = 20 * time.Second

// client is a language client that knows JSON-RPC and nothing else, so that
// the tests see the very bytes of the server and share no code with it.
type client struct {
	t   testing.TB
	in  io.WriteCloser // what the server reads
	out *bufio.Reader  // what the server writes
	log *lockedBuffer

	mu      sync.Mutex
	changed *sync.Cond
	answers map[string]message
	said    []message // notifications and requests of the server
	over    bool
	last    int

	exit chan int
}

type message struct {
	ID     json.RawMessage `json:"id"`
	Method string          `json:"method"`
	Params json.RawMessage `json:"params"`
	Result json.RawMessage `json:"result"`
	Error  *wireError      `json:"error"`
}

type wireError struct {
	Code    int             `json:"code"`
	Message string          `json:"message"`
	Data    json.RawMessage `json:"data"`
}

type lockedBuffer struct {
	mu sync.Mutex
	b  bytes.Buffer
}

func (l *lockedBuffer) Write(b []byte) (int, error) {
	l.mu.Lock()
	defer l.mu.Unlock()
	return l.b.Write(b)
}

func (l *lockedBuffer) String() string {
	l.mu.Lock()
	defer l.mu.Unlock()
	return l.b.String()
}

func (l *lockedBuffer) logger() *log.Logger { return log.New(l, "", 0) }

// connect runs a server between two pipes and reads all that it says.
func connect(t testing.TB, run func(in io.Reader, out io.Writer, logged *lockedBuffer) int) *client {
	c := deaf(t, run)
	go c.read()
	return c
}

// deaf is a client that does not read.
func deaf(t testing.TB, run func(in io.Reader, out io.Writer, logged *lockedBuffer) int) *client {
	serverIn, in := io.Pipe()
	out, serverOut := io.Pipe()
	c := &client{t: t, in: in, out: bufio.NewReader(out), log: &lockedBuffer{}, answers: map[string]message{}, exit: make(chan int, 1)}
	c.changed = sync.NewCond(&c.mu)
	go func() {
		code := run(serverIn, serverOut, c.log)
		serverIn.Close()
		serverOut.Close()
		c.exit <- code
	}()
	t.Cleanup(func() {
		in.Close()
		out.Close()
	})
	return c
}

func (c *client) read() {
	for {
		m, err := readMessage(c.out)
		c.mu.Lock()
		switch {
		case err != nil:
			c.over = true
		case m.Method == "":
			c.answers[string(m.ID)] = m
		default:
			c.said = append(c.said, m)
		}
		c.changed.Broadcast()
		c.mu.Unlock()
		if err != nil {
			return
		}
		if m.Method != "" && m.ID != nil {
			go c.write(fmt.Sprintf(`{"jsonrpc":"2.0","id":%s,"result":null}`, m.ID))
		}
	}
}

func readMessage(r *bufio.Reader) (m message, err error) {
	header, err := textproto.NewReader(r).ReadMIMEHeader()
	if err != nil {
		return m, err
	}
	n, err := strconv.Atoi(header.Get("Content-Length"))
	if err != nil {
		return m, err
	}
	body := make([]byte, n)
	if _, err := io.ReadFull(r, body); err != nil {
		return m, err
	}
	return m, json.Unmarshal(body, &m)
}

// raw sends bytes as they are; a server that has ended does not take them.
func (c *client) raw(s string) error {
	_, err := io.WriteString(c.in, s)
	return err
}

func (c *client) write(body string) error {
	return c.raw(fmt.Sprintf("Content-Length: %d\r\n\r\n%s", len(body), body))
}

func encode(v any) string {
	b, err := json.Marshal(v)
	if err != nil {
		panic(err)
	}
	return string(b)
}

func (c *client) notify(method string, params any) {
	c.t.Helper()
	if err := c.write(fmt.Sprintf(`{"jsonrpc":"2.0","method":%q,"params":%s}`, method, encode(params))); err != nil {
		c.t.Fatalf("%s: %v\n%s", method, err, c.log)
	}
}

// ask sends a request and returns its id.
func (c *client) ask(method string, params any) string {
	c.t.Helper()
	c.mu.Lock()
	c.last++
	id := strconv.Itoa(c.last)
	c.mu.Unlock()
	if err := c.write(fmt.Sprintf(`{"jsonrpc":"2.0","id":%s,"method":%q,"params":%s}`, id, method, encode(params))); err != nil {
		c.t.Fatalf("%s: %v\n%s", method, err, c.log)
	}
	return id
}

// answer waits for the answer to an id.
func (c *client) answer(id string) message {
	c.t.Helper()
	var m message
	c.wait("the answer to "+id, func() bool {
		var ok bool
		m, ok = c.answers[id]
		delete(c.answers, id)
		return ok
	})
	return m
}

// call asks and waits, and fails on an error.
func (c *client) call(method string, params any, result any) {
	c.t.Helper()
	m := c.answer(c.ask(method, params))
	if m.Error != nil {
		c.t.Fatalf("%s: %d %s", method, m.Error.Code, m.Error.Message)
	}
	if result != nil {
		if err := json.Unmarshal(m.Result, result); err != nil {
			c.t.Fatalf("%s: %v in %s", method, err, m.Result)
		}
	}
}

// code asks and returns the code of the error.
func (c *client) code(method string, params any) int {
	c.t.Helper()
	m := c.answer(c.ask(method, params))
	if m.Error == nil {
		return 0
	}
	return m.Error.Code
}

// hear waits for a message of the server for which pick returns true, and
// takes it and everything said before it.
func (c *client) hear(method string, pick func(params json.RawMessage) bool) message {
	c.t.Helper()
	var heard message
	c.wait(method, func() bool {
		for i, m := range c.said {
			if m.Method == method && (pick == nil || pick(m.Params)) {
				heard = m
				c.said = c.said[i+1:]
				return true
			}
		}
		return false
	})
	return heard
}

// count returns how many messages of a method are waiting to be heard.
func (c *client) count(method string) int {
	c.mu.Lock()
	defer c.mu.Unlock()
	n := 0
	for _, m := range c.said {
		if m.Method == method {
			n++
		}
	}
	return n
}

// wait blocks until ready, which is called with the mutex held.
func (c *client) wait(what string, ready func() bool) {
	c.t.Helper()
	c.mu.Lock()
	defer c.mu.Unlock()
	late := time.AfterFunc(deadline, func() {
		c.mu.Lock()
		c.over = true
		c.changed.Broadcast()
		c.mu.Unlock()
	})
	defer late.Stop()
	for !ready() {
		if c.over {
			c.t.Fatalf("the session ended, or %v passed, before %s\nlog: %s", deadline, what, c.log)
		}
		c.changed.Wait()
	}
}

// ended waits for the exit status.
func (c *client) ended() int {
	c.t.Helper()
	select {
	case code := <-c.exit:
		return code
	case <-time.After(deadline):
		c.t.Fatalf("the session did not end\nlog: %s", c.log)
		return -1
	}
}

// object is shorthand for the parameters of messages.
type object map[string]any

func position(line, character int) object { return object{"line": line, "character": character} }

func fileURI(path string) string { return (&url.URL{Scheme: "file", Path: path}).String() }

func textDocument(path string) object { return object{"uri": fileURI(path)} }
