package document

import (
	"bytes"
	"sort"
)

// wholeLine widens a span to its lines if nothing but blanks stands beside it.
func (t *Tree) wholeLine(s Span) Span {
	start, end := lineStart(t.Text, s.Start), s.End+len(lineAt(t.Text, s.End))
	if bytes.HasPrefix(t.Text[start:], []byte("\xef\xbb\xbf")) {
		start += bomLength(t.Text)
	}
	if skipBlanks(t.Text, start, s.Start) < s.Start || skipBlanks(t.Text, s.End, end) < end {
		return s
	}
	return Span{start, nextLine(t.Text, end)}
}

// removeInline takes a member out of an inline table with the comma behind it,
// or, if it is the last, the comma before it. Comments stay.
func (t *Tree) removeInline(m *Member) []Edit {
	at := m.Statement
	if comma := t.commaAfter(at.End); comma >= 0 {
		if t.commentIn(Span{at.End, comma}) {
			return []Edit{{At: at}, {At: Span{comma, comma + 1}}}
		}
		gap := Span{at.Start, comma + 1}
		if line := t.wholeLine(gap); line != gap {
			return []Edit{{At: line}}
		}
		return []Edit{{At: Span{at.Start, skipBlanks(t.Text, gap.End, len(t.Text))}}}
	}
	comma := t.commaBefore(at.Start)
	switch {
	case comma < 0:
		return []Edit{{At: at}}
	case t.commentIn(Span{comma, at.Start}):
		return []Edit{{At: Span{comma, comma + 1}}, {At: at}}
	}
	return []Edit{{At: Span{comma, at.End}}}
}

// commaAfter is the next comma behind blanks and comments, or -1.
func (t *Tree) commaAfter(i int) int {
	for ; i < len(t.Text); i++ {
		switch t.Text[i] {
		case ' ', '\t', '\r', '\n':
		case '#':
			i += len(lineAt(t.Text, i)) - 1
		case ',':
			return i
		default:
			return -1
		}
	}
	return -1
}

// commaBefore is the last comma before blanks and comments, or -1.
func (t *Tree) commaBefore(i int) int {
	for i > 0 {
		switch n := t.commentsUpTo(i); {
		case n > 0 && t.Comments[n-1].End == i:
			i = t.Comments[n-1].Start
		case t.Text[i-1] == ',':
			return i - 1
		case bytes.IndexByte([]byte(" \t\r\n"), t.Text[i-1]) < 0:
			return -1
		default:
			i--
		}
	}
	return -1
}

// commentsUpTo is the number of comments that begin before an offset.
func (t *Tree) commentsUpTo(offset int) int {
	return sort.Search(len(t.Comments), func(i int) bool { return t.Comments[i].Start >= offset })
}

func (t *Tree) commentIn(s Span) bool { return t.commentsUpTo(s.Start) < t.commentsUpTo(s.End) }
