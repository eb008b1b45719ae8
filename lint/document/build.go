package document

import (
	"errors"

	"github.com/pelletier/go-toml/v2/unstable"
)

// pair adds a whole "key = value" to the current table and returns its end.
func (b *builder) pair(e *unstable.Node, comment Span) int {
	at := b.span(e.Raw)
	whole := Span{at.Start, max(at.End, comment.End)}
	keys := b.keys(e.Key())
	s := statement{at: whole, table: b.table, names: b.names, tables: b.tables, keys: keys}
	value, err := b.value(e.Value(), keys[len(keys)-1].At.End, 1)
	var u *unfit
	if errors.As(err, &u) {
		b.unfit(at, u)
		s.form = brokenPair
		b.tree.statements = append(b.tree.statements, s)
		return whole.End
	}
	s.value = value
	b.tree.statements = append(b.tree.statements, s)
	b.define(b.table, keys, value, at, comment)
	b.table.last = whole.End
	if b.table != b.tree.Root {
		b.table.At.End = at.End
	}
	return whole.End
}

// define puts a value under a dotted key of a table, or tells why it cannot.
func (b *builder) define(table *Node, keys []Key, value *Node, at, comment Span) {
	for _, k := range keys[:len(keys)-1] {
		m := table.Get(k.Text)
		switch {
		case m == nil:
			m = &Member{Key: k, Statement: at, Value: &Node{Kind: Table, At: k.At, origin: byDotted}}
			if table.origin == bracketed || table.origin == byDottedInside {
				m.Value.origin = byDottedInside
			}
			table.add(m)
		case m.Value.Kind != Table || m.Value.origin != byDotted && m.Value.origin != byDottedInside:
			b.problem(k.At, b.cannotExtend(m))
			return
		}
		table = m.Value
		table.last = max(at.End, comment.End)
	}
	k := keys[len(keys)-1]
	if m := table.Get(k.Text); m != nil {
		b.problem(k.At, b.defined(m))
		return
	}
	table.add(&Member{Key: k, Value: value, Statement: at, Comment: comment})
}

// header opens the table of [t] or [[t]] and returns the end of its line.
func (b *builder) header(e *unstable.Node, comment Span) int {
	keys := b.keys(e.Key())
	many := e.Kind == unstable.ArrayTable
	at := b.headerSpan(keys, many)
	end := max(at.End, comment.End)

	table := &Node{Kind: Table, At: at, Header: at}
	tables := b.openTable(keys, table, many, comment)
	if tables == nil { // told; what follows stands in a table that nothing reads
		tables = []*Node{b.tree.Root, table}
	} else {
		table = tables[len(tables)-1]
	}
	names := make([]string, len(keys))
	for i, k := range keys {
		names[i] = k.Text
	}
	b.enter(table, names, tables)
	b.open = false
	b.tree.statements = append(b.tree.statements, statement{at: Span{at.Start, end}, table: table, names: names,
		tables: tables, keys: keys, header: at, form: headerForm})
	return end
}

// headerSpan finds the brackets around a header's keys: only blanks stand
// between.
func (b *builder) headerSpan(keys []Key, many bool) Span {
	start, end := keys[0].At.Start-1, keys[len(keys)-1].At.End
	for b.text[start] != '[' {
		start--
	}
	for b.text[end] != ']' {
		end++
	}
	if many {
		return Span{start - 1, end + 2}
	}
	return Span{start, end + 1}
}

// openTable puts a header's table in its place and returns the nodes from the
// root to it, or nil after a problem.
func (b *builder) openTable(keys []Key, table *Node, many bool, comment Span) []*Node {
	at := b.tree.Root
	tables := []*Node{at}
	for _, k := range keys[:len(keys)-1] {
		m := at.Get(k.Text)
		if m == nil {
			m = &Member{Key: k, Statement: table.Header, Value: &Node{Kind: Table, At: k.At, origin: implied}}
			at.add(m)
		}
		switch {
		case m.Value.Kind == Table:
			at = m.Value
		case m.Value.Kind == TableArray:
			at = m.Value.Items[len(m.Value.Items)-1]
		default:
			b.problem(k.At, b.cannotExtend(m))
			return nil
		}
		tables = append(tables, at)
	}
	k := keys[len(keys)-1]
	m := at.Get(k.Text)
	switch {
	case m == nil:
		value := table
		if many {
			value = &Node{Kind: TableArray, At: table.At, Items: []*Node{table}}
		}
		at.add(&Member{Key: k, Value: value, Statement: table.Header, Comment: comment})
	case many && m.Value.Kind == TableArray:
		m.Value.Items = append(m.Value.Items, table)
		m.Value.At.End = table.At.End
	case !many && m.Value.Kind == Table && m.Value.origin == implied:
		m.Key, m.Statement, m.Comment = k, table.Header, comment
		m.Value.At, m.Value.Header, m.Value.origin = table.At, table.Header, byHeader
		table = m.Value
	default:
		b.problem(k.At, b.defined(m))
		return nil
	}
	return append(tables, table)
}
