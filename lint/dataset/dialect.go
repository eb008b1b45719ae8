package dataset

import (
	"bytes"
	"path"
	"strings"

	"lagwise/lint/request"
)

// dialect is how the text of a record is cut into cells.
type dialect struct {
	delimiter byte
	point     byte // decimal separator
	thousands []byte
	comment   []byte
	header    int // lines above the first row of data
}

// delimiters are those that are inferred, the likelier first.
var delimiters = []byte{',', ';', '\t', '|'}

// declaredDialect returns what the manifest says; the delimiter is 0 when it
// has to be inferred.
func declaredDialect(rec *request.Record) (dialect, *Trouble) {
	d := dialect{point: '.', header: rec.HeaderRows, thousands: []byte(rec.Thousands), comment: []byte(rec.Comment)}
	for _, one := range []struct {
		key, text string
		to        *byte
	}{{"delimiter", rec.Delimiter, &d.delimiter}, {"decimal", rec.Decimal, &d.point}} {
		if one.text == "" {
			continue
		}
		if len(one.text) != 1 || strings.ContainsAny(one.text, "\"\r\n0123456789+-") {
			return d, unreadable("%s = %q is not one plain character", one.key, one.text)
		}
		*one.to = one.text[0]
	}
	if d.delimiter == d.point || rec.Thousands != "" && rec.Thousands == string(d.point) {
		return d, unreadable("the decimal %q is also the delimiter or the thousands separator; say which it is", d.point)
	}
	return d, nil
}

// infer returns the delimiter of a text that begins at a record: the one that
// gives every line the same number of cells, and the most of them. A decimal
// comma is never a delimiter.
func (d dialect) infer(name string, sample []byte) byte {
	best, most := byte(0), 1
	for _, c := range delimiters {
		if c == d.point {
			continue
		}
		if n := d.cellsOf(c, sample); n > most {
			best, most = c, n
		}
	}
	switch {
	case best != 0:
		return best
	case strings.HasSuffix(strings.TrimSuffix(name, ".gz"), ".tsv"):
		return '\t'
	case d.point == ',':
		return ';'
	}
	return ','
}

// splitBy returns the delimiter by which a text looks split although another
// one is used, or "".
func (d dialect) splitBy(sample []byte) string {
	own := d.cellsOf(d.delimiter, sample)
	for _, c := range delimiters {
		if c != d.delimiter && c != d.point && own <= 1 && d.cellsOf(c, sample) > 1 {
			return string(c)
		}
	}
	return ""
}

// cellsOf returns the number of cells that every sampled line has under a
// delimiter, 0 when they differ.
func (d dialect) cellsOf(delimiter byte, sample []byte) int {
	d.delimiter = delimiter
	cells, lines := 0, 0
	for lines < 50 && len(sample) > 0 {
		record, used, ok := d.record(sample)
		if !ok {
			break
		}
		sample = sample[used:]
		if record == nil {
			continue
		}
		n := len(record)
		if n > 1 && len(record[n-1]) == 0 {
			n-- // a trailing delimiter
		}
		if lines > 0 && n != cells && len(record) != cells {
			return 0
		}
		cells = max(cells, n)
		lines++
	}
	return cells
}

// record cuts the first record of a text into cells, quotes taken off, the
// plain way. record is nil for a comment or a blank line; ok is false when the
// text ends inside it.
func (d dialect) record(text []byte) (record [][]byte, used int, ok bool) {
	if len(d.comment) > 0 && bytes.HasPrefix(text, d.comment) {
		end := bytes.IndexByte(text, '\n')
		return nil, end + 1, end >= 0
	}
	i := 0
	for {
		cell, end, ok := d.cell(text, i)
		if !ok {
			return nil, 0, false
		}
		record = append(record, bytes.TrimSpace(cell))
		if text[end] == d.delimiter {
			i = end + 1
			continue
		}
		if text[end] == '\r' {
			end++
		}
		if len(record) == 1 && len(record[0]) == 0 && i == 0 {
			record = nil
		}
		return record, end + 1, true
	}
}

// cell returns the cell at text[i] and where it ends: at a delimiter, a line
// end, or the \r of one. ok is false when the text ends inside it.
func (d dialect) cell(text []byte, i int) (cell []byte, end int, ok bool) {
	if i < len(text) && text[i] == '"' {
		return d.quoted(text, i)
	}
	for end = i; end < len(text); end++ {
		c := text[end]
		if c == d.delimiter || c == '\n' {
			break
		}
	}
	if end == len(text) {
		return nil, end, false
	}
	if text[end] == '\n' && end > i && text[end-1] == '\r' {
		end--
	}
	return text[i:end], end, true
}

// quoted returns a cell that begins with a quote (RFC 4180). What stands
// between the closing quote and the next delimiter belongs to the cell.
func (d dialect) quoted(text []byte, i int) (cell []byte, end int, ok bool) {
	for end = i + 1; ; end++ {
		at := bytes.IndexByte(text[end:], '"')
		if at < 0 {
			return nil, len(text), false
		}
		end += at
		if end+1 < len(text) && text[end+1] == '"' {
			end++
			continue
		}
		break
	}
	inside := bytes.ReplaceAll(text[i+1:end], []byte(`""`), []byte(`"`))
	rest, end, ok := d.cell(text, end+1)
	if ok && len(bytes.TrimSpace(rest)) > 0 {
		inside = append(inside[:len(inside):len(inside)], rest...)
	}
	return inside, end, ok
}

// laterFormats are announced but not read yet.
var laterFormats = map[string]string{
	".xlsx": "a spreadsheet", ".xls": "a spreadsheet", ".ods": "a spreadsheet", ".parquet": "a Parquet file",
	".sqlite": "a SQLite database", ".db": "a SQLite database", ".zip": "a zip archive",
}

// refusedByName refuses files that are not delimited text by their name.
func refusedByName(written string) *Trouble {
	name := strings.ToLower(written)
	if strings.HasSuffix(name, ".toml") {
		return unreadable("%q is a document, not a data file; name a .csv, .tsv or .txt file", written)
	}
	if what := laterFormats[path.Ext(name)]; what != "" {
		return unreadable("%q is %s, which is not read yet; save the table as .csv and name that file", written, what)
	}
	return nil
}
