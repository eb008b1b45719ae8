package document

import (
	"bytes"
	"cmp"
	"errors"
	"slices"

	"github.com/pelletier/go-toml/v2/unstable"
)

// builder makes one tree.
type builder struct {
	text   []byte
	tree   *Tree
	parser unstable.Parser
	base   int // offset at which the parser was last started
	table  *Node
	names  []string
	tables []*Node // from the root to table
	reread int     // bytes that recovery made the parser read twice
	open   bool    // a broken statement left brackets open
	lines  *Lines  // of the text, when first needed
}

// Parse reads any bytes as TOML. The tree is never nil; it shares text, which
// must not change afterwards.
func Parse(text []byte) *Tree {
	b := &builder{text: text, tree: &Tree{Text: text, Root: &Node{Kind: Table, At: Span{0, len(text)}}}}
	b.parser.KeepComments = true
	b.enter(b.tree.Root, nil, []*Node{b.tree.Root})
	if problem, wide := utf16(text); wide {
		b.problem(problem.At, problem.Message)
		b.tree.unreadable = true
		return b.tree
	}
	for from := bomLength(text); from < len(text); {
		end, err := b.read(from)
		if err == nil {
			break
		}
		from = b.recover(b.skipBlank(end), err)
	}
	b.confirm()
	byPlace := func(x, y Problem) int { return cmp.Compare(x.At.Start, y.At.Start) }
	slices.SortStableFunc(b.tree.Problems, byPlace)
	slices.SortFunc(b.tree.Comments, func(x, y Span) int { return cmp.Compare(x.Start, y.Start) })
	return b.tree
}

// read takes statements from an offset until the text ends or one is broken.
// It returns the end of the last whole statement.
func (b *builder) read(from int) (end int, err error) {
	b.base, end = from, from
	b.parser.Reset(b.text[from:])
	for b.parser.NextExpression() {
		e := b.parser.Expression()
		comment := Span{}
		if c := e.Next(); c != nil && c.Kind == unstable.Comment {
			comment = b.comment(c)
		}
		switch e.Kind {
		case unstable.Comment:
			end = b.comment(e).End
		case unstable.KeyValue:
			end = b.pair(e, comment)
		default:
			end = b.header(e, comment)
		}
	}
	return end, b.parser.Error()
}

// comment records a comment and those that hang on it; it returns the span
// from the first to the last.
func (b *builder) comment(c *unstable.Node) Span {
	s := b.span(c.Raw)
	b.tree.Comments = append(b.tree.Comments, s)
	for c = c.Child(); c != nil; c = c.Next() {
		next := b.span(c.Raw)
		b.tree.Comments = append(b.tree.Comments, next)
		s.End = next.End
	}
	return s
}

func (b *builder) span(r unstable.Range) Span {
	start := b.base + int(r.Offset)
	return Span{start, start + int(r.Length)}
}

func (b *builder) keys(it unstable.Iterator) []Key {
	var keys []Key
	for it.Next() {
		n := it.Node()
		keys = append(keys, Key{Text: string(n.Data), At: b.span(n.Raw)})
	}
	return keys
}

func (b *builder) problem(at Span, message string) {
	b.tree.Problems = append(b.tree.Problems, Problem{At: at, Message: message})
}

// enter makes a table the one in which the next statements stand.
func (b *builder) enter(table *Node, names []string, tables []*Node) {
	b.table, b.names, b.tables = table, names, tables
}

// skipBlank is the offset of the first byte that is neither blank nor part of a
// line end. A carriage return alone ends no line in TOML.
func (b *builder) skipBlank(from int) int {
	for from < len(b.text) {
		switch c := b.text[from]; {
		case c == ' ' || c == '\t' || c == '\n':
		case c == '\r' && from+1 < len(b.text) && b.text[from+1] == '\n':
		default:
			return from
		}
		from++
	}
	return from
}

// errorAt is where the parser stopped, and what it said.
func (b *builder) errorAt(err error) (Span, string) {
	var pe *unstable.ParserError
	if !errors.As(err, &pe) {
		return Span{len(b.text), len(b.text)}, err.Error()
	}
	return b.span(b.parser.Range(pe.Highlight)), pe.Message
}

func bomLength(text []byte) int {
	if bytes.HasPrefix(text, []byte("\xef\xbb\xbf")) {
		return 3
	}
	return 0
}

// utf16 tells a text in UTF-16, in which nothing can be read: by its mark, or by
// every other byte being zero, as in ASCII characters.
func utf16(text []byte) (Problem, bool) {
	marked := bytes.HasPrefix(text, []byte("\xff\xfe")) || bytes.HasPrefix(text, []byte("\xfe\xff"))
	zeros := len(text) >= 4 && (text[0]|text[2] == 0 || text[1]|text[3] == 0)
	if !marked && !zeros {
		return Problem{}, false
	}
	return Problem{Span{0, min(2, len(text))},
		"the text is not UTF-8 (it looks like UTF-16); TOML is always UTF-8: save it with that encoding"}, true
}
