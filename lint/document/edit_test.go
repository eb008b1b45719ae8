package document

import (
	"bytes"
	"slices"
	"strings"
	"testing"
)

func edited(t *testing.T, text string, edits []Edit) string {
	t.Helper()
	out, err := Apply([]byte(text), edits)
	if err != nil {
		t.Fatal(err)
	}
	return string(out)
}

// table follows a path of keys; an array of tables gives its first entry.
func table(tree *Tree, path ...string) *Node {
	n := tree.Root
	for _, k := range path {
		n = n.Get(k).Value
		if n.Kind == TableArray {
			n = n.Items[0]
		}
	}
	return n
}

func TestSet(t *testing.T) {
	for name, c := range map[string]struct {
		text string
		path []string
		want string
	}{
		"replaces the value alone":    {"on  =  \"levels\"  # as measured\nb = 2\n", nil, "on  =  [\"log\"]  # as measured\nb = 2\n"},
		"replaces over lines":         {"on = [\n \"a\", # x\n]\nb = 2", nil, "on = [\"log\"]\nb = 2"},
		"after the last statement":    {"[c]\na = 1\n\n[d]\n", []string{"c"}, "[c]\na = 1\non = [\"log\"]\n\n[d]\n"},
		"keeps its comment":           {"[c]\na = 1 # one\n", []string{"c"}, "[c]\na = 1 # one\non = [\"log\"]\n"},
		"after the header":            {"[c] # none\n[d]\n", []string{"c"}, "[c] # none\non = [\"log\"]\n[d]\n"},
		"before sub-tables":           {"[[c]]\na = 1\n[[c.dev]]\nb = 2\n[[c]]\na = 2\n", []string{"c"}, "[[c]]\na = 1\non = [\"log\"]\n[[c.dev]]\nb = 2\n[[c]]\na = 2\n"},
		"no final line end":           {"[c]\na = 1", []string{"c"}, "[c]\na = 1\non = [\"log\"]"},
		"no final line end, header":   {"[c]", []string{"c"}, "[c]\non = [\"log\"]"},
		"indentation of neighbours":   {"[c]\n\t a = 1\n[d]\n", []string{"c"}, "[c]\n\t a = 1\n\t on = [\"log\"]\n[d]\n"},
		"line ends of the file":       {"[c]\r\na = 1\r\n[d]\r\n", []string{"c"}, "[c]\r\na = 1\r\non = [\"log\"]\r\n[d]\r\n"},
		"top level":                   {"a = 1\n[c]\nb = 1\n", nil, "a = 1\non = [\"log\"]\n[c]\nb = 1\n"},
		"top level without any":       {"[c]\nb = 1\n", nil, "on = [\"log\"]\n[c]\nb = 1\n"},
		"top level, byte order mark":  {"\xef\xbb\xbf[c]\r\nb = 1\r\n", nil, "\xef\xbb\xbfon = [\"log\"]\r\n[c]\r\nb = 1\r\n"},
		"empty text":                  {"", nil, "on = [\"log\"]"},
		"only a comment":              {"# estuary\n", nil, "on = [\"log\"]\n# estuary\n"},
		"behind the opening comment":  {"# estuary\n# long\n\n# the first\n[c]\n", nil, "# estuary\n# long\n\non = [\"log\"]\n# the first\n[c]\n"},
		"inline table":                {"c = { a = 1 }\n", []string{"c"}, "c = { a = 1, on = [\"log\"] }\n"},
		"inline table without any":    {"c = {}\n", []string{"c"}, "c = { on = [\"log\"] }\n"},
		"inline table over lines":     {"c = {\n  a = 1, # x\n}\n", []string{"c"}, "c = {\n  a = 1, on = [\"log\"], # x\n}\n"},
		"table of dotted keys":        {"c.a = 1\nd = 1\n", []string{"c"}, "c.a = 1\nc.on = [\"log\"]\nd = 1\n"},
		"deeper table of dotted keys": {"[x]\nc.d.a = 1\n", []string{"x", "c"}, "[x]\nc.d.a = 1\nc.on = [\"log\"]\n"},
		"before a broken line":        {"[c]\na = 1\nb = [\n[d]\n", []string{"c"}, "[c]\na = 1\non = [\"log\"]\nb = [\n[d]\n"},
	} {
		tree := Parse([]byte(c.text))
		if got := edited(t, c.text, tree.Set(table(tree, c.path...), "on", `["log"]`)); got != c.want {
			t.Errorf("%s: got\n%q, want\n%q", name, got, c.want)
		}
	}
}

// A table that only longer headers imply has no place of its own, and a table
// is no value to replace.
func TestSetRefuses(t *testing.T) {
	tree := Parse([]byte("[a.b]\nx = 1\n[[c]]\n"))
	if tree.Set(table(tree, "a"), "y", "1") != nil || tree.Set(table(tree, "a"), "b", "1") != nil || tree.Set(tree.Root, "c", "1") != nil {
		t.Error("an edit that would break the document")
	}
	if tree.Remove(tree.Root, "a") != nil || tree.Remove(tree.Root, "none") != nil {
		t.Error("a removal that would break the document")
	}
}

func TestRemove(t *testing.T) {
	for name, c := range map[string]struct {
		text string
		path []string
		want string
	}{
		"whole line with its comment": {"a = 1\n  on = 1 # why\nb = 2\n", nil, "a = 1\nb = 2\n"},
		"over lines":                  {"a = 1\non = [\n 1,\n]\nb = 2\n", nil, "a = 1\nb = 2\n"},
		"last without line end":       {"a = 1\non = 1", nil, "a = 1\n"},
		"CRLF":                        {"a = 1\r\non = 1\r\nb = 2\r\n", nil, "a = 1\r\nb = 2\r\n"},
		"byte order mark":             {"\xef\xbb\xbfon = 1\nb = 2\n", nil, "\xef\xbb\xbfb = 2\n"},
		"first of an inline table":    {"c = { on = 1, a = 2 }", []string{"c"}, "c = { a = 2 }"},
		"last of an inline table":     {"c = { a = 2, on = 1 }", []string{"c"}, "c = { a = 2 }"},
		"only one of an inline table": {"c = { on = 1 }", []string{"c"}, "c = {  }"},
		"only one with its comma":     {"c = {\n  on = 1,\n}", []string{"c"}, "c = {\n}"},
		"commented inline table":      {"c = {\n  a = 1, # one\n  on = 2 # two\n}", []string{"c"}, "c = {\n  a = 1 # one\n   # two\n}"},
		"comment before the comma":    {"c = {\n  on = 2 # two\n  , a = 1 }", []string{"c"}, "c = {\n   # two\n   a = 1 }"},
		"dotted":                      {"c.on = 1\nc.a = 2\n", []string{"c"}, "c.a = 2\n"},
	} {
		tree := Parse([]byte(c.text))
		got := edited(t, c.text, tree.Remove(table(tree, c.path...), "on"))
		if got != c.want {
			t.Errorf("%s: got\n%q, want\n%q", name, got, c.want)
		}
		if again := Parse([]byte(got)); !again.Valid() {
			t.Errorf("%s: %s", name, problems(again))
		}
	}
}

func TestApplyRefusesWhatIsNotInOrder(t *testing.T) {
	for _, edits := range [][]Edit{
		{{Span{2, 3}, ""}, {Span{0, 1}, ""}}, {{Span{0, 2}, ""}, {Span{1, 3}, ""}}, {{Span{3, 2}, ""}}, {{Span{0, 9}, ""}}, {{Span{-1, 0}, ""}},
	} {
		if out, err := Apply([]byte("abcd"), edits); err == nil {
			t.Errorf("%v gave %q", edits, out)
		}
	}
	if out, err := Apply([]byte("abcd"), []Edit{{Span{1, 1}, "x"}, {Span{1, 2}, ""}, {Span{4, 4}, "!"}}); err != nil || string(out) != "axcd!" {
		t.Errorf("%q %v", out, err)
	}
}

func FuzzQuote(f *testing.F) {
	for _, s := range []string{"", "eelgrass", "a\"b\\c", "\n\r\t\x00\x7f", "é😀", "\u2028"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		want := strings.ToValidUTF8(s, "\ufffd")
		tree := Parse([]byte("x = " + Quote(s)))
		if m := tree.Root.Get("x"); m == nil || strings.ToValidUTF8(m.Value.Value.(string), "\ufffd") != want && !strings.Contains(want, "\ufffd") {
			t.Errorf("%q became %q", s, Quote(s))
		}
	})
}

// Set changes one key and no byte outside of its edit, in whole and in broken
// texts, in every table that has a place for it.
func FuzzSet(f *testing.F) {
	for _, text := range []string{typical, "", "\xef\xbb\xbf", "a = 1", "[c]\r\na.b = 1\r\n[c.d]", "x = { a.b = 1, c = {} }", "[[a]]\n[[a]]\nb = [\n[c",
		"a = 1 # x\n\n# y\n[b]\n  c = 1", "a = '''\nx\n''' # y\n[t]\n", "a = {\n b = 1, # c\n}\n[a.b]\n[a]\n[a]\n", "be\nx = tru\n[q", "a = 1\r", "# x", "#\n\r\n a.b=1"} {
		f.Add([]byte(text), "on")
		f.Add([]byte(text), "a")
		f.Add([]byte(text), "a key")
	}
	f.Fuzz(func(t *testing.T, text []byte, key string) {
		// A key with these quotes in it would end a string above that has no end.
		if len(text) > 2000 || strings.ToValidUTF8(key, "") != key || strings.Contains(key, "'''") || strings.Contains(key, `"""`) {
			return
		}
		tree := Parse(text)
		before := outline(tree)
		number := 0
		walkTables(tree.Root, func(n *Node) {
			number++
			if edits := tree.Set(n, key, `["log"]`); edits != nil {
				checkSet(t, tree, number, key, edits, before)
			}
			if edits := tree.Remove(n, key); edits != nil {
				if out, err := Apply(text, edits); err != nil || tree.Valid() && !Parse(out).Valid() {
					t.Fatalf("remove %q from %q: %q %v", key, text, out, err)
				}
			}
		})
	})
}

func checkSet(t *testing.T, tree *Tree, number int, key string, edits []Edit, before []string) {
	t.Helper()
	out, err := Apply(tree.Text, edits)
	if err != nil || len(edits) != 1 {
		t.Fatal(edits, err)
	}
	at := edits[0].At
	if !bytes.HasPrefix(out, tree.Text[:at.Start]) || !bytes.HasSuffix(out, tree.Text[at.End:]) {
		t.Fatalf("%q became %q", tree.Text, out)
	}
	after := Parse(out)
	if len(after.Problems) != len(tree.Problems) {
		t.Fatalf("%q became %q: %s", tree.Text, out, problems(after))
	}
	var n *Node
	walkTables(after.Root, func(c *Node) {
		if number--; number == 0 {
			n = c
		}
	})
	m := n.Get(key)
	if m == nil || after.Raw(m.Value.At) != `["log"]` {
		t.Fatalf("%q is not set: %q became %q", key, tree.Text, out)
	}
	// All other keys are the same: without the new value the outlines agree.
	rest := outline(after)
	if len(rest) == len(before) { // replaced
		differ := 0
		for i := range rest {
			if rest[i] != before[i] {
				differ++
			}
		}
		if differ > 1 {
			t.Fatalf("%q became %q", tree.Text, out)
		}
		return
	}
	n.Members = slices.DeleteFunc(n.Members, func(x *Member) bool { return x == m })
	if n.Kind == Table && !slices.Equal(outline(after), before) {
		t.Fatalf("%q became %q", tree.Text, out)
	}
}

// walkTables visits every table of a text in a fixed order that a new key of
// value type does not disturb.
func walkTables(n *Node, f func(*Node)) {
	if n.Kind == Table || n.Kind == InlineTable {
		f(n)
	}
	for _, m := range n.Members {
		walkTables(m.Value, f)
	}
	for _, item := range n.Items {
		walkTables(item, f)
	}
}
