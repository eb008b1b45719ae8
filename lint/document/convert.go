package document

import (
	"fmt"
	"strings"

	"github.com/pelletier/go-toml/v2/unstable"
)

// MaxNesting is how deep arrays and inline tables may stand in each other.
const MaxNesting = 200

// unfit is a value that is well formed but cannot be held.
type unfit struct {
	at      Span
	message string // empty: BurntSushi has the words
}

func (u *unfit) Error() string { return u.message }

// value converts a parsed value that begins at or after from. The parser gives
// no range for arrays and no end for inline tables; only blanks, commas, an
// equals sign and known comments stand around them, so the search is exact.
func (b *builder) value(n *unstable.Node, from, depth int) (*Node, error) {
	if depth > MaxNesting {
		at := b.skipTo(from)
		return nil, &unfit{Span{at, at + 1},
			fmt.Sprintf("arrays and inline tables are nested more than %d deep here; write fewer brackets inside each other", MaxNesting)}
	}
	switch n.Kind {
	case unstable.Array:
		return b.array(n, from, depth)
	case unstable.InlineTable:
		return b.inlineTable(n, depth)
	}
	at := b.span(n.Raw)
	kind, value, err := scalar(n.Kind, string(b.text[at.Start:at.End]), n.Data)
	if err != nil {
		return nil, &unfit{at: at}
	}
	return &Node{Kind: kind, At: at, Value: value}, nil
}

func (b *builder) array(n *unstable.Node, from, depth int) (*Node, error) {
	start := b.skipTo(from)
	array := &Node{Kind: Array, At: Span{Start: start}}
	end := start + 1
	for it := n.Children(); it.Next(); {
		c := it.Node()
		if c.Kind == unstable.Comment {
			end = b.comment(c).End
			continue
		}
		item, err := b.value(c, end, depth+1)
		if err != nil {
			return nil, err
		}
		array.Items = append(array.Items, item)
		end = item.At.End
	}
	array.At.End = b.skipTo(end) + 1
	return array, nil
}

func (b *builder) inlineTable(n *unstable.Node, depth int) (*Node, error) {
	table := &Node{Kind: InlineTable, At: b.span(n.Raw), origin: bracketed}
	end := table.At.End
	for it := n.Children(); it.Next(); {
		c := it.Node()
		if c.Kind == unstable.Comment {
			end = b.comment(c).End
			continue
		}
		keys := b.keys(c.Key())
		value, err := b.value(c.Value(), keys[len(keys)-1].At.End, depth+1)
		if err != nil {
			return nil, err
		}
		end = value.At.End
		b.define(table, keys, value, Span{keys[0].At.Start, end}, Span{})
	}
	table.At.End = b.skipTo(end) + 1
	return table, nil
}

// skipTo is the next byte that is no blank, line end, comma or equals sign.
func (b *builder) skipTo(from int) int {
	for from < len(b.text) && strings.IndexByte(" \t\r\n,=", b.text[from]) >= 0 {
		from++
	}
	return from
}
