package document

import (
	"fmt"
	"io/fs"
	"strings"
	"testing"
	"time"

	tomltest "github.com/toml-lang/toml-test/v2"
)

// The documents are those of the toml-test suite (github.com/toml-lang/toml-test
// v2.2.0), which the authors of the TOML specification keep. The expected
// values are its tagged JSON.
func suite(t testing.TB, prefix string, versions ...string) map[string][]byte {
	t.Helper()
	cases := tomltest.TestCases()
	found := map[string][]byte{}
	for _, version := range versions {
		list, err := fs.ReadFile(cases, "files-toml-"+version)
		if err != nil {
			t.Fatal(err)
		}
		for name := range strings.FieldsSeq(string(list)) {
			if strings.HasPrefix(name, prefix) && strings.HasSuffix(name, ".toml") {
				text, err := fs.ReadFile(cases, name)
				if err != nil {
					t.Fatal(err)
				}
				found[name] = text
			}
		}
	}
	return found
}

func TestValidDocumentsOfTheSuite(t *testing.T) {
	texts := suite(t, "valid/", "1.0.0", "1.1.0")
	if len(texts) < 200 {
		t.Fatalf("only %d documents", len(texts))
	}
	for name, text := range texts {
		tree := Parse(text)
		if !tree.Valid() {
			t.Errorf("%s: %s", name, problems(tree))
			continue
		}
		test := tomltest.Test{Path: strings.TrimSuffix(name, ".toml")}
		want, err := test.ReadWantJSON(tomltest.TestCases())
		if err != nil {
			t.Fatal(err)
		}
		if r := test.CompareJSON(want, tagged(tree.Root)); r.Failed() {
			t.Errorf("%s: %s", name, r.Failure)
		}
		checkSpans(t, name, tree)
	}
}

// tagged writes a value as the suite's JSON does.
func tagged(n *Node) any {
	scalar := func(kind, value string) any { return map[string]any{"type": kind, "value": value} }
	switch n.Kind {
	case Table, InlineTable:
		out := map[string]any{}
		for _, m := range n.Members {
			out[m.Key.Text] = tagged(m.Value)
		}
		return out
	case Array, TableArray:
		out := []any{}
		for _, item := range n.Items {
			out = append(out, tagged(item))
		}
		return out
	case String:
		return scalar("string", n.Value.(string))
	case Integer:
		return scalar("integer", fmt.Sprint(n.Value))
	case Float:
		return scalar("float", strings.TrimPrefix(strings.ToLower(fmt.Sprint(n.Value)), "+"))
	case Boolean:
		return scalar("bool", fmt.Sprint(n.Value))
	case OffsetDateTime:
		return scalar("datetime", n.Value.(time.Time).Format(time.RFC3339Nano))
	case LocalDateTime:
		return scalar("datetime-local", seconds(upperTime(n.Value.(string))))
	case LocalDate:
		return scalar("date-local", n.Value.(string))
	}
	return scalar("time-local", seconds(n.Value.(string)))
}

// seconds adds the seconds that TOML 1.1 lets one leave out.
func seconds(s string) string {
	if strings.Count(s, ":") == 1 {
		return s + ":00"
	}
	return s
}

// checkSpans cuts every value out of the text and reads it again: it must be
// the same kind and fill its span.
func checkSpans(t *testing.T, name string, tree *Tree) {
	t.Helper()
	visit(tree.Root, func(m *Member, n *Node) {
		if m != nil {
			raw := tree.Raw(m.Key.At)
			again := Parse([]byte(raw + " = 1"))
			if again.Root.Get(m.Key.Text) == nil {
				t.Errorf("%s: key %q is written %q", name, m.Key.Text, raw)
			}
		}
		if n.Kind == TableArray || n.Kind == Table {
			raw := tree.Raw(n.Header)
			if n.Kind == Table && raw != "" && (raw[0] != '[' || raw[len(raw)-1] != ']') {
				t.Errorf("%s: header %q", name, raw)
			}
			return
		}
		raw := tree.Raw(n.At)
		again := Parse([]byte("x = " + raw))
		m = again.Root.Get("x")
		if m == nil || m.Value.Kind != n.Kind || m.Value.At != (Span{4, 4 + len(raw)}) {
			t.Errorf("%s: %v at %v reads %q", name, n.Kind, n.At, raw)
		}
	})
}

func visit(n *Node, f func(*Member, *Node)) {
	for _, m := range n.Members {
		f(m, m.Value)
		visit(m.Value, f)
	}
	for _, item := range n.Items {
		f(nil, item)
		visit(item, f)
	}
}

func TestInvalidDocumentsOfTheSuite(t *testing.T) {
	texts := suite(t, "invalid/", "1.1.0")
	if len(texts) < 300 {
		t.Fatalf("only %d documents", len(texts))
	}
	for name, text := range texts {
		tree := Parse(text)
		if tree.Valid() {
			t.Errorf("%s passes:\n%s", name, text)
		}
		for _, p := range tree.Problems {
			if p.At.Start < 0 || p.At.End > len(text) || p.At.Empty() && len(text) > 0 || p.Message == "" {
				t.Errorf("%s: problem %+v", name, p)
			}
		}
		around := "zz-before = 1\n" + string(text) + "\n\n[zz-after]\nzz = 2\n"
		tree = Parse([]byte(around))
		if before := tree.Root.Get("zz-before"); before == nil {
			t.Errorf("%s: what stands before is lost", name)
		}
		if after := tree.Root.Get("zz-after"); after == nil || after.Value.Get("zz") == nil {
			t.Errorf("%s: what stands after is lost:\n%s\n%s", name, text, problems(tree))
		}
	}
}
