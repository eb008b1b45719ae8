package server

import (
	"bytes"
	"context"
	"encoding/json"
	"io"
	"os"
	"path/filepath"
	"runtime"
	"slices"
	"strings"
	"sync"
	"testing"
	"time"

	"go.lsp.dev/protocol"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/engine"
	"lagwise/lint/finding"
)

// mirror is a rule that says the text of the document, so that a test sees
// what the server believes it to be.
var mirror = lint.Rule{Name: "mirror", Severity: finding.Information, Scope: lint.OfDocument, Need: lint.Text,
	Run: func(q *lint.Inquiry) {
		q.Report(finding.Finding{Message: string(q.Tree.Text)})
	}}

// marks is a rule that speaks of every "mark" in the text.
var marks = lint.Rule{Name: "marks", Severity: finding.Warning, Scope: lint.OfDocument, Need: lint.Text,
	Run: func(q *lint.Inquiry) {
		for at := 0; ; {
			i := bytes.Index(q.Tree.Text[at:], []byte("mark"))
			if i < 0 {
				return
			}
			q.Report(finding.Finding{At: document.Span{Start: at + i, End: at + i + 4}, Message: "A mark."})
			at += i + 4
		}
	}}

// byHand is a clock that moves when the test says so.
type byHand struct {
	mu     sync.Mutex
	now    time.Duration
	timers []*handTimer
}

type handTimer struct {
	at time.Duration
	f  func()
}

func (b *byHand) clock() clock {
	return clock{after: func(d time.Duration, f func()) func() bool {
		b.mu.Lock()
		defer b.mu.Unlock()
		timer := &handTimer{b.now + d, f}
		b.timers = append(b.timers, timer)
		return func() bool { return b.drop(timer) }
	}}
}

func (b *byHand) drop(timer *handTimer) bool {
	b.mu.Lock()
	defer b.mu.Unlock()
	i := slices.Index(b.timers, timer)
	if i >= 0 {
		b.timers = slices.Delete(b.timers, i, i+1)
	}
	return i >= 0
}

// await waits until something is to be done after d.
func (b *byHand) await(t testing.TB, d time.Duration) {
	t.Helper()
	for until := time.Now().Add(deadline); ; runtime.Gosched() {
		b.mu.Lock()
		found := slices.ContainsFunc(b.timers, func(timer *handTimer) bool { return timer.at == b.now+d })
		b.mu.Unlock()
		if found {
			return
		}
		if time.Now().After(until) {
			t.Fatalf("nothing is to be done after %v", d)
		}
	}
}

// pass lets time pass and runs what is due, in order.
func (b *byHand) pass(d time.Duration) {
	b.mu.Lock()
	until := b.now + d
	b.mu.Unlock()
	for {
		b.mu.Lock()
		var next *handTimer
		for _, timer := range b.timers {
			if timer.at <= until && (next == nil || timer.at < next.at) {
				next = timer
			}
		}
		if next == nil {
			b.now = until
			b.mu.Unlock()
			return
		}
		b.now = next.at
		b.timers = slices.Delete(b.timers, slices.Index(b.timers, next), slices.Index(b.timers, next)+1)
		b.mu.Unlock()
		next.f()
	}
}

// serving connects a client to a session with these rules.
func serving(t testing.TB, c clock, rules ...lint.Rule) *client {
	connected, _ := servingSession(t, c, rules...)
	return connected
}

// servingSession also gives the session, once it is initialized.
func servingSession(t testing.TB, c clock, rules ...lint.Rule) (*client, func() *session) {
	e := engine.New(engine.Options{Rules: rules})
	made := make(chan *session, 1)
	connected := connect(t, func(in io.Reader, out io.Writer, logged *lockedBuffer) int {
		return converse(context.Background(), in, out, logged.logger(), func(base context.Context, stop context.CancelFunc, client protocol.Client) endpoint {
			s := newSession(base, stop, client, Options{Engine: e, Version: "0"}, logged.logger(), c)
			made <- s
			return s
		})
	})
	return connected, func() *session { return <-made }
}

// begin initializes a session in a new folder with files, and returns it.
func (c *client) begin(capabilities object, files map[string]string) string {
	c.t.Helper()
	dir, err := filepath.EvalSymlinks(c.t.TempDir())
	if err != nil {
		c.t.Fatal(err)
	}
	for name, text := range files {
		writeFile(c.t, filepath.Join(dir, name), text)
	}
	c.call("initialize", object{"processId": nil, "rootUri": fileURI(dir), "capabilities": capabilities}, nil)
	c.notify("initialized", object{})
	return dir
}

func writeFile(t testing.TB, path, text string) {
	t.Helper()
	if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
}

func (c *client) open(path string, version any, text string) {
	c.t.Helper()
	c.notify("textDocument/didOpen", object{"textDocument": object{"uri": fileURI(path), "languageId": "toml", "version": version, "text": text}})
}

func (c *client) edit(path string, version any, changes ...object) {
	c.t.Helper()
	c.notify("textDocument/didChange", object{"textDocument": object{"uri": fileURI(path), "version": version}, "contentChanges": changes})
}

// replace is one incremental change.
func replace(line, from, toLine, to int, text string) object {
	return object{"range": object{"start": position(line, from), "end": position(toLine, to)}, "text": text}
}

type published struct {
	URI         string
	Version     *int
	Diagnostics []diagnostic
}

type diagnostic struct {
	Range              struct{ Start, End struct{ Line, Character int } }
	Severity           int
	Code               string
	Source             string
	Message            string
	Data               struct{ Fingerprint string }
	RelatedInformation []struct{ Message string }
}

// findings waits for findings of a document that satisfy pick.
func (c *client) findings(path string, pick func(published) bool) published {
	c.t.Helper()
	var p published
	c.hear("textDocument/publishDiagnostics", func(params json.RawMessage) bool {
		p = published{}
		if err := json.Unmarshal(params, &p); err != nil {
			c.t.Error(err)
		}
		return p.URI == fileURI(path) && pick(p)
	})
	return p
}

func ofVersion(v int) func(published) bool {
	return func(p published) bool { return p.Version != nil && *p.Version == v }
}

// says is the message of a rule among findings.
func (p published) says(rule string) string {
	for _, d := range p.Diagnostics {
		if d.Code == rule {
			return d.Message
		}
	}
	return ""
}

// Node clients count up by one, Neovim and eglot by two or four; none of it
// means anything but "later".
func TestEditsAreFollowedWhateverTheVersions(t *testing.T) {
	c := serving(t, realClock, mirror)
	path := filepath.Join(c.begin(object{}, nil), "a.analysis.toml")
	c.open(path, 0, "title = \"tide\"\n")
	if got := c.findings(path, ofVersion(0)).says("mirror"); got != "title = \"tide\"\n" {
		t.Fatalf("after opening: %q", got)
	}
	c.edit(path, 4, replace(0, 9, 0, 13, "ebb"), replace(0, 12, 0, 12, " and flood"))
	if got := c.findings(path, ofVersion(4)).says("mirror"); got != "title = \"ebb and flood\"\n" {
		t.Errorf("after two edits in one change: %q", got)
	}
	c.edit(path, 3, object{"text": "x = 1"})
	if got := c.findings(path, ofVersion(3)).says("mirror"); got != "x = 1" {
		t.Errorf("after the whole text: %q", got)
	}
	c.edit(path, 9, replace(7, 0, 9, 9, "\ny = 2"))
	if got := c.findings(path, ofVersion(9)).says("mirror"); got != "x = 1\ny = 2" {
		t.Errorf("after an edit beyond the end: %q", got)
	}
	for _, v := range []string{"null", "1.0e3", "2147483648", `"x"`, "{}"} {
		c.edit(path, json.RawMessage(v), object{"text": "v = " + v})
		c.findings(path, func(p published) bool { return p.says("mirror") == "v = "+v })
	}
	c.notify("textDocument/didClose", object{"textDocument": textDocument(path)})
	if p := c.findings(path, func(p published) bool { return len(p.Diagnostics) == 0 }); p.Version != nil {
		t.Errorf("a closed document has a version: %d", *p.Version)
	}
}

// é is one UTF-16 unit and two bytes, 😀 two units and four bytes (the Unicode
// Standard, section 3.9).
func TestPositionsInTheClientsEncoding(t *testing.T) {
	for _, enc := range []struct {
		offered  []string
		chosen   string
		from, to int // of the x behind é😀
	}{
		{nil, "utf-16", 7, 8},
		{[]string{"utf-16", "utf-8", "utf-32"}, "utf-8", 10, 11},
		{[]string{"utf-32", "utf-16"}, "utf-16", 7, 8},
		{[]string{"utf-32"}, "utf-32", 6, 7},
		{[]string{"koi8-r"}, "utf-16", 7, 8},
	} {
		t.Run(strings.Join(enc.offered, " "), func(t *testing.T) {
			c := serving(t, realClock, mirror, marks)
			general := object{}
			if enc.offered != nil {
				general["positionEncodings"] = enc.offered
			}
			var initialized struct {
				Capabilities struct{ PositionEncoding string }
			}
			dir := t.TempDir()
			c.call("initialize", object{"processId": nil, "rootUri": fileURI(dir), "capabilities": object{"general": general}}, &initialized)
			if got := initialized.Capabilities.PositionEncoding; got != enc.chosen {
				t.Fatalf("chose %s, want %s", got, enc.chosen)
			}
			path := filepath.Join(dir, "a.analysis.toml")
			c.open(path, 1, "t = é😀x # z\n")
			c.edit(path, 2, replace(0, enc.from, 0, enc.to, "mark"))
			p := c.findings(path, ofVersion(2))
			if got := p.says("mirror"); got != "t = é😀mark # z\n" {
				t.Errorf("the text after the edit: %q", got)
			}
			for _, d := range p.Diagnostics {
				if d.Code == "marks" && (d.Range.Start.Character != enc.from || d.Range.End.Character != enc.from+4) {
					t.Errorf("the mark is at %d to %d, want %d to %d", d.Range.Start.Character, d.Range.End.Character, enc.from, enc.from+4)
				}
			}
		})
	}
}

// A range that cannot be read must neither be guessed nor replace the text.
func TestAnEditThatCannotBeFollowed(t *testing.T) {
	for _, broken := range []string{
		`{"range":{"start":{"line":-1,"character":0},"end":{"line":0,"character":0}},"text":"lost"}`,
		`{"range":{"start":{"line":4294967296,"character":0},"end":{"line":0,"character":0}},"text":"lost"}`,
		`{"range":{"start":{"line":"0","character":0},"end":{"line":0,"character":0}},"text":"lost"}`,
		`{"range":{"start":{"line":0.5,"character":0},"end":{"line":0,"character":0}},"text":"lost"}`,
		`{"range":{"start":{"line":0,"character":3},"end":{"line":0,"character":1}},"text":"lost"}`,
		`{"range":{"start":{"line":0,"character":3}},"text":"lost"}`,
		`{"range":null,"text":"lost"}`,
		`{"range":{},"text":"lost"}`,
		`{"range":7,"text":"lost"}`,
		`{"text":7}`,
		`{}`,
		`7`,
	} {
		t.Run(broken, func(t *testing.T) {
			c := serving(t, realClock, mirror)
			path := filepath.Join(c.begin(object{}, nil), "a.analysis.toml")
			c.open(path, 1, "title = 1\n")
			c.findings(path, ofVersion(1))
			c.edit(path, 2, replace(0, 0, 0, 5, "kept"))
			c.findings(path, ofVersion(2))
			c.notify("textDocument/didChange", object{"textDocument": object{"uri": fileURI(path), "version": 3},
				"contentChanges": []json.RawMessage{json.RawMessage(`{"range":{"start":{"line":0,"character":0},"end":{"line":0,"character":0}},"text":"half"}`), json.RawMessage(broken)}})
			c.edit(path, 4, replace(0, 0, 0, 0, "passed over"))
			c.hear("window/showMessage", nil)
			if m := c.answer(c.ask("textDocument/hover", object{"textDocument": textDocument(path), "position": position(0, 1)})); m.Error != nil || string(m.Result) != "null" {
				t.Errorf("a hover on a text that is out of step: %s %v, want null", m.Result, m.Error)
			}
			c.edit(path, 5, object{"text": "title = 2\n"})
			if got := c.findings(path, ofVersion(5)).says("mirror"); got != "title = 2\n" {
				t.Errorf("after the whole text: %q", got)
			}
			c.edit(path, 6, replace(0, 0, 0, 5, "again"))
			if got := c.findings(path, ofVersion(6)).says("mirror"); got != "again = 2\n" {
				t.Errorf("edits after the whole text: %q", got)
			}
			if n := c.count("window/showMessage"); n != 0 {
				t.Errorf("told %d times more than once", n)
			}
		})
	}
}

func TestAClientThatPullsIsNeverPushedTo(t *testing.T) {
	c := serving(t, realClock, mirror)
	path := filepath.Join(c.begin(object{"textDocument": object{"diagnostic": object{}}}, nil), "a.analysis.toml")
	c.open(path, 1, "x = 1")
	var report struct {
		Kind     string
		ResultID string `json:"resultId"`
		Items    []diagnostic
	}
	c.call("textDocument/diagnostic", object{"textDocument": textDocument(path)}, &report)
	if report.Kind != "full" || len(report.Items) != 1 || report.Items[0].Message != "x = 1" {
		t.Errorf("first pull: %+v", report)
	}
	again := object{"textDocument": textDocument(path), "previousResultId": report.ResultID}
	c.call("textDocument/diagnostic", again, &report)
	if report.Kind != "unchanged" {
		t.Errorf("second pull: %+v", report)
	}
	c.edit(path, 2, object{"text": "x = 2"})
	c.call("textDocument/diagnostic", again, &report)
	if report.Kind != "full" || report.Items[0].Message != "x = 2" {
		t.Errorf("after an edit: %+v", report)
	}
	c.notify("textDocument/didClose", object{"textDocument": textDocument(path)})
	c.call("shutdown", nil, nil)
	if n := c.count("textDocument/publishDiagnostics"); n != 0 {
		t.Errorf("%d pushes to a client that pulls", n)
	}
}

// A pull that an edit overtakes is told to come again (-32802 with
// retriggerRequest, as the protocol's pull model has it).
func TestAnEditOvertakesAPull(t *testing.T) {
	began, gate := make(chan struct{}, 10), make(chan struct{})
	slow := lint.Rule{Name: "slow", Severity: finding.Hint, Scope: lint.OfDocument, Need: lint.Text, Run: func(*lint.Inquiry) {
		began <- struct{}{}
		<-gate
	}}
	c := serving(t, realClock, slow)
	path := filepath.Join(c.begin(object{"textDocument": object{"diagnostic": object{}}}, nil), "a.analysis.toml")
	c.open(path, 1, "x = 1")
	pull := c.ask("textDocument/diagnostic", object{"textDocument": textDocument(path)})
	<-began
	c.edit(path, 2, object{"text": "x = 2"})
	c.call("textDocument/hover", object{"textDocument": textDocument("/other.toml"), "position": position(0, 0)}, nil)
	close(gate)
	m := c.answer(pull)
	if m.Error == nil || m.Error.Code != -32802 || !strings.Contains(string(m.Error.Data), `"retriggerRequest":true`) {
		t.Errorf("%+v, want -32802 with retriggerRequest", m.Error)
	}
}

func TestDiagnosticsCarryRuleSourceAndFingerprint(t *testing.T) {
	c := serving(t, realClock, marks)
	path := filepath.Join(c.begin(object{}, nil), "a.analysis.toml")
	c.open(path, 1, "mark")
	d := c.findings(path, ofVersion(1)).Diagnostics[0]
	if d.Code != "marks" || d.Source != "lagwise" || d.Severity != 2 || d.Data.Fingerprint == "" {
		t.Errorf("%+v", d)
	}
}

func TestDocumentsOfOtherKindsAreLeftAlone(t *testing.T) {
	c := serving(t, realClock, mirror)
	dir := c.begin(object{}, nil)
	for _, u := range []string{fileURI(filepath.Join(dir, "Cargo.toml")), "untitled:Untitled-1", "git:/x.analysis.toml?ref", "::"} {
		c.notify("textDocument/didOpen", object{"textDocument": object{"uri": u, "languageId": "toml", "version": 1, "text": "x"}})
		c.notify("textDocument/didChange", object{"textDocument": object{"uri": u, "version": 2}, "contentChanges": []object{{"text": "y"}}})
		if m := c.answer(c.ask("textDocument/hover", object{"textDocument": object{"uri": u}, "position": position(0, 0)})); m.Error != nil || string(m.Result) != "null" {
			t.Errorf("hover in %s: %s %v", u, m.Result, m.Error)
		}
	}
	path := filepath.Join(dir, "a b.analysis.toml")
	c.open(path, 1, "x")
	c.findings(path, ofVersion(1))
	if n := c.count("textDocument/publishDiagnostics"); n != 0 {
		t.Errorf("%d pushes about other documents", n)
	}
	if log := c.log.String(); log != "" {
		t.Errorf("logged: %s", log)
	}
}

// A client that does not read must not keep the server from following it.
func TestAClientThatDoesNotRead(t *testing.T) {
	e := engine.New(engine.Options{Rules: []lint.Rule{mirror}})
	c := deaf(t, func(in io.Reader, out io.Writer, logged *lockedBuffer) int {
		return serve(context.Background(), in, out, Options{Engine: e, Log: logged}, realClock)
	})
	c.ask("initialize", object{"processId": nil, "rootUri": nil, "capabilities": object{}})
	if _, err := readMessage(c.out); err != nil {
		t.Fatal(err)
	}
	sent := make(chan struct{})
	go func() {
		defer close(sent)
		for v := range 5000 {
			c.open("/estuary/a.analysis.toml", v, "x = 1")
		}
	}()
	select {
	case <-sent:
	case <-time.After(deadline):
		t.Fatal("the server stopped reading")
	}
	go c.read()
	c.findings("/estuary/a.analysis.toml", ofVersion(4999))
}
