package document

import (
	"bytes"
	"strings"
)

// recover tells a broken statement and returns where the next one begins.
func (b *builder) recover(start int, err error) int {
	at, message := b.errorAt(err)
	sweep := &sweep{text: b.text, at: start, errorAt: at.Start, unclosed: -1}
	next := b.resume(sweep)
	whole := Span{start, b.trim(start, next)}
	b.tree.Comments = append(b.tree.Comments, sweep.comments...)
	if b.leftover(whole) {
		return next
	}
	line := lineAt(b.text, start)
	s := statement{at: whole, table: b.table, names: b.names, tables: b.tables, form: brokenPair}
	if len(sweep.brackets) > 0 {
		b.open, s.until = true, next
	}
	if line[0] == '[' && bytes.IndexByte(line, ',') < 0 {
		table := &Node{Kind: Table, At: whole, Header: whole}
		b.enter(table, nil, []*Node{b.tree.Root, table})
		s.table, s.names, s.tables, s.header, s.form = table, nil, b.tables, whole, brokenHeader
		s.keys, _ = keysOf(b.text, start+openers(line), start+len(line))
	} else {
		s.keys, _ = keysOf(b.text, start, start+len(line))
	}
	b.tree.statements = append(b.tree.statements, s)
	p := b.describe(s, sweep, at, message)
	b.problem(p.At, p.Message)
	return next
}

// resume is where a statement begins after a broken one. What the parser has
// read beyond it is read again; a budget on that keeps the whole linear, at
// the price of a few statements when a text is built to exhaust it.
func (b *builder) resume(s *sweep) int {
	header := b.text[s.at] == '['
	for {
		s.line(header)
		if s.at >= len(b.text) {
			return len(b.text)
		}
		again := max(0, s.errorAt-s.at)
		if b.reread+again <= 4*len(b.text)+1<<16 && s.begins() {
			b.reread += again
			return s.at
		}
	}
}

// leftover reports whether a broken statement is no more than the rest of an
// earlier one that left brackets open: items, or the closing brackets, which
// end that.
func (b *builder) leftover(at Span) bool {
	line := bytes.Trim(lineAt(b.text, at.Start), " \t\r")
	if !b.open || pairLike(line) || bytes.HasPrefix(line, []byte("[[")) {
		return false
	}
	if len(bytes.Trim(line, "]}, ")) == 0 {
		b.open = false
		return true
	}
	first, last := line[0], line[len(line)-1]
	return first == '"' || first == '\'' || first == '{' || last == ','
}

// trim takes the line ends and blanks off the end of a broken statement.
func (b *builder) trim(start, end int) int {
	for end > start+1 && strings.IndexByte(" \t\r\n", b.text[end-1]) >= 0 {
		end--
	}
	return end
}
