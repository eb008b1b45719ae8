package document

import (
	"testing"
)

// Line ends and columns as the language server protocol 3.17 defines them
// (sections "Text Documents" and "Position"): LF, CRLF and CR end a line; "a𐐀b"
// has b at UTF-16 character 3, which is the protocol's own example.
func TestPositions(t *testing.T) {
	text := "a𐐀b\r\né\rx\n\n"
	l := NewLines([]byte(text))
	if l.Count() != 5 {
		t.Fatalf("%d lines", l.Count())
	}
	for _, c := range []struct {
		offset       int
		u16, u8, u32 Position
	}{
		{0, Position{0, 0}, Position{0, 0}, Position{0, 0}},
		{1, Position{0, 1}, Position{0, 1}, Position{0, 1}},
		{5, Position{0, 3}, Position{0, 5}, Position{0, 2}},
		{6, Position{0, 4}, Position{0, 6}, Position{0, 3}},
		{8, Position{1, 0}, Position{1, 0}, Position{1, 0}},
		{10, Position{1, 1}, Position{1, 2}, Position{1, 1}},
		{11, Position{2, 0}, Position{2, 0}, Position{2, 0}},
		{12, Position{2, 1}, Position{2, 1}, Position{2, 1}},
		{13, Position{3, 0}, Position{3, 0}, Position{3, 0}},
		{14, Position{4, 0}, Position{4, 0}, Position{4, 0}},
	} {
		for enc, want := range map[Encoding]Position{UTF16: c.u16, UTF8: c.u8, UTF32: c.u32} {
			if got := l.PositionIn(c.offset, enc); got != want {
				t.Errorf("offset %d, encoding %d: %v, want %v", c.offset, enc, got, want)
			}
			if got, ok := l.OffsetIn(want, enc); got != c.offset || !ok {
				t.Errorf("position %v, encoding %d: %d %v, want %d", want, enc, got, ok, c.offset)
			}
		}
	}
}

func TestPositionsAreClamped(t *testing.T) {
	l := NewLines([]byte("a𐐀b\r\nc"))
	for _, c := range []struct {
		at     Position
		offset int
	}{
		{Position{-1, 3}, 0}, {Position{0, -1}, 0}, {Position{0, 99}, 6}, {Position{1, 99}, 9}, {Position{9, 0}, 9},
		{Position{0, 2}, 1}, // inside of a pair of surrogates
	} {
		if got, ok := l.OffsetIn(c.at, UTF16); got != c.offset || ok {
			t.Errorf("%v: %d %v, want %d", c.at, got, ok, c.offset)
		}
		if got := l.Offset(c.at); got != c.offset {
			t.Errorf("%v: %d", c.at, got)
		}
	}
	for offset, want := range map[int]Position{-5: {0, 0}, 99: {1, 1}, 7: {0, 4}, 3: {0, 1}} {
		if got := l.Position(offset); got != want {
			t.Errorf("%d: %v, want %v", offset, got, want)
		}
	}
	if got := l.Range(Span{1, 8}); got != (Range{Position{0, 1}, Position{1, 0}}) {
		t.Errorf("range %v", got)
	}
}

func FuzzLines(f *testing.F) {
	f.Add([]byte("a𐐀b\r\né\rx\n\n"))
	f.Add([]byte("\r\r\n\n\r"))
	f.Add([]byte("\xff\xfe\xf0\x90\n"))
	f.Add([]byte{})
	f.Fuzz(func(t *testing.T, text []byte) {
		l := NewLines(text)
		for _, enc := range []Encoding{UTF8, UTF16, UTF32} {
			last := Position{}
			for offset := 0; offset <= len(text); offset++ {
				p := l.PositionIn(offset, enc)
				if p.Line < last.Line || p.Line == last.Line && p.Character < last.Character {
					t.Fatalf("position goes back at %d", offset)
				}
				last = p
				back, ok := l.OffsetIn(p, enc)
				if !ok || back > offset || l.PositionIn(back, enc) != p {
					t.Fatalf("%d -> %v -> %d", offset, p, back)
				}
			}
		}
	})
}
