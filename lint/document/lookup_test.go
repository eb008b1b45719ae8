package document

import (
	"fmt"
	"strings"
	"testing"
)

// Each text holds a cursor, |.
func TestAt(t *testing.T) {
	for _, c := range []struct{ text, want string }{
		{"|", "[] blank"},
		{"tit|le = 1", "[] key title"},
		{"title =| 1", "[] value title"},
		{"title = |1", "[] value title 1"},
		{"title = 1|", "[] value title 1"},
		{"title = 1 # n|ote", "[] comment title"},
		{"title = 1\n|\n[a]\n", "[] blank"},
		{"[a|]\nb = 1", "[a] header a"},
		{"[a]\n|\n", "[a] blank"},
		{"[a]\n\n# no|te\n", "[a] comment"},
		{"[[c]]\nx = 1\n[[c]]\nx = |2", "[c] value x 2"},
		{"[a.b]\nc.d = { e = [1, \"f|\"] }", "[a b] value c.d.e \"f\""},
		{"[a.b]\nc.d = { e = 1, f| = 2 }", "[a b] value c.d.f 2"},
		{"be|", "[] key be broken"},
		{"[[c]]\nbe|\nx = 1", "[c] key be broken"},
		{"[[c]]\nbetween =|\nx = 1", "[c] value between broken"},
		{"[[c]]\nbetween = |\nx = 1", "[c] value between broken"},
		{"[[c]]\nbetween = [|\nx = 1", "[c] value between broken"},
		{"[[c]]\nbetween = [\"a\", |\nx = 1", "[c] value between broken"},
		{"[[c]]\nbetween = [\"a\", \"b|\nx = 1", "[c] value between broken"},
		{"[[c]]\nbetween = [\n  \"a\",\n  |\n[d]\nx = 1", "[c] value between broken"},
		{"[[c]]\ny = 2\n[[corr|\nx = 1", "[] header corr broken"},
		{"[[corr\nx = |1", "[] value x 1"},
		{"a = 1\na = |2", "[] value 2"},
		{"a = \"x # no|t\"", "[] value a \"x # not\""},
	} {
		at := strings.IndexByte(c.text, '|')
		tree := Parse([]byte(c.text[:at] + c.text[at+1:]))
		if got := describePath(tree, tree.At(at)); got != c.want {
			t.Errorf("%q: %s, want %s", c.text, got, c.want)
		}
	}
}

func describePath(t *Tree, p Path) string {
	part := [...]string{"blank", "header", "key", "value", "comment"}[p.In]
	var keys []string
	for _, m := range p.Members {
		keys = append(keys, m.Key.Text)
	}
	if len(p.Members) == 0 && (p.In == InHeader || p.Broken) {
		for _, k := range p.Keys {
			keys = append(keys, k.Text)
		}
	}
	out := fmt.Sprintf("%v %s %s", p.Names, part, strings.Join(keys, "."))
	out = strings.TrimRight(out, " ")
	if p.Value != nil {
		out += " " + t.Raw(p.Value.At)
	}
	if p.Broken {
		out += " broken"
	}
	return out
}

// Entries of an array of tables are known by place.
func TestAtTellsEntriesApart(t *testing.T) {
	text := "[[c]]\nx = 1\n[[c]]\nx = 1\n[[c.d]]\ny = 1\n"
	tree := Parse([]byte(text))
	entries := tree.Root.Get("c").Value.Items
	first, second, below := tree.At(10), tree.At(20), tree.At(len(text)-3)
	if first.Table() != entries[0] || second.Table() != entries[1] {
		t.Error("the entries are mixed up")
	}
	if len(below.Tables) != 3 || below.Tables[1] != entries[1] || below.Table() != entries[1].Get("d").Value.Items[0] {
		t.Errorf("tables %v", below.Tables)
	}
}

func TestAttempted(t *testing.T) {
	tree := Parse([]byte("[[c]]\nbetween =\n[[c]]\nname = 99999999999999999999\n"))
	entries := tree.Root.Get("c").Value.Items
	if !tree.Attempted(entries[0], "between") || tree.Attempted(entries[1], "between") || !tree.Attempted(entries[1], "name") {
		t.Error("a broken line belongs to the entry in which it stands")
	}
}

func TestAtAnyOffset(t *testing.T) {
	for _, text := range []string{typical, "[[corr\nx = 1\n[a\n b = [\n c = {\n", "\xef\xbb\xbfa = 1\r\n[t]\r\n"} {
		tree := Parse([]byte(text))
		for at := -1; at <= len(text)+1; at++ {
			if p := tree.At(at); len(p.Tables) == 0 || p.Tables[0] != tree.Root {
				t.Fatalf("%d: %+v", at, p)
			}
		}
	}
}
