package document

import "sort"

// Part is what of a statement stands under an offset.
type Part uint8

// The parts of a text.
const (
	InBlank   Part = iota // between statements: a new one may begin here
	InHeader              // a table's name, brackets included
	InKey                 // up to the equals sign
	InValue               // after the equals sign, also when nothing is there yet
	InComment             // a comment on its own line or behind a statement
)

// Path is what stands under an offset, on whole and on broken lines alike.
type Path struct {
	// Tables runs from the root to the table, or the entry of an array of
	// tables, in which the line stands. After a broken header the last is a
	// table that hangs on nothing, and Names is nil.
	Tables []*Node
	// Names is that table's name, part by part; nil at the top level.
	Names []string
	// In is the part under the offset.
	In Part
	// Keys is the key of the statement part by part, as far as it is written,
	// or of the header, broken or not; nil between statements.
	Keys []Key
	// Members runs from the statement's first key into the value, through
	// inline tables, down to the offset. Nil on broken lines.
	Members []*Member
	// Value is the innermost value under the offset; nil if there is none.
	Value *Node
	// Statement is the whole or broken statement; empty between statements.
	Statement Span
	// Broken says that the statement could not be read.
	Broken bool
}

// Table is the table in which the line stands.
func (p Path) Table() *Node { return p.Tables[len(p.Tables)-1] }

// Key is the statement's first key as written so far, or "".
func (p Path) Key() string {
	if len(p.Keys) == 0 {
		return ""
	}
	return p.Keys[0].Text
}

// At looks up what stands under an offset. An offset at the end of a token
// belongs to it: that is where the cursor is while typing.
func (t *Tree) At(offset int) Path {
	offset = max(0, min(offset, len(t.Text)))
	i := sort.Search(len(t.statements), func(i int) bool { return t.statements[i].at.Start > offset }) - 1
	p := Path{Tables: []*Node{t.Root}}
	if i < 0 {
		p.In = t.blankOrComment(offset)
		return p
	}
	s := t.statements[i]
	p.Tables, p.Names = s.tables, s.names
	if !t.reaches(s, offset) {
		p.In = t.blankOrComment(offset)
		return p
	}
	p.Keys, p.Statement, p.Broken = s.keys, s.at, s.form == brokenPair || s.form == brokenHeader
	p.In = t.part(s, offset)
	if s.value != nil && s.value.At.Contains(offset) {
		p.Value = s.value
	}
	if s.value != nil && !p.Broken {
		p.descend(s, offset)
	}
	return p
}

// reaches reports whether an offset after a statement's start belongs to it. A
// broken one takes what follows it on its last line, and what its open brackets
// take.
func (t *Tree) reaches(s statement, offset int) bool {
	if offset <= s.at.End || offset < s.until || s.until == len(t.Text) {
		return true
	}
	return s.form == brokenPair && offset <= s.at.End+len(lineAt(t.Text, s.at.End))
}

// part tells key from value by the equals sign.
func (t *Tree) part(s statement, offset int) Part {
	if t.blankOrComment(offset) == InComment {
		return InComment
	}
	if s.form == headerForm || s.form == brokenHeader {
		return InHeader
	}
	end := s.at.Start
	if len(s.keys) > 0 {
		end = s.keys[len(s.keys)-1].At.End
	}
	for i := end; i < offset && i < len(t.Text); i++ {
		if t.Text[i] == '=' {
			return InValue
		}
	}
	return InKey
}

func (t *Tree) blankOrComment(offset int) Part {
	if n := t.commentsUpTo(offset); n > 0 && offset <= t.Comments[n-1].End {
		return InComment
	}
	return InBlank
}

// descend follows the members and items under the offset.
func (p *Path) descend(s statement, offset int) {
	table := s.table
	for _, k := range s.keys {
		m := table.Get(k.Text)
		if m == nil {
			return
		}
		p.Members = append(p.Members, m)
		table = m.Value
	}
	if table != s.value { // a duplicate: it is in no table
		p.Members = nil
		return
	}
	for p.Value != nil {
		inner := p.inner(offset)
		if inner == nil {
			return
		}
		p.Value = inner
	}
}

// inner is the value inside of p.Value under the offset, or nil.
func (p *Path) inner(offset int) *Node {
	items := p.Value.Items
	if i := sort.Search(len(items), func(i int) bool { return items[i].At.End >= offset }); i < len(items) && items[i].At.Contains(offset) {
		return items[i]
	}
	if p.Value.Kind != InlineTable && p.Value.Kind != Table {
		return nil
	}
	for _, m := range p.Value.Members {
		if m.Statement.Contains(offset) {
			p.Members = append(p.Members, m)
			return m.Value
		}
	}
	return nil
}

// Attempted reports whether a broken line of the table begins with that key:
// the key is not absent then, it cannot be read.
func (t *Tree) Attempted(table *Node, key string) bool {
	for _, s := range t.statements {
		if s.form == brokenPair && s.table == table && len(s.keys) > 0 && s.keys[0].Text == key {
			return true
		}
	}
	return false
}
