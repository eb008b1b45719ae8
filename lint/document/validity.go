package document

import (
	"bytes"
	"errors"
	"fmt"
	"strings"

	"github.com/BurntSushi/toml"
)

// defined words a key or table that is there already.
func (b *builder) defined(m *Member) string {
	return fmt.Sprintf("%s is already defined%s; remove or rename one of the two", quoted(m.Key.Text), b.onLine(m.Key.At))
}

// cannotExtend words a key or header that adds to what cannot be added to.
func (b *builder) cannotExtend(m *Member) string {
	what := m.Value.Kind.String()
	switch m.Value.Kind {
	case Table:
		what = "table with a header"
		if m.Value.origin == implied {
			what = "table that a header made"
		}
	case InlineTable:
		what = "closed inline table"
	}
	article := "a"
	if strings.IndexByte("aeio", what[0]) >= 0 {
		article = "an"
	}
	return fmt.Sprintf("%s is %s %s%s and cannot be extended here; add the key there, or use another name",
		quoted(m.Key.Text), article, what, b.onLine(m.Key.At))
}

func (b *builder) onLine(at Span) string {
	if b.lines == nil {
		b.lines = NewLines(b.text)
	}
	return fmt.Sprintf(" on line %d", 1+b.lines.Position(at.Start).Line)
}

func quoted(key string) string { return `"` + key + `"` }

// unfit tells a value that does not exist or does not fit.
func (b *builder) unfit(at Span, u *unfit) {
	if u.message != "" {
		b.problem(u.at, u.message)
		return
	}
	if p, found := b.ask(at); found {
		b.problem(u.at, p.Message)
		return
	}
	b.problem(u.at, "this value does not exist or does not fit into 64 bits; correct it")
}

// ask has BurntSushi say what is wrong with one part of the text alone.
func (b *builder) ask(at Span) (Problem, bool) {
	part := b.text[at.Start:at.End]
	if bytes.Count(part, []byte("["))+bytes.Count(part, []byte("{")) > MaxNesting {
		return Problem{}, false // it has no bound on nesting of its own
	}
	pe, wrong := decode(part)
	if !wrong || bytes.IndexByte(part[:min(6, len(part))], 0) >= 0 { // which it takes for UTF-16
		return Problem{}, false
	}
	start := at.Start + max(0, min(pe.Position.Start, len(part)))
	return Problem{Span{start, min(at.End, start+max(1, pe.Position.Len))}, pe.Message}, true
}

// confirm has BurntSushi judge a text in which nothing was found: it says what
// is valid.
func (b *builder) confirm() {
	if len(b.tree.Problems) > 0 {
		return
	}
	bom := bomLength(b.text)
	if pe, wrong := decode(b.text[bom:]); wrong {
		start := min(bom+max(0, pe.Position.Start), len(b.text))
		b.problem(Span{start, min(start+max(1, pe.Position.Len), len(b.text))}, pe.Message)
	}
}

// decode has BurntSushi read a text for its errors alone. It panics where it
// finds a fault in itself, which is then an error like any other.
func decode(text []byte) (pe toml.ParseError, wrong bool) {
	defer func() {
		if r := recover(); r != nil {
			pe, wrong = toml.ParseError{Message: "this is not valid TOML"}, true
		}
	}()
	var nothing struct{}
	_, err := toml.Decode(string(text), &nothing)
	return pe, errors.As(err, &pe)
}
