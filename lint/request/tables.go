package request

import (
	"fmt"

	"lagwise/lint/document"
)

// namedTables checks [record.NAME] and the like.
func (c *checker) namedTables(k Key, n *document.Node) {
	if !n.IsTable() {
		c.wrong(n, "%s takes tables by name: write [%s.NAME].", k.Name, k.Name)
		return
	}
	for _, m := range n.Members {
		if m.Value == nil {
			continue
		}
		if !m.Value.IsTable() {
			c.wrong(m.Value, "%s is a table: write [%s.%s], once.", shown(m.Key.Text), k.Name, m.Key.Text)
			continue
		}
		c.table(m.Value, k.Sub, headOf(m))
	}
}

// tableList checks [[correlation]] and the like. One table where a list of
// them belongs is told, and read as the list of one.
func (c *checker) tableList(k Key, n *document.Node) {
	switch {
	case n.IsTable() && !n.Header.Empty():
		at := n.Header
		c.add(Problem{Rule: "wrong-value", At: at,
			Message: fmt.Sprintf("%s is a list of tables: write it in double brackets.", k.Name),
			Nearest: &document.Edit{At: at, Text: "[" + c.tree.Raw(at) + "]"}})
	case n.IsTable():
		c.add(Problem{Rule: "wrong-value", At: placeOf(n),
			Message: fmt.Sprintf("%s is a list of tables: write [[%s]], or %s.", k.Name, k.Name, k.Example)})
	case !isList(n):
		c.wrong(n, "%s is a list of tables: write [[%s]], or %s.", k.Name, k.Name, k.Example)
		return
	}
	for _, item := range tablesIn(n) {
		if !item.IsTable() {
			c.wrong(item, "Each entry of %s is a table, for example %s.", k.Name, k.Example)
			continue
		}
		// Requests are checked by their binder, which knows their names.
		if k.Table != AnalysisDoc.String() {
			c.table(item, k.Sub, placeOf(item))
		}
	}
}

// tablesIn lists the entries of a list of tables; one table is the list of
// itself.
func tablesIn(n *document.Node) []*document.Node {
	if n == nil {
		return nil
	}
	if n.IsTable() {
		return []*document.Node{n}
	}
	return n.Items
}

// headOf is where what a named table lacks is told: its header, else its
// name.
func headOf(m *document.Member) document.Span {
	if !m.Value.Header.Empty() {
		return m.Value.Header
	}
	return m.Key.At
}
