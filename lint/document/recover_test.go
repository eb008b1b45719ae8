package document

import (
	"fmt"
	"slices"
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
}

const typical = `# Aldermere estuary
title = "What drives eelgrass decline"   # a question

[[correlation]]
name = "eelgrass-boats"
  between = ["eelgrass", "boats"]
on-each = { boats = ["log"] }

# the second
[[correlation]]
name = "eelgrass-nitrate"
given = [
  "rain",   # mm
  # none
  "wind",
]
until = 2020-06-30

[[correlation.deviation]]
from = "short-record"
reason = """
pilot = series
"""

[[regression]]
response = "eelgrass"
`

// Half-typed text at any place of a typical document: everything else is kept.
// After a header that cannot be read, the keys up to the next header are in an
// unknown table; inside a value, that statement is lost.
func TestHalfTypedTextCostsNothingElse(t *testing.T) {
	whole := Parse([]byte(typical))
	if !whole.Valid() {
		t.Fatal(problems(whole))
	}
	for _, typed := range []string{"be", "be tween", "between =", "between = [", `between = ["a", `, `between = ["a`, `between = "a`,
		"between = {", "between = { series = ", "between = tru", "between = 2020-13-01", "=", "]", "a.", "a.b", "a. = 1", `"`, "'", "\x00", "\xff",
		"[[corr", "[", "[[", "[a.", "[a b]", `["corr`, "[[correlation]", "[correlation]]", "[]"} {
		for at := 0; at <= len(typical); at++ {
			if at > 0 && typical[at-1] != '\n' {
				continue
			}
			text := typical[:at] + typed + "\n" + typical[at:]
			tree := Parse([]byte(text))
			if inside(whole, at) && strings.Contains(typical[at:], `"""`) && strings.Contains(typical[:at], `"""`) {
				if !tree.Valid() && typed[0] >= ' ' && typed[0] < 0x7f {
					t.Errorf("%q in a string at %d: %s", typed, at, problems(tree))
				}
				continue
			}
			got, want, limit := outline(tree), kept(whole, typed, at), 1
			if inside(whole, at) { // what was typed may well be read as part of the value, or take its end
				limit = 3
				got = slices.DeleteFunc(got, func(line string) bool { return !slices.Contains(want, line) })
			}
			if !slices.Equal(got, want) {
				t.Errorf("%q at %d: got\n%s\nwant\n%s\n%s", typed, at, strings.Join(got, "\n"), strings.Join(want, "\n"), problems(tree))
			}
			if got, want := comments(tree), comments(whole); got != want {
				t.Errorf("%q at %d: comments %s", typed, at, got)
			}
			if len(tree.Problems) > limit || limit == 1 && tree.Valid() {
				t.Errorf("%q at %d: %d problems:\n%s", typed, at, len(tree.Problems), problems(tree))
			}
		}
	}
}

// inside reports whether an offset lies within a value over several lines.
func inside(whole *Tree, at int) bool {
	for _, s := range whole.statements {
		if s.at.Start < at && at < s.at.End {
			return true
		}
	}
	return false
}

// kept is the outline without what a half-typed line at an offset may cost.
func kept(whole *Tree, typed string, at int) []string {
	until := at
	if typed[0] == '[' {
		until = len(whole.Text)
		for _, s := range whole.statements {
			if s.form == headerForm && s.at.Start >= at {
				until = s.at.Start
				break
			}
		}
	}
	lost := map[string]int{}
	for _, s := range whole.statements {
		within := s.at.Start < at && at < s.at.End
		after := s.at.Start >= at && s.at.Start < until
		if s.form == pairForm && (within || after) {
			lost[whole.Raw(s.value.At)]++
		}
	}
	var out []string
	for _, line := range outline(whole) {
		_, raw, _ := strings.Cut(line, "=")
		if lost[raw] > 0 && !strings.HasPrefix(line, "[") {
			lost[raw]--
			continue
		}
		out = append(out, line)
	}
	return out
}

func comments(t *Tree) string {
	var out []string
	for _, c := range t.Comments {
		out = append(out, t.Raw(c))
	}
	return strings.Join(out, "|")
}
