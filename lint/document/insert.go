package document

import "bytes"

// insertLine adds a line after a table's last own statement.
func (t *Tree) insertLine(table *Node, pair string) Edit {
	eol := t.lineEnd()
	switch {
	case table.last > 0:
		if table.origin == byDotted {
			pair = t.prefix(table) + pair
		}
		return t.after(table.last, t.indent(table.last), pair, eol)
	case table == t.Root:
		return t.first(pair, eol)
	}
	return t.after(table.Header.End, t.indent(table.Header.Start), pair, eol)
}

// after adds a line behind the one that holds the offset.
func (t *Tree) after(offset int, indent, pair, eol string) Edit {
	end := offset + len(lineAt(t.Text, offset))
	return Edit{At: Span{end, end}, Text: eol + indent + pair}
}

// first adds a line where the top level has none: at the start of the text, or
// behind the comment lines there if a blank line sets them apart.
func (t *Tree) first(pair, eol string) Edit {
	start := bomLength(t.Text)
	at := start
	for at < len(t.Text) && t.Text[at] == '#' {
		at = nextLine(t.Text, at)
	}
	if apart := len(bytes.Trim(lineAt(t.Text, at), " \t")) == 0; at > start && at < len(t.Text) && apart {
		at = nextLine(t.Text, at)
	} else {
		at = start
	}
	if len(t.Text) > at {
		pair += eol
	}
	return Edit{At: Span{at, at}, Text: pair}
}

// lineEnd is the line end of the text's first line, LF if it has none.
func (t *Tree) lineEnd() string {
	if i := bytes.IndexByte(t.Text, '\n'); i > 0 && t.Text[i-1] == '\r' {
		return "\r\n"
	}
	return "\n"
}

// indent is the blanks before the statement that holds the offset.
func (t *Tree) indent(offset int) string {
	p := t.At(offset)
	start := lineStart(t.Text, p.Statement.Start)
	return string(t.Text[start:skipBlanks(t.Text, start, p.Statement.Start)])
}

// prefix is what stands before the keys of a table that dotted keys made.
func (t *Tree) prefix(table *Node) string {
	m := table.Members[0]
	return t.Raw(Span{m.Statement.Start, m.Key.At.Start})
}

// insertInline adds a member to an inline table.
func (t *Tree) insertInline(table *Node, pair string) Edit {
	if n := len(table.Members); n > 0 {
		end := table.Members[n-1].Statement.End
		return Edit{At: Span{end, end}, Text: ", " + pair}
	}
	return Edit{At: Span{table.At.Start + 1, table.At.End - 1}, Text: " " + pair + " "}
}
