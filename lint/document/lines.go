package document

import (
	"sort"
	"unicode/utf8"
)

// Encoding is the unit in which an editor counts the characters of a line.
type Encoding uint8

// The position encodings of the language server protocol.
const (
	UTF16 Encoding = iota
	UTF8
	UTF32
)

// Lines converts between byte offsets and positions of one text. Lines end at
// LF, CRLF or CR, as the language server protocol defines. A byte that is not
// UTF-8 counts as one character.
type Lines struct {
	text   []byte
	starts []int  // of every line
	plain  []bool // the line is ASCII: a byte is a character in any encoding
}

// NewLines indexes a text once; conversions then cost a binary search and, in
// lines that are not ASCII, a walk along the line.
func NewLines(text []byte) *Lines {
	l := &Lines{text: text, starts: []int{0}}
	plain := true
	for i, c := range text {
		if c >= utf8.RuneSelf {
			plain = false
		}
		crlf := c == '\r' && i+1 < len(text) && text[i+1] == '\n'
		if c == '\n' || c == '\r' && !crlf {
			l.starts, l.plain = append(l.starts, i+1), append(l.plain, plain)
			plain = true
		}
	}
	l.plain = append(l.plain, plain)
	return l
}

// Count is the number of lines; an empty text has one.
func (l *Lines) Count() int { return len(l.starts) }

// Line is the span of a line without its line end; the line is clamped.
func (l *Lines) Line(line int) Span {
	line = max(0, min(line, len(l.starts)-1))
	s := Span{l.starts[line], len(l.text)}
	if line+1 < len(l.starts) {
		s.End = l.starts[line+1] - 1
		if s.End > s.Start && l.text[s.End] == '\n' && l.text[s.End-1] == '\r' {
			s.End--
		}
	}
	return s
}

// Position is the place of a byte offset, in UTF-16 units.
func (l *Lines) Position(offset int) Position { return l.PositionIn(offset, UTF16) }

// PositionIn is the place of a byte offset. Offsets outside the text are
// clamped; one inside a line end is the end of that line, and one inside a
// character is its start.
func (l *Lines) PositionIn(offset int, enc Encoding) Position {
	offset = max(0, min(offset, len(l.text)))
	line := sort.SearchInts(l.starts, offset+1) - 1
	s := l.Line(line)
	offset = min(offset, s.End)
	if l.plain[line] {
		return Position{Line: line, Character: offset - s.Start}
	}
	n := 0
	for i := s.Start; i < offset; {
		r, size := utf8.DecodeRune(l.text[i:s.End])
		if i+size > offset {
			break
		}
		n += units(r, size, enc)
		i += size
	}
	return Position{Line: line, Character: n}
}

// Offset is the byte offset of a position in UTF-16 units, clamped.
func (l *Lines) Offset(p Position) int {
	offset, _ := l.OffsetIn(p, UTF16)
	return offset
}

// OffsetIn is the byte offset of a position. It is clamped to the text and to
// the line, and to the start of a character; false says that it had to be.
func (l *Lines) OffsetIn(p Position, enc Encoding) (int, bool) {
	switch {
	case p.Line < 0:
		return 0, false
	case p.Line >= len(l.starts):
		return len(l.text), false
	}
	s := l.Line(p.Line)
	if p.Character < 0 {
		return s.Start, false
	}
	if l.plain[p.Line] {
		if p.Character > s.End-s.Start {
			return s.End, false
		}
		return s.Start + p.Character, true
	}
	n, i := 0, s.Start
	for i < s.End && n < p.Character {
		r, size := utf8.DecodeRune(l.text[i:s.End])
		if n+units(r, size, enc) > p.Character {
			return i, false
		}
		n += units(r, size, enc)
		i += size
	}
	return i, n == p.Character
}

// Range is the range of a span, in UTF-16 units.
func (l *Lines) Range(s Span) Range { return l.RangeIn(s, UTF16) }

// RangeIn is the range of a span.
func (l *Lines) RangeIn(s Span, enc Encoding) Range {
	return Range{Start: l.PositionIn(s.Start, enc), End: l.PositionIn(max(s.Start, s.End), enc)}
}

// units is the length of a character in an encoding.
func units(r rune, size int, enc Encoding) int {
	switch {
	case enc == UTF8:
		return size
	case enc == UTF16 && r >= 0x10000:
		return 2
	}
	return 1
}
