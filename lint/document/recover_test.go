package document

import (
	"fmt"
	"strings"
	"testing"
)

// outline writes what was read: "table.key=raw" of every leaf.
func outline(t *Tree) []string {
	var out []string
	var walk func(prefix string, n *Node)
	walk = func(prefix string, n *Node) {
		for _, m := range n.Members {
			name := prefix + m.Key.Text
			switch m.Value.Kind {
			case Table:
				if !m.Value.Header.Empty() {
					out = append(out, "["+name+"]")
				}
				walk(name+".", m.Value)
			case TableArray:
				for i, e := range m.Value.Items {
					entry := fmt.Sprintf("%s%d", name, i)
					out = append(out, "["+entry+"]")
					walk(entry+".", e)
				}
			default:
				out = append(out, name+"="+t.Raw(m.Value.At))
			}
		}
	}
	walk("", t.Root)
	return out
}

func problems(t *Tree) string {
	var b strings.Builder
	for _, p := range t.Problems {
		fmt.Fprintf(&b, "%d-%d %q: %s\n", p.At.Start, p.At.End, t.Raw(p.At), p.Message)
	}
	return b.String()
}

// The example of the design: seven good statements, six errors.
func TestBrokenStatementsCostOnlyThemselves(t *testing.T) {
	text := "a = \nb = 2\nc = [1, 2\nd = 3\n[t\ne = 4\nf = \"x\ng = '''unterminated\nh = 5\n[ok]\ni = tru\nj = 6"
	tree := Parse([]byte(text))
	if got := strings.Join(outline(tree), " "); got != "b=2 d=3 [ok] ok.j=6" {
		t.Errorf("read %s", got)
	}
	if len(tree.Problems) != 6 {
		t.Errorf("%d problems:\n%s", len(tree.Problems), problems(tree))
	}
	p := tree.At(strings.Index(text, "h = 5"))
	if p.Names != nil || p.Table() == tree.Root || p.Table().Get("e") == nil || p.Table().Get("h") == nil {
		t.Errorf("e and h should stand in an unknown table: %+v", p)
	}
	t.Log("\n" + problems(tree))
}
