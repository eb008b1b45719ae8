package document

// Kind is the kind of a node.
type Kind uint8

// The kinds of TOML values, and the two that headers make.
const (
	String Kind = iota
	Integer
	Float
	Boolean
	OffsetDateTime
	LocalDateTime
	LocalDate
	LocalTime
	Array
	InlineTable
	Table
	TableArray
)

var kindNames = [...]string{"string", "integer", "float", "boolean",
	"date and time with offset", "date and time", "date", "time",
	"array", "inline table", "table", "array of tables"}

// String is the kind in the words of the TOML specification.
func (k Kind) String() string { return kindNames[k] }

// Tree is one parsed text. It is immutable once Parse has returned it.
type Tree struct {
	Text     []byte
	Root     *Node
	Problems []Problem // by place
	Comments []Span    // every comment, from # to the end of its line; by place

	unreadable bool        // not UTF-8 at all: no edit fits
	statements []statement // by place: what At and the edits look up
}

// Problem is one thing that makes the text invalid.
type Problem struct {
	At      Span
	Message string
}

// Node is a value, a table, or an array of tables.
type Node struct {
	Kind Kind
	// At is the value as written, delimiters included. For a table it runs
	// from its header to the end of its own last statement; for an array of
	// tables, from the first to the last of its entries; for a table that only
	// dotted keys or longer headers imply, it is the first key that does.
	At Span
	// Header is the header line of [t] and of each [[t]] entry, brackets
	// included; empty for everything else.
	Header Span
	// Value is a string, int64, float64, bool or time.Time; the local dates
	// and times are strings as written. Nil for arrays and tables.
	Value   any
	Members []*Member // of tables, in the order of the text
	Items   []*Node   // of arrays, and the entries of an array of tables

	origin origin
	last   int                // end of the table's own last whole statement, 0 if none
	index  map[string]*Member // of tables with many members
}

// manyMembers is where a map begins to beat a walk.
const manyMembers = 16

// add appends a member; its key must be new.
func (n *Node) add(m *Member) {
	n.Members = append(n.Members, m)
	switch {
	case n.index != nil:
		n.index[m.Key.Text] = m
	case len(n.Members) > manyMembers:
		n.index = make(map[string]*Member, 2*len(n.Members))
		for _, m := range n.Members {
			n.index[m.Key.Text] = m
		}
	}
}

// origin is how a table came to be, on which its being extended depends.
type origin uint8

const (
	byHeader       origin = iota // [t], [[t]], or the root
	implied                      // a part of a longer header
	byDotted                     // a part of a dotted key
	byDottedInside               // the same inside of an inline table
	bracketed                    // { … }
)

// Member is a key of a table with its value.
type Member struct {
	Key   Key
	Value *Node
	// Statement runs from the first byte of the (dotted) key to the last byte
	// of the value; for a table made by a header it is that header.
	Statement Span
	Comment   Span // that trails the statement; empty if none
}

// Key is one part of a key: decoded, and as written with its quotes.
type Key struct {
	Text string
	At   Span
}

// Get is the member with that key, or nil. It may be called on a nil node.
func (n *Node) Get(key string) *Member {
	if n == nil {
		return nil
	}
	if n.index != nil {
		return n.index[key]
	}
	for _, m := range n.Members {
		if m.Key.Text == key {
			return m
		}
	}
	return nil
}

// IsTable reports whether the node has members: a table of any form.
func (n *Node) IsTable() bool { return n != nil && (n.Kind == Table || n.Kind == InlineTable) }

// Valid reports whether the text is valid TOML.
func (t *Tree) Valid() bool { return len(t.Problems) == 0 }

// Raw is the text of a span, clamped to the text.
func (t *Tree) Raw(s Span) string {
	start, end := max(0, s.Start), min(len(t.Text), s.End)
	if start >= end {
		return ""
	}
	return string(t.Text[start:end])
}

// statement is one top-level statement, whole or broken.
type statement struct {
	at     Span  // with its trailing comment; a broken one up to the next statement
	table  *Node // in which it stands; of a header: the table that it opens
	names  []string
	keys   []Key   // as written: of a header or of a (dotted) key
	value  *Node   // nil for headers and broken statements
	header Span    // empty for anything but headers
	tables []*Node // from the root to table
	form   form
	until  int // of one with open brackets: where the next statement begins
}

type form uint8

const (
	pairForm form = iota
	headerForm
	brokenPair
	brokenHeader
)
