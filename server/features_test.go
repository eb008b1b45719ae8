package server

import (
	"context"
	"encoding/json"
	"fmt"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/engine"
	"lagwise/lint/finding"
)

const shoreManifest = `[record.shore]
file = "shore.csv"
along = { column = "year", kind = "time", step = "P1Y" }

[series.eelgrass]
unit = "ha"

[series.boats]
unit = "{count}"
`

const shoreAnalysis = `title = "The shore"

[[correlation]]
name = "eelgrass-boats"
aim = "association"
between = ["eelgrass", "boats"]
`

// shore is a folder with two series that drift apart: random walks with
// opposite drift, as in Granger and Newbold (1974).
func shore() map[string]string {
	state := uint64(20)
	step := func() float64 { // a sum of twelve uniforms is close to normal
		sum := -6.0
		for range 12 {
			state = state*6364136223846793005 + 1442695040888963407
			sum += float64(state>>40) / (1 << 24)
		}
		return sum
	}
	var rows strings.Builder
	rows.WriteString("year,eelgrass,boats\n")
	eelgrass, boats := 400.0, 100.0
	for year := 1940; year < 2021; year++ {
		fmt.Fprintf(&rows, "%d,%.2f,%.2f\n", year, eelgrass, boats)
		eelgrass += 4*step() - 2
		boats += 4*step() + 2
	}
	return map[string]string{"shore.csv": rows.String(), "shore.series.toml": shoreManifest, "shore.analysis.toml": shoreAnalysis}
}

// levels is a rule about data that speaks of every request on levels.
var levels = lint.Rule{Name: "levels", Severity: finding.Error, Scope: lint.OfRequest, Need: lint.Data, Mendable: true,
	Run: func(q *lint.Inquiry) {
		if len(q.Request.On) == 0 {
			q.Report(finding.Finding{At: q.Request.Key("between"), Pairs: q.Request.Pairs(), Message: "On levels."})
		}
	}}

// Findings of a request under judgement stay where they are, moved with the
// text; they never disappear and come back.
func TestFindingsDoNotFlicker(t *testing.T) {
	gate := make(chan struct{}, 100)
	slow := levels
	slow.Run = func(q *lint.Inquiry) { <-gate; levels.Run(q) }
	c := serving(t, realClock, slow)
	path := filepath.Join(c.begin(object{}, shore()), "shore.analysis.toml")
	gate <- struct{}{}
	c.open(path, 1, shoreAnalysis)
	c.findings(path, func(p published) bool { return p.says("levels") != "" })
	c.edit(path, 2, replace(0, 0, 0, 0, "\n"), replace(5, 19, 5, 19, " # for now"))
	p := c.findings(path, ofVersion(2))
	if p.says("levels") == "" || p.Diagnostics[0].Range.Start.Line != 6 {
		t.Errorf("while the request is judged again: %+v, want its finding one line down", p.Diagnostics)
	}
	gate <- struct{}{}
	c.edit(path, 3, replace(6, 24, 6, 24, ", \"eelgrass\""))
	if p := c.findings(path, ofVersion(3)); p.says("levels") != "" {
		t.Errorf("a finding whose own text was edited is still told: %+v", p.Diagnostics)
	}
	close(gate)
}

func TestMovedBy(t *testing.T) {
	for _, m := range []struct {
		before, after string
		at, want      [2]int
		kept          bool
	}{
		{"abcdef", "abcdef", [2]int{2, 4}, [2]int{2, 4}, true},
		{"abcdef", "abXcdef", [2]int{0, 2}, [2]int{0, 2}, true},
		{"abcdef", "abXcdef", [2]int{2, 4}, [2]int{3, 5}, true},
		{"abcdef", "abef", [2]int{4, 6}, [2]int{2, 4}, true},
		{"abcdef", "abef", [2]int{3, 5}, [2]int{}, false},
		{"abcdef", "abXdef", [2]int{2, 3}, [2]int{}, false},
		{"aaaa", "aaaaa", [2]int{0, 2}, [2]int{0, 2}, true},
		{"", "x", [2]int{0, 0}, [2]int{0, 0}, true},
	} {
		got, kept := movedBy([]byte(m.before), []byte(m.after))(document.Span{Start: m.at[0], End: m.at[1]})
		if kept != m.kept || kept && got != (document.Span{Start: m.want[0], End: m.want[1]}) {
			t.Errorf("%q to %q: %v is at %v, %v; want %v, %v", m.before, m.after, m.at, got, kept, m.want, m.kept)
		}
	}
}

// Without a client that watches, a changed, new or vanished file is found by
// looking, every two seconds.
func TestAChangedFileIsFoundByLooking(t *testing.T) {
	hand := &byHand{}
	c, made := servingSession(t, hand.clock(), levels)
	dir := c.begin(object{}, shore())
	s := made()
	path := filepath.Join(dir, "shore.analysis.toml")
	c.open(path, 1, shoreAnalysis)
	c.findings(path, func(p published) bool { return p.says("levels") != "" })
	c.call("textDocument/hover", object{"textDocument": textDocument(path), "position": position(0, 0)}, nil)
	hand.await(t, pollEvery) // the files were looked at a first time
	looked := func() bool {
		before := s.workspace.Edition()
		hand.pass(pollEvery)
		hand.pass(burst)
		return s.workspace.Edition() != before
	}
	if looked() {
		t.Error("a change was seen where there is none")
	}
	later := time.Now()
	for _, change := range []func(){
		func() { writeFile(t, filepath.Join(dir, "shore.csv"), "year,eelgrass,boats\n1990,1,2\n") },
		func() { writeFile(t, filepath.Join(dir, "shore.series.toml"), "# changed\n"+shoreManifest) },
		func() { os.Remove(filepath.Join(dir, "shore.csv")) },
		func() { writeFile(t, filepath.Join(dir, "lab.conventions.toml"), "") },
	} {
		change()
		// The clock of the file system may be too coarse to tell two changes
		// of this test apart.
		later = later.Add(time.Second)
		if err := os.Chtimes(dir, later, later); err != nil {
			t.Fatal(err)
		}
		if !looked() {
			t.Error("a change was not seen")
		}
	}
}

// Changes of one burst are acted on together, and once.
func TestABurstOfChangesIsOneChange(t *testing.T) {
	hand := &byHand{}
	c, made := servingSession(t, hand.clock(), levels)
	path := filepath.Join(c.begin(object{}, shore()), "shore.analysis.toml")
	s := made()
	c.open(path, 1, shoreAnalysis)
	changed := func() {
		c.notify("workspace/didChangeWatchedFiles", object{"changes": []object{{"uri": fileURI(filepath.Join(filepath.Dir(path), "shore.csv")), "type": 2}}})
		c.call("textDocument/hover", object{"textDocument": textDocument(path), "position": position(0, 0)}, nil)
	}
	c.findings(path, ofVersion(1))
	before := s.workspace.Edition()
	changed()
	hand.pass(burst - 1)
	changed()
	if s.workspace.Edition() != before {
		t.Error("acted on before the burst was over")
	}
	hand.pass(1)
	after := s.workspace.Edition()
	if after == before {
		t.Error("not acted on")
	}
	hand.pass(burst)
	if s.workspace.Edition() != after {
		t.Error("acted on twice")
	}
}

// A client that watches is asked to watch every file that is reached, by name.
func TestTheClientWatchesWhatIsReached(t *testing.T) {
	c := serving(t, realClock, mirror)
	watching := object{"workspace": object{"didChangeWatchedFiles": object{"dynamicRegistration": true}}}
	dir := c.begin(watching, shore())
	path := filepath.Join(dir, "shore.analysis.toml")
	c.open(path, 1, shoreAnalysis)
	wanted := map[string]bool{"**/shore.csv": true, "**/*.series.toml": true, "**/*.conventions.toml": true}
	c.hear("client/registerCapability", func(params json.RawMessage) bool {
		var p struct {
			Registrations []struct {
				Method          string
				RegisterOptions struct {
					Watchers []struct{ GlobPattern string }
				}
			}
		}
		if err := json.Unmarshal(params, &p); err != nil {
			t.Error(err)
		}
		for _, r := range p.Registrations {
			for _, w := range r.RegisterOptions.Watchers {
				delete(wanted, w.GlobPattern)
			}
		}
		return len(wanted) == 0
	})
}

// What the proofs need is not begun before the keys have rested for 300 ms.
func TestProofsWaitForTheKeysToRest(t *testing.T) {
	judged := make(chan struct{}, 100)
	counting := lint.Rule{Name: "counting", Severity: finding.Hint, Scope: lint.OfDocument, Need: lint.Text, Run: func(*lint.Inquiry) { judged <- struct{}{} }}
	hand := &byHand{}
	c := serving(t, hand.clock(), mirror, counting)
	path := filepath.Join(c.begin(object{"textDocument": object{"diagnostic": object{}}}, shore()), "shore.analysis.toml")
	c.open(path, 1, shoreAnalysis)
	c.call("textDocument/hover", object{"textDocument": textDocument(path), "position": position(0, 0)}, nil)
	for v := 2; v < 6; v++ {
		hand.pass(quiet - 1)
		c.edit(path, v, object{"text": shoreAnalysis})
		c.call("textDocument/hover", object{"textDocument": textDocument(path), "position": position(0, 0)}, nil)
	}
	if len(judged) != 0 {
		t.Errorf("judged %d times while the keys were moving", len(judged))
	}
	hand.pass(quiet)
	<-judged
}

// Work over half a second is shown where the client can show it, and ends
// when the client cancels it.
func TestLongWorkIsShownAndCancelled(t *testing.T) {
	began := make(chan struct{})
	hand := &byHand{}
	c, made := servingSession(t, hand.clock())
	c.begin(object{"window": object{"workDoneProgress": true}}, nil)
	s := made()
	ended := make(chan error)
	go func() {
		_, err := working(context.Background(), s, nil, "Reading", func(ctx context.Context) (int, error) {
			close(began)
			<-ctx.Done()
			return 0, ctx.Err()
		})
		ended <- err
	}()
	<-began
	hand.pass(patience)
	c.hear("window/workDoneProgress/create", nil)
	var begun struct {
		Token string
		Value struct {
			Kind, Title string
			Cancellable bool
		}
	}
	if err := json.Unmarshal(c.hear("$/progress", nil).Params, &begun); err != nil {
		t.Fatal(err)
	}
	if begun.Value.Kind != "begin" || begun.Value.Title != "Reading" || !begun.Value.Cancellable {
		t.Errorf("%+v", begun)
	}
	c.notify("window/workDoneProgress/cancel", object{"token": begun.Token})
	if err := <-ended; err != context.Canceled {
		t.Errorf("cancelled work ended with %v", err)
	}
	c.hear("$/progress", func(params json.RawMessage) bool { return strings.Contains(string(params), `"end"`) })
}

func TestKeysAreExplained(t *testing.T) {
	for _, markdown := range []bool{false, true} {
		c := serving(t, realClock)
		capabilities := object{}
		if markdown {
			capabilities = object{"textDocument": object{"hover": object{"contentFormat": []string{"markdown", "plaintext"}}}}
		}
		path := filepath.Join(c.begin(capabilities, nil), "a.analysis.toml")
		c.open(path, 1, "manifests = [\"é😀\"]\ntitle = 1\n")
		var hover struct {
			Contents struct{ Kind, Value string }
			Range    struct{ Start, End struct{ Line, Character int } }
		}
		c.call("textDocument/hover", object{"textDocument": textDocument(path), "position": position(1, 2)}, &hover)
		kind := map[bool]string{false: "plaintext", true: "markdown"}[markdown]
		if hover.Contents.Kind != kind || !strings.Contains(hover.Contents.Value, "What the analysis is about") {
			t.Errorf("%+v", hover)
		}
		if hover.Range.Start.Line != 1 || hover.Range.End.Character != 5 {
			t.Errorf("the key is at %+v", hover.Range)
		}
	}
}

func TestTheServerEndsWithItsParent(t *testing.T) {
	hand := &byHand{}
	e := engine.New(engine.Options{})
	c := connect(t, func(in io.Reader, out io.Writer, logged *lockedBuffer) int {
		return serve(context.Background(), in, out, Options{Engine: e, Log: logged, ParentPID: os.Getpid()}, hand.clock())
	})
	c.begin(object{}, nil)
	hand.pass(parentEvery)
	c.call("textDocument/hover", object{"textDocument": textDocument("/x.analysis.toml"), "position": position(0, 0)}, nil)
	child := exec.Command(os.Args[0], "-test.run=^$")
	if err := child.Run(); err != nil {
		t.Fatal(err)
	}
	gone := child.Process.Pid
	c = connect(t, func(in io.Reader, out io.Writer, logged *lockedBuffer) int {
		return serve(context.Background(), in, out, Options{Engine: e, Log: logged}, hand.clock())
	})
	c.call("initialize", object{"processId": gone, "rootUri": nil, "capabilities": object{}}, nil)
	hand.pass(parentEvery)
	if got := c.ended(); got != 1 {
		t.Errorf("exit status %d, want 1", got)
	}
}
