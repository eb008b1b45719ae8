package dataset

import (
	"bytes"
	"errors"
	"fmt"
	"slices"
	"unicode/utf8"
)

// role is what a column of the file is read for.
type role uint8

const (
	plainRole role = iota // numbers
	timeRole              // positions in time
	groupRole             // labels of groups
)

// cells is one column of a table while it is read.
type cells struct {
	name, unit   string
	role         role
	values       []float64 // by row; NaN where there is no number
	missing      int
	unparsed     int
	censored     int
	unparsedLine int
	unparsedText string
}

// table is a file while it is read, and its columns afterwards.
type table struct {
	dialect
	codes   codes
	limits  Limits
	headers []string
	columns []*cells
	values  [][]float64 // of each column, to be filled by row
	rows    int
	line    int         // line of the file that is read, from 1
	shifts  []lineShift // where the distance of line and row changes
	clock   *clock      // reads the timeRole column
	labels  []string    // of the groups, in the order of appearance
	group   []int32     // label of each row; nil without a groupRole column
	plain   []bool      // columns that hold numbers only
	undo    []*int      // counters raised by the record at hand
	inside  int         // line ends inside quotes of the record at hand
	blanks  int         // trailing blank lines of a one-column file
}

// lineShift says that from a row on the line is row + by.
type lineShift struct{ row, by int }

// lineOf returns the line, from 1, on which a row begins.
func (t *table) lineOf(row int) int {
	i, found := slices.BinarySearchFunc(t.shifts, row, func(s lineShift, r int) int { return s.row - r })
	if !found {
		i--
	}
	return row + t.shifts[i].by
}

// read consumes blocks until the text ends.
func (t *table) read(b *blocks, live func() error) *Trouble {
	for {
		if err := live(); err != nil {
			return unreadable("reading was stopped: %s", err)
		}
		whole := b.text()[:bytes.LastIndexByte(b.text(), '\n')+1]
		if trouble := t.legible(whole); trouble != nil {
			return trouble
		}
		used, trouble := t.take(whole)
		if trouble != nil {
			return trouble
		}
		b.start += used
		left := b.end - b.start
		if b.done && left == 0 {
			return t.finish()
		}
		if used == 0 && int64(left) > t.limits.LineBytes {
			return reached("line-bytes", t.limits.LineBytes, int64(left), "bytes in one line")
		}
		if b.done && used == 0 {
			return unreadable("the quote that opens on or after line %d is never closed", t.line)
		}
		if err := b.fill(); err != nil {
			return readError(err)
		}
	}
}

func readError(err error) *Trouble {
	if errors.Is(err, errRatio) {
		return &Trouble{Kind: ReachedLimit, Message: "the compressed file unpacks to more than the limit ratio allows; " +
			"unpack it and name the plain file, or raise the limit with --limit ratio=N if the file is trusted"}
	}
	return unreadable("the file could not be read to its end: %s", plain(err))
}

// legible refuses binary content and broken UTF-8 without quoting it.
func (t *table) legible(text []byte) *Trouble {
	if at := bytes.IndexByte(text, 0); at >= 0 {
		return unreadable("not a text file: line %d holds a NUL byte", t.line+bytes.Count(text[:at], []byte{'\n'}))
	}
	if utf8.Valid(text) {
		return nil
	}
	at := 0
	for at < len(text) {
		r, size := utf8.DecodeRune(text[at:])
		if r == utf8.RuneError && size == 1 {
			break
		}
		at += size
	}
	return unreadable(`line %d is not valid UTF-8; say how the file is encoded, for example encoding = "latin-1" or "windows-1252"`,
		t.line+bytes.Count(text[:at], []byte{'\n'}))
}

// take reads the records of a text that ends with a line end, and returns how
// much it consumed: less than all when the last record runs on.
func (t *table) take(text []byte) (used int, trouble *Trouble) {
	for used < len(text) {
		if skip, ok := t.skipped(text[used:]); ok {
			used += skip
			t.line++
			continue
		}
		if t.rows == t.capacity() {
			if trouble := t.grow(t.rows + t.rows/4 + 1024); trouble != nil {
				return 0, trouble
			}
		}
		end, cells, ok := t.takeRecord(text, used)
		if !ok {
			t.rollBack()
			return used, nil
		}
		if cells != len(t.columns) && !t.fill(cells) {
			return 0, t.ragged(text[used:])
		}
		if text[end] == '\r' {
			end++
		}
		if text[end] != '\n' {
			return 0, unreadable("line %d holds a carriage return inside a cell; put quotes around the cell, or mend the line ends", t.line)
		}
		t.close()
		used = end + 1
	}
	return used, nil
}

// takeRecord reads the cells of the record at text[i] and returns where it
// ends and how many cells it has, an empty one behind a trailing delimiter not
// counted. ok is false when the text ends inside it.
func (t *table) takeRecord(text []byte, i int) (end, cells int, ok bool) {
	width, row, values, delimiter, point := len(t.columns), t.rows, t.values, t.delimiter, t.point
	for col := 0; ; col++ {
		if col < width && t.plain[col] {
			v, next, number := scanShort(text, i, delimiter, point)
			if number && !t.codes.number(v) {
				values[col][row] = v
				if i = next; text[i] != delimiter {
					return i, col + 1, true
				}
				i++
				continue
			}
		}
		cell, next, ok := t.cell(text, i)
		if !ok {
			return 0, 0, false
		}
		if text[i] == '"' {
			t.inside += bytes.Count(text[i:next], []byte{'\n'})
		}
		cell = bytes.TrimSpace(cell)
		if col < width {
			t.judge(col, cell)
		}
		if i = next; text[i] == delimiter {
			i++
			continue
		}
		if col == width && len(cell) == 0 {
			return i, width, true
		}
		return i, col + 1, true
	}
}

// skipped reports whether a record is a comment or a blank line. In a file of
// one column a blank line is a missing value.
func (t *table) skipped(text []byte) (length int, ok bool) {
	if len(t.comment) > 0 && bytes.HasPrefix(text, t.comment) {
		return bytes.IndexByte(text, '\n') + 1, true
	}
	if text[0] == '\n' || text[0] == '\r' && text[1] == '\n' {
		if len(t.columns) > 1 {
			return bytes.IndexByte(text, '\n') + 1, true
		}
		t.blanks++
		return 0, false
	}
	t.blanks = 0
	return 0, false
}

// fill gives the cell that a record of that many cells lacks: only a nameless
// last column, made by a trailing delimiter in the header, may be lacking.
func (t *table) fill(cells int) bool {
	if cells != len(t.columns)-1 || t.headers[cells] != "" {
		return false
	}
	t.judge(cells, nil)
	return true
}

// close ends a record.
func (t *table) close() {
	if by := t.line - t.rows; len(t.shifts) == 0 || t.shifts[len(t.shifts)-1].by != by {
		t.shifts = append(t.shifts, lineShift{t.rows, by})
	}
	t.rows++
	t.line += 1 + t.inside
	t.undo, t.inside = t.undo[:0], 0
}

// rollBack takes back what the record at hand has counted.
func (t *table) rollBack() {
	for _, n := range t.undo {
		*n--
	}
	t.undo, t.inside = t.undo[:0], 0
}

func (t *table) ragged(text []byte) *Trouble {
	n := 0
	if record, _, ok := t.record(text); ok {
		n = len(record)
	}
	return unreadable("line %d has %d cells where the header has %d; every line must have the same number of cells (put quotes around a cell that holds the delimiter %q)",
		t.line, n, len(t.columns), t.delimiter)
}

func (t *table) capacity() int {
	if len(t.values) == 0 {
		return 0
	}
	return len(t.values[0])
}

// grow makes room for rows, after checking that the limit allows them.
func (t *table) grow(rows int) *Trouble {
	need := int64(t.rows+1) * int64(len(t.columns))
	if need > t.limits.Cells {
		return reached("cells", t.limits.Cells, need, "cells (rows x columns)")
	}
	rows = int(min(int64(rows), t.limits.Cells/int64(len(t.columns))))
	for i := range t.values {
		grown := make([]float64, rows)
		copy(grown, t.values[i][:t.rows])
		t.values[i] = grown
	}
	if t.group != nil {
		t.group = append(make([]int32, 0, rows), t.group...)
	}
	return nil
}

// finish cuts the columns to their rows.
func (t *table) finish() *Trouble {
	t.rows -= t.blanks
	t.columns[0].missing -= t.blanks
	if t.rows == 0 {
		return unreadable("the file has a header but no row of data below it")
	}
	for i, c := range t.columns {
		c.values = t.values[i][:t.rows:t.rows]
	}
	return nil
}

// numbers counts the cells of a column that were read as numbers.
func (c *cells) numbers() int { return len(c.values) - c.missing - c.unparsed - c.censored }

// numeric reports whether most of what stands in a column are numbers.
func (c *cells) numeric() bool {
	return c.role == plainRole && (c.numbers() > c.unparsed || c.unparsed == 0)
}

func unnamed(i int) string { return fmt.Sprint(i + 1) }
