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
	undo    []*int      // counters raised by the record at hand
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
		if b.done && used == 0 {
			return unreadable("the quote that opens on or after line %d is never closed", t.line)
		}
		if int64(left) > t.limits.LineBytes {
			return reached("line-bytes", t.limits.LineBytes, int64(left), "bytes in one line")
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
	width := len(t.columns)
	for used < len(text) {
		i := used
		if skip, ok := t.skipped(text[i:]); ok {
			used += skip
			t.line++
			continue
		}
		if t.rows == t.capacity() {
			if trouble := t.grow(t.rows + t.rows/4 + 1024); trouble != nil {
				return 0, trouble
			}
		}
		col := 0
		for ; ; col++ {
			if col < width && t.columns[col].role == plainRole {
				v, end, ok := scanNumber(text, i, t.delimiter, t.point)
				if ok && !t.codes.number(v) {
					t.values[col][t.rows] = v
					i = end
					if text[i] == t.delimiter {
						i++
						continue
					}
					break
				}
			}
			cell, end, ok := t.cell(text, i)
			if !ok {
				t.rollBack()
				return used, nil
			}
			cell = bytes.TrimSpace(cell)
			if col < width {
				t.judge(col, cell)
			} else if len(cell) > 0 || col > width {
				return 0, t.ragged(text[used:])
			}
			i = end
			if text[i] != t.delimiter {
				break
			}
			i++
		}
		if col+1 < width && !t.fill(col+1) {
			return 0, t.ragged(text[used:])
		}
		if text[i] == '\r' {
			i++
		}
		if text[i] != '\n' {
			return 0, unreadable("line %d holds a carriage return inside a cell; put quotes around the cell, or mend the line ends", t.line)
		}
		t.close(text[used : i+1])
		used = i + 1
	}
	return used, nil
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

// fill gives the cells that a record lacks; only one nameless last column,
// made by a trailing delimiter in the header, may be lacking.
func (t *table) fill(from int) bool {
	if from != len(t.columns)-1 || t.headers[from] != "" {
		return false
	}
	t.judge(from, nil)
	return true
}

// close ends a record.
func (t *table) close(text []byte) {
	if by := t.line - t.rows; len(t.shifts) == 0 || t.shifts[len(t.shifts)-1].by != by {
		t.shifts = append(t.shifts, lineShift{t.rows, by})
	}
	t.undo = t.undo[:0]
	t.rows++
	t.line++
	if text[0] == '"' || bytes.IndexByte(text[:len(text)-1], '\n') >= 0 {
		t.line += bytes.Count(text[:len(text)-1], []byte{'\n'})
	}
}

// rollBack takes back what the record at hand has counted.
func (t *table) rollBack() {
	for _, n := range t.undo {
		*n--
	}
	t.undo = t.undo[:0]
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
