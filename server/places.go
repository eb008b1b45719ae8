package server

import (
	"go.lsp.dev/protocol"

	"lagwise/lint/document"
)

// places converts between the byte offsets of one text and the positions that
// the client counts.
type places struct {
	lines    *document.Lines
	encoding document.Encoding
}

func (s *session) places(text []byte) places {
	return places{document.NewLines(text), s.able.encoding}
}

func (p places) position(offset int) protocol.Position {
	at := p.lines.PositionIn(offset, p.encoding)
	return protocol.Position{Line: uint32(at.Line), Character: uint32(at.Character)}
}

func (p places) rangeOf(s document.Span) protocol.Range {
	return protocol.Range{Start: p.position(s.Start), End: p.position(s.End)}
}

// offset returns the byte at a position; one beyond a line or the text is
// taken back to its end, as the protocol says.
func (p places) offset(at protocol.Position) int {
	offset, _ := p.lines.OffsetIn(document.Position{Line: int(at.Line), Character: int(at.Character)}, p.encoding)
	return offset
}

func (p places) span(r protocol.Range) document.Span {
	return document.Span{Start: p.offset(r.Start), End: p.offset(r.End)}
}
