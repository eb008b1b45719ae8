package document

import (
	"fmt"
	"strings"
)

// Apply makes the edits; every other byte is kept. The edits must be sorted,
// must not overlap and must lie in the text, else it is an error and the text
// is not touched.
func Apply(text []byte, edits []Edit) ([]byte, error) {
	size, last := len(text), 0
	for i, e := range edits {
		if e.At.Start < last || e.At.End < e.At.Start || e.At.End > len(text) {
			return nil, fmt.Errorf("edit %d (bytes %d to %d) overlaps another, is out of order or lies outside of the text of %d bytes",
				i, e.At.Start, e.At.End, len(text))
		}
		size, last = size+len(e.Text)-(e.At.End-e.At.Start), e.At.End
	}
	out := make([]byte, 0, size)
	last = 0
	for _, e := range edits {
		out = append(out, text[last:e.At.Start]...)
		out = append(out, e.Text...)
		last = e.At.End
	}
	return append(out, text[last:]...), nil
}

// Set writes "key = value" into a table; value is TOML. A value that is there
// is replaced and nothing else. A new key comes after the last statement of
// that very table (before sub-tables and array entries that follow), or right
// after its header, with the neighbours' indentation and the file's line end.
// It returns nil where there is no such place: the key is a table with a
// header, or the table is only implied by longer headers.
func (t *Tree) Set(table *Node, key, value string) []Edit {
	if t.unreadable {
		return nil
	}
	if m := table.Get(key); m != nil {
		if m.Value.Kind == Table || m.Value.Kind == TableArray {
			return nil
		}
		return []Edit{{At: m.Value.At, Text: value}}
	}
	pair := keyText(key) + " = " + value
	switch {
	case table.Kind == InlineTable:
		return []Edit{t.insertInline(table, pair)}
	case table.Kind != Table || table.origin == implied, table.origin == byDottedInside:
		return nil
	}
	return []Edit{t.insertLine(table, pair)}
}

// Remove takes a key out of a table: with its whole line and the comment that
// trails it if it stands alone there, from an inline table with its comma. It
// returns nil if the key is not there or is a table with a header.
func (t *Tree) Remove(table *Node, key string) []Edit {
	m := table.Get(key)
	switch {
	case m == nil, m.Value.Kind == Table, m.Value.Kind == TableArray:
		return nil
	case table.origin == byDottedInside:
		return nil
	case table.Kind == InlineTable:
		return t.removeInline(m)
	}
	return []Edit{{At: t.wholeLine(Span{m.Statement.Start, max(m.Statement.End, m.Comment.End)})}}
}

// Quote writes a TOML basic string.
func Quote(s string) string {
	var b strings.Builder
	b.WriteByte('"')
	for _, r := range s {
		switch {
		case r == '"' || r == '\\':
			b.WriteByte('\\')
			b.WriteRune(r)
		case r == '\n':
			b.WriteString(`\n`)
		case r == '\r':
			b.WriteString(`\r`)
		case r == '\t':
			b.WriteString(`\t`)
		case r < 0x20 || r == 0x7f:
			fmt.Fprintf(&b, `\u%04X`, r)
		default:
			b.WriteRune(r)
		}
	}
	b.WriteByte('"')
	return b.String()
}

// keyText writes a key bare if it can be.
func keyText(key string) string {
	for i := range len(key) {
		if !bareByte(key[i]) {
			return Quote(key)
		}
	}
	if key == "" {
		return `""`
	}
	return key
}
