package server

import (
	"bufio"
	"fmt"
	"os/exec"
	"path/filepath"
	"slices"
	"strings"
	"sync"
	"testing"
	"time"
)

// BenchmarkTyping types into one of 200 requests over 50 series of 1,000 rows
// and reads the complete findings after every key, through the pipes of the
// built program. One operation is one key:
//
//	go test ./server -run '^$' -bench Typing -benchtime 200x
func BenchmarkTyping(b *testing.B) {
	program := filepath.Join(b.TempDir(), "lagwise")
	if out, err := exec.Command("go", "build", "-o", program, "lagwise/cmd/lagwise").CombinedOutput(); err != nil {
		b.Fatalf("building the program: %v\n%s", err, out)
	}
	c := process(b, program)
	dir := c.begin(object{"textDocument": object{"diagnostic": object{}}}, manySeries(50, 1000))
	text := manyRequests(200, 50)
	path := filepath.Join(dir, "many.analysis.toml")
	c.open(path, 0, text)
	began := time.Now()
	c.call("textDocument/diagnostic", object{"textDocument": textDocument(path)}, nil)
	b.ReportMetric(float64(time.Since(began))/1e6, "ms-cold")

	// The question of the request in the middle.
	line := strings.Count(text[:strings.Index(text, "name = \"r100\"")], "\n") + 1
	var took []time.Duration
	version := 0
	for b.Loop() {
		began := time.Now()
		version++
		c.edit(path, version, replace(line, 12+version-1, line, 12+version-1, "x"))
		c.call("textDocument/diagnostic", object{"textDocument": textDocument(path)}, nil)
		took = append(took, time.Since(began))
	}
	slices.Sort(took)
	b.ReportMetric(float64(took[len(took)/2])/1e6, "ms-median")
	b.ReportMetric(float64(took[len(took)*99/100])/1e6, "ms-p99")
}

// process connects a client to a program's standard input and output.
func process(t testing.TB, program string) *client {
	cmd := exec.Command(program, "attend", "--stdio")
	in, err := cmd.StdinPipe()
	if err != nil {
		t.Fatal(err)
	}
	out, err := cmd.StdoutPipe()
	if err != nil {
		t.Fatal(err)
	}
	c := &client{t: t, in: in, out: bufio.NewReader(out), log: &lockedBuffer{}, answers: map[string]message{}}
	c.changed = sync.NewCond(&c.mu)
	cmd.Stderr = c.log
	if err := cmd.Start(); err != nil {
		t.Fatal(err)
	}
	go c.read()
	t.Cleanup(func() {
		in.Close()
		cmd.Wait()
	})
	return c
}

// manySeries is a manifest without declared series and its data: AR(1)
// series, s0, s1, ….
func manySeries(series, rows int) map[string]string {
	var csv strings.Builder
	csv.WriteString("day")
	for i := range series {
		fmt.Fprintf(&csv, ",s%d", i)
	}
	values := make([]float64, series)
	state := uint64(7)
	for row := range rows {
		csv.WriteString("\n" + time.Date(2018, 1, 1+row, 0, 0, 0, 0, time.UTC).Format(time.DateOnly))
		for i := range values {
			state = state*6364136223846793005 + 1442695040888963407
			values[i] = 0.5*values[i] + float64(state>>40)/(1<<24) - 0.5
			fmt.Fprintf(&csv, ",%.4f", values[i])
		}
	}
	return map[string]string{"many.csv": csv.String() + "\n",
		"many.series.toml": "[record.many]\nfile = \"many.csv\"\nalong = { column = \"day\", kind = \"time\", step = \"P1D\" }\n"}
}

// manyRequests correlates one series with another, again and again.
func manyRequests(requests, series int) string {
	var text strings.Builder
	for i := range requests {
		fmt.Fprintf(&text, "[[correlation]]\nname = \"r%d\"\nquestion = \"\"\naim = \"association\"\nbetween = [\"s%d\", \"s%d\"]\n\n",
			i, i%series, (i+1+i/series)%series)
	}
	return text.String()
}
