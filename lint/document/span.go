package document

// Span is a half-open range of bytes of one text.
type Span struct{ Start, End int }

// Empty reports whether the span holds no byte.
func (s Span) Empty() bool { return s.End <= s.Start }

// Contains reports whether the offset lies in the span or at its end.
func (s Span) Contains(offset int) bool { return s.Start <= offset && offset <= s.End }

// Position is a place in a text: line and character count from 0, characters
// in UTF-16 code units.
type Position struct {
	Line      int `json:"line"`
	Character int `json:"character"`
}

// Range is a half-open range of positions.
type Range struct {
	Start Position `json:"start"`
	End   Position `json:"end"`
}

// Edit replaces the bytes of At by Text.
type Edit struct {
	At   Span
	Text string
}
