package dataset

import (
	"math"
	"slices"
	"strings"
	"unicode/utf8"
)

// judge reads a cell that is not a plain number.
func (t *table) judge(col int, cell []byte) {
	c := t.columns[col]
	switch c.role {
	case timeRole:
		t.judgeTime(col, cell)
		return
	case groupRole:
		t.group = append(t.group[:t.rows], t.labelOf(string(cell)))
		return
	}
	v, ok := t.numberIn(cell)
	switch {
	case ok && !t.codes.number(v):
		t.values[col][t.rows] = v
		return
	case ok || t.codes.text(cell):
		t.count(&c.missing)
	case cell[0] == '<' && t.isNumber(cell[1:]):
		t.count(&c.censored)
	default:
		t.unread(c, cell)
	}
	t.values[col][t.rows] = math.NaN()
}

func (t *table) judgeTime(col int, cell []byte) {
	c := t.columns[col]
	position, ok := t.clock.position(cell)
	if !ok {
		position = math.NaN()
		if t.codes.text(cell) {
			t.count(&c.missing)
		}
		t.unread(c, cell)
	}
	t.values[col][t.rows] = position
}

// count raises a counter so that it can be taken back with the record.
func (t *table) count(n *int) {
	*n++
	t.undo = append(t.undo, n)
}

func (t *table) unread(c *cells, cell []byte) {
	if c.unparsed == 0 {
		c.unparsedLine, c.unparsedText = t.line, clipped(cell)
	}
	t.count(&c.unparsed)
}

// clipped keeps the beginning of a cell for a message.
func clipped(cell []byte) string {
	const most = 60
	text := string(cell)
	if len(text) <= most {
		return text
	}
	cut := most
	for !utf8.RuneStart(text[cut]) {
		cut--
	}
	return text[:cut] + "…"
}

func (t *table) isNumber(cell []byte) bool {
	_, ok := t.numberIn([]byte(strings.TrimSpace(string(cell))))
	return ok
}

// numberIn reads a cell that was trimmed and unquoted.
func (t *table) numberIn(cell []byte) (float64, bool) {
	if v, ok := parsePlain(cell, t.point); ok {
		return v, true
	}
	if len(t.thousands) == 0 {
		return 0, false
	}
	return parsePlain(stripThousands(cell, t.thousands, t.point), t.point)
}

func (t *table) labelOf(text string) int32 {
	if i := slices.Index(t.labels, text); i >= 0 {
		return int32(i)
	}
	t.labels = append(t.labels, text)
	return int32(len(t.labels) - 1)
}
