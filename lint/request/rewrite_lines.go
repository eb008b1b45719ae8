package request

import (
	"bytes"
	"slices"
	"strings"

	"lagwise/lint/document"
)

// replaceRemoved puts new keys on the lines of keys that go, as long as there
// are both.
func (w *rewriter) replaceRemoved() {
	var left []*document.Member
	for _, m := range w.removed {
		if len(w.inserts) == 0 || m.Value.Kind == document.Table || m.Value.Kind == document.TableArray {
			left = append(left, m)
			continue
		}
		pair := w.inserts[0]
		w.inserts = w.inserts[1:]
		w.edits = append(w.edits, document.Edit{At: m.Statement, Text: quoteKey(pair[0]) + " = " + pair[1]})
	}
	w.removed = left
}

// insert adds the keys that are left as one edit.
func (w *rewriter) insert() {
	var whole *document.Edit
	for _, pair := range w.inserts {
		for _, e := range w.t.Set(w.table, pair[0], pair[1]) {
			if whole == nil {
				whole = &e
			} else {
				whole.Text += e.Text
			}
		}
	}
	switch {
	case whole != nil:
		w.edits = append(w.edits, *whole)
	case len(w.inserts) > 0:
		w.stuck = true
	}
}

// remove takes out the keys that are left.
func (w *rewriter) remove() {
	if w.table.Kind == document.InlineTable {
		w.removeInline()
		return
	}
	for _, m := range w.removed {
		w.removeMember(w.table, m)
	}
}

func (w *rewriter) removeMember(table *document.Node, m *document.Member) {
	v := m.Value
	switch {
	case v.Kind == document.TableArray:
		for _, item := range v.Items {
			w.removeBlock(item)
		}
	case v.Kind == document.Table && !v.Header.Empty():
		w.removeBlock(v)
	case v.Kind == document.Table: // dotted keys, or headers below
		for _, inner := range v.Members {
			w.removeMember(v, inner)
		}
	default:
		edits := w.t.Remove(table, m.Key.Text)
		w.stuck = w.stuck || len(edits) == 0
		w.edits = append(w.edits, edits...)
	}
}

// removeBlock takes out the lines of a table with a header, and of the tables
// below it.
func (w *rewriter) removeBlock(n *document.Node) {
	text := w.t.Text
	start := bytes.LastIndexByte(text[:n.Header.Start], '\n') + 1
	end := max(n.At.End, n.Header.End)
	if i := bytes.IndexByte(text[end:], '\n'); i >= 0 {
		end += i + 1
	} else {
		end = len(text)
	}
	w.edits = append(w.edits, document.Edit{At: document.Span{Start: start, End: end}})
	for _, m := range n.Members {
		if v := m.Value; v.Kind == document.TableArray || v.Kind == document.Table && !v.Header.Empty() {
			w.removeMember(n, m)
		}
	}
}

// removeInline takes members out of an inline table, a run of them with the
// commas that they leave over.
func (w *rewriter) removeInline() {
	all := w.table.Members
	gone := func(i int) bool { return i < len(all) && slices.Contains(w.removed, all[i]) }
	for i := 0; i < len(all); i++ {
		if !gone(i) {
			continue
		}
		first := i
		for gone(i + 1) {
			i++
		}
		span := document.Span{Start: all[first].Statement.Start, End: all[i].Statement.End}
		if i+1 < len(all) {
			span.End = all[i+1].Statement.Start
		} else if first > 0 {
			span.Start = all[first-1].Statement.End
		}
		w.edits = append(w.edits, document.Edit{At: span})
	}
}

// renameKind changes the request's header and those of the tables below it.
func (w *rewriter) renameKind() {
	if w.table.Header.Empty() {
		w.stuck = true
		return
	}
	for _, head := range headersOf(w.table, nil) {
		if slices.ContainsFunc(w.edits, func(e document.Edit) bool { return e.At.Start <= head.Start && head.End <= e.At.End }) {
			continue
		}
		was := w.asked.Kind.String()
		i := strings.Index(w.t.Raw(head), was)
		if i < 0 {
			w.stuck = true
			return
		}
		at := document.Span{Start: head.Start + i, End: head.Start + i + len(was)}
		w.edits = append(w.edits, document.Edit{At: at, Text: w.to.Kind.String()})
	}
}

func headersOf(n *document.Node, heads []document.Span) []document.Span {
	if n == nil {
		return heads
	}
	if !n.Header.Empty() {
		heads = append(heads, n.Header)
	}
	for _, m := range n.Members {
		heads = headersOf(m.Value, heads)
	}
	for _, item := range n.Items {
		heads = headersOf(item, heads)
	}
	return heads
}

// differing makes the edits and lists the keys in which the request that then
// stands there differs from the wanted one. What does not parse differs in
// every key.
func (w *rewriter) differing(edits []document.Edit) []string {
	all := requestKeys(w.to.Kind, w.asked.Kind)
	text, err := document.Apply(w.t.Text, edits)
	if err != nil {
		return all
	}
	tree := document.Parse(text)
	if len(tree.Problems) > len(w.t.Problems) {
		return all
	}
	bound, _ := BindAnalysisUnder(w.asked.File, tree, w.asked.under...)
	if w.asked.Index >= len(bound.Requests) {
		return all
	}
	now := bound.Requests[w.asked.Index]
	if now.Kind != w.to.Kind {
		return all
	}
	return Changed(&now.Request, w.to)
}
