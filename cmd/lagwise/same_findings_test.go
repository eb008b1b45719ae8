package main

import (
	"bufio"
	"bytes"
	"context"
	"encoding/json"
	"fmt"
	"io"
	"net/textproto"
	"os"
	"path/filepath"
	"strconv"
	"testing"
)

// The language server and review are two drivers of one engine: after all
// proofs they say the same of the same bytes, to the byte in the JSON form.
func TestEditorAndBatchSayTheSame(t *testing.T) {
	demo, err := filepath.Abs("../../testdata/estuary")
	if err != nil {
		t.Fatal(err)
	}
	var review struct{ Findings []json.RawMessage }
	decode(t, commandOutput(t, "review", "--as", "json", demo), &review)
	said := map[string][]string{}
	for _, f := range review.Findings {
		var where struct{ File string }
		decode(t, f, &where)
		said[filepath.Base(where.File)] = append(said[filepath.Base(where.File)], compact(t, f))
	}
	documents, err := filepath.Glob(filepath.Join(demo, "*", "*.toml"))
	if err != nil || len(documents) < 5 {
		t.Fatalf("%d documents, %v", len(documents), err)
	}
	c := attending(t, demo)
	for i, path := range documents {
		text, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		uri := "file://" + path
		c.send(t, "", "textDocument/didOpen", map[string]any{"textDocument": map[string]any{"uri": uri, "languageId": "toml", "version": 1, "text": string(text)}})
		var served []json.RawMessage
		decode(t, c.ask(t, i+10, "lagwise/findings", map[string]any{"textDocument": map[string]any{"uri": uri}}), &served)
		want := said[filepath.Base(path)]
		if len(served) != len(want) {
			t.Errorf("%s: %d findings in the editor, %d in batch", filepath.Base(path), len(served), len(want))
			continue
		}
		for k := range served {
			if got := compact(t, served[k]); got != want[k] {
				t.Errorf("%s, finding %d:\neditor %s\nbatch  %s", filepath.Base(path), k, got, want[k])
			}
		}
	}
}

func compact(t *testing.T, text []byte) string {
	var b bytes.Buffer
	if err := json.Compact(&b, text); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

// speaker is a client of the server that reads nothing but answers.
type speaker struct {
	in  io.Writer
	out *bufio.Reader
}

// attending starts `lagwise attend` on a folder.
func attending(t *testing.T, folder string) *speaker {
	serverIn, in := io.Pipe()
	out, serverOut := io.Pipe()
	go run(context.Background(), streams{serverIn, serverOut, io.Discard}, []string{"attend", "--stdio"})
	t.Cleanup(func() { in.Close(); out.Close() })
	c := &speaker{in, bufio.NewReader(out)}
	c.ask(t, 1, "initialize", map[string]any{"processId": nil, "rootUri": "file://" + folder, "capabilities": map[string]any{}})
	c.send(t, "", "initialized", map[string]any{})
	return c
}

func (c *speaker) send(t *testing.T, id, method string, params any) {
	body, err := json.Marshal(params)
	if err != nil {
		t.Fatal(err)
	}
	message := fmt.Sprintf(`{"jsonrpc":"2.0",%s"method":%q,"params":%s}`, id, method, body)
	if _, err := fmt.Fprintf(c.in, "Content-Length: %d\r\n\r\n%s", len(message), message); err != nil {
		t.Fatal(err)
	}
}

// ask sends a request and waits for its answer; what the server says
// meanwhile is passed over.
func (c *speaker) ask(t *testing.T, id int, method string, params any) []byte {
	c.send(t, fmt.Sprintf(`"id":%d,`, id), method, params)
	for {
		header, err := textproto.NewReader(c.out).ReadMIMEHeader()
		if err != nil {
			t.Fatal(err)
		}
		n, _ := strconv.Atoi(header.Get("Content-Length"))
		body := make([]byte, n)
		if _, err := io.ReadFull(c.out, body); err != nil {
			t.Fatal(err)
		}
		var m struct {
			ID     *int
			Method string
			Result json.RawMessage
			Error  json.RawMessage
		}
		decode(t, body, &m)
		if m.Method == "" && m.ID != nil && *m.ID == id {
			if m.Error != nil {
				t.Fatalf("%s: %s", method, m.Error)
			}
			return m.Result
		}
	}
}
