package request

import (
	"fmt"
	"slices"
	"sort"

	"lagwise/lint/document"
)

// checker goes over a tree with the schema in hand. What it finds wrong it
// remembers by node, so that binding leaves it out.
type checker struct {
	tree     *document.Tree
	request  string // name of the request being checked, for its problems
	problems []Problem
	bad      map[*document.Node]bool
	headers  []int // where every table begins, in order: bounds a table's own text
}

func newChecker(tree *document.Tree) *checker {
	c := &checker{tree: tree, bad: map[*document.Node]bool{}}
	for _, p := range tree.Problems {
		c.add(Problem{Rule: "unreadable-document", At: p.At, Message: p.Message})
	}
	c.headers = headersBelow(tree.Root, nil)
	slices.Sort(c.headers)
	return c
}

func headersBelow(n *document.Node, starts []int) []int {
	if n == nil {
		return starts
	}
	if !n.Header.Empty() {
		starts = append(starts, n.Header.Start)
	}
	for _, m := range n.Members {
		starts = headersBelow(m.Value, starts)
	}
	if n.Kind == document.TableArray {
		for _, item := range n.Items {
			starts = headersBelow(item, starts)
		}
	}
	return starts
}

func (c *checker) add(p Problem) {
	if p.Request == "" {
		p.Request = c.request
	}
	c.problems = append(c.problems, p)
}

// wrong reports a value that is not allowed and leaves it out of binding.
func (c *checker) wrong(n *document.Node, format string, args ...any) {
	c.bad[n] = true
	c.add(Problem{Rule: "wrong-value", At: placeOf(n), Message: fmt.Sprintf(format, args...)})
}

// wrongWord is wrong with the nearest of the allowed words offered.
func (c *checker) wrongWord(n *document.Node, word string, allowed []string, message string) {
	c.bad[n] = true
	p := Problem{Rule: "wrong-value", At: placeOf(n), Message: message}
	if near := Nearest(word, allowed); near != "" {
		p.Message += fmt.Sprintf(" The nearest is %q.", near)
		p.Nearest = &document.Edit{At: n.At, Text: document.Quote(near)}
	}
	c.add(p)
}

// placeOf is the tight place of a node: its header where it has one.
func placeOf(n *document.Node) document.Span {
	if !n.Header.Empty() {
		return n.Header
	}
	if n.Kind == document.TableArray && len(n.Items) > 0 {
		return placeOf(n.Items[0])
	}
	return n.At
}

// table checks every key of a table. at is where what is absent is told.
func (c *checker) table(n *document.Node, table string, at document.Span) {
	for _, m := range n.Members {
		k, ok := Lookup(table, m.Key.Text)
		if !ok {
			c.stray(n, table, m)
			continue
		}
		if m.Value != nil {
			c.value(k, m.Value)
		}
	}
	for _, k := range schemaTables[table] {
		if k.Required && n.Get(k.Name) == nil && !c.broken(n) {
			c.add(Problem{Rule: "absent-field", At: at,
				Message: fmt.Sprintf("%s needs %s, for example %s.", capital(heading(table)), k.Name, k.Example)})
		}
	}
}

// stray reports a key that may not stand in its table.
func (c *checker) stray(n *document.Node, table string, m *document.Member) {
	p := Problem{Rule: "stray-key", At: m.Key.At,
		Message: fmt.Sprintf("%s is not a key of %s.", shown(m.Key.Text), heading(table))}
	var free []string // keys that are still free here
	for _, k := range schemaTables[table] {
		if n.Get(k.Name) == nil {
			free = append(free, k.Name)
		}
	}
	switch near := Nearest(m.Key.Text, free); {
	case near != "":
		p.Message += fmt.Sprintf(" The nearest is %s.", near)
		p.Nearest = &document.Edit{At: m.Key.At, Text: near}
	case table == "regression" && (m.Key.Text == "lag" || m.Key.Text == "lags"):
		p.Message += ` The lag of a regression stands with its predictor: { series = "rain", lag = 1 }.`
	default:
		if home := homeOf(m.Key.Text, table); home != "" {
			p.Message += fmt.Sprintf(" It belongs to %s.", home)
		}
	}
	c.add(p)
}

// homeOf names the table of the same kind of document that knows a key.
func homeOf(key, table string) string {
	for _, doc := range []Doc{ManifestDoc, AnalysisDoc, ConventionsDoc} {
		tables := tablesUnder(doc.String())
		if !slices.Contains(tables, table) {
			continue
		}
		for _, t := range tables {
			if _, ok := schemaIndex[[2]string{t, key}]; ok {
				return heading(t)
			}
		}
	}
	return ""
}

// tablesUnder lists a root table and all that stand in it.
func tablesUnder(root string) []string {
	tables := []string{root}
	for i := 0; i < len(tables); i++ {
		for _, k := range schemaTables[tables[i]] {
			if k.Sub != "" && !slices.Contains(tables, k.Sub) {
				tables = append(tables, k.Sub)
			}
		}
	}
	return tables
}

// broken reports whether the text of a table itself cannot be read: what
// seems absent then may be what is broken.
func (c *checker) broken(n *document.Node) bool {
	start, end := n.At.Start, n.At.End
	if n.Kind != document.InlineTable {
		end = len(c.tree.Text)
		if i, _ := slices.BinarySearch(c.headers, start+1); i < len(c.headers) {
			end = c.headers[i]
		}
	}
	problems := c.tree.Problems // by place
	i := sort.Search(len(problems), func(i int) bool { return problems[i].At.Start >= start })
	return i < len(problems) && problems[i].At.Start <= end
}

func capital(s string) string {
	if s == "" || s[0] < 'a' || s[0] > 'z' {
		return s
	}
	return string(s[0]-'a'+'A') + s[1:]
}
