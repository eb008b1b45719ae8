package dataset

import (
	"bytes"
	"context"
	"io"
	"regexp"
	"strings"

	"lagwise/lint/request"
)

// Record is one data file as columns along an axis.
type Record struct {
	Axis    *Axis
	Columns []*Column
	Headers []string // as they stand in the file
	Rows    int      // of data in the file
	SplitBy string   // the delimiter by which the file looks split although another is used
	Groups  []string // labels of the groups, in the order of the file
	table   *table   // to find columns by name
}

// Column is one column of a record, in the order of the axis.
type Column struct {
	Name         string // the header without a unit behind it
	HeaderUnit   string // of a header like "no3 (mg/L)"
	Numeric      bool   // most of what stands in it are numbers
	Values       []float64
	N            int // numbers
	Missing      int // empty cells and missing codes
	Unparsed     int // cells that are neither
	UnparsedLine int // of the first of them
	UnparsedText string
	Censored     int     // cells like <0.05: no number is taken from them
	Suspect      float64 // a repeated extreme like -999
	SuspectCount int
	Constant     bool
	digest       onceDigest
}

var headerUnit = regexp.MustCompile(`^(.*\S)\s*[(\[]([^()\[\]]*)[)\]]$`)

// splitHeader parts a header into name and unit.
func splitHeader(header string) (name, unit string) {
	if m := headerUnit.FindStringSubmatch(header); m != nil && strings.TrimSpace(m[2]) != "" {
		return m[1], strings.TrimSpace(m[2])
	}
	return header, ""
}

// readRecord reads an open file as a manifest says.
func readRecord(ctx context.Context, f io.Reader, size int64, rec *request.Record, limits Limits) (*Record, *Trouble) {
	if trouble := refusedByName(rec.File); trouble != nil {
		return nil, trouble
	}
	d, trouble := declaredDialect(rec)
	if trouble != nil {
		return nil, trouble
	}
	text, trouble := openText(f, rec, limits)
	if trouble != nil {
		return nil, trouble
	}
	t := &table{dialect: d, limits: limits, line: 1}
	b := newBlocks(text, limits)
	sample, trouble := t.begin(b, rec)
	if trouble != nil {
		return nil, trouble
	}
	splitBy := t.splitBy(sampleText(b))
	plan, trouble := t.prepare(rec, sample)
	if trouble != nil {
		trouble.SplitBy = splitBy
		return nil, trouble
	}
	if trouble := t.grow(expectedRows(b, sample, size)); trouble != nil {
		return nil, trouble
	}
	if trouble := t.read(b, ctx.Err); trouble != nil {
		return nil, trouble
	}
	r := t.asRecord(plan, rec)
	r.SplitBy = splitBy
	return r, nil
}

const sampleRows = 200

// begin infers the delimiter, reads the header and looks at the first rows.
func (t *table) begin(b *blocks, rec *request.Record) (sample [][][]byte, trouble *Trouble) {
	if err := b.fill(); err != nil {
		return nil, readError(err)
	}
	for !b.done && bytes.Count(b.text(), []byte{'\n'}) <= t.header+1 && int64(len(b.text())) < t.limits.LineBytes {
		if err := b.fill(); err != nil {
			return nil, readError(err)
		}
	}
	whole := b.text()[:bytes.LastIndexByte(b.text(), '\n')+1]
	if trouble := t.legible(whole); trouble != nil {
		return nil, trouble
	}
	if len(b.text()) == 0 {
		return nil, unreadable("the file is empty")
	}
	if len(whole) == 0 {
		return nil, reached("line-bytes", t.limits.LineBytes, int64(len(b.text())), "bytes in one line")
	}
	if t.delimiter == 0 {
		t.delimiter = t.infer(rec.File, whole)
	}
	if trouble := t.readHeader(b, whole); trouble != nil {
		return nil, trouble
	}
	rest := sampleText(b)
	for len(sample) < sampleRows && len(rest) > 0 {
		record, used, ok := t.record(rest)
		if !ok {
			break
		}
		if rest = rest[used:]; record != nil {
			sample = append(sample, record)
		}
	}
	return sample, nil
}

// sampleText returns the whole lines that were read and not consumed.
func sampleText(b *blocks) []byte {
	return b.text()[:bytes.LastIndexByte(b.text(), '\n')+1]
}

// readHeader consumes the header lines and makes the columns. Below a first
// header line, a second one gives units.
func (t *table) readHeader(b *blocks, text []byte) *Trouble {
	var rows [][][]byte
	for len(rows) < max(1, t.header) {
		record, used, ok := t.dialect.record(text)
		if !ok || used == 0 {
			return unreadable("the file ends inside its header")
		}
		if int64(used) > t.limits.LineBytes {
			return reached("line-bytes", t.limits.LineBytes, int64(used), "bytes in one line")
		}
		if at := bytes.IndexByte(text[:used], '\r'); at >= 0 && at+1 < used && text[at+1] != '\n' && !bytes.Contains(text[:at], []byte{'"'}) {
			return unreadable("the header holds a bare carriage return; save the file with line feeds (or CR LF) as line ends")
		}
		if record != nil {
			rows = append(rows, record)
		}
		if t.header > 0 || record == nil {
			t.line += bytes.Count(text[:used], []byte{'\n'})
			b.start += used
		}
		text = text[used:]
	}
	if n := int64(len(rows[0])); n > t.limits.Columns {
		return reached("columns", t.limits.Columns, n, "columns")
	}
	for i := range rows[0] {
		header := unnamed(i)
		if t.header > 0 {
			header = string(rows[0][i])
		}
		c := &cells{}
		c.name, c.unit = splitHeader(header)
		if c.unit == "" && len(rows) > 1 && i < len(rows[1]) {
			c.unit = strings.Trim(string(rows[1][i]), "()[] ")
		}
		t.headers = append(t.headers, header)
		t.columns = append(t.columns, c)
	}
	t.values = make([][]float64, len(t.columns))
	return nil
}

// prepare gives the columns of axis and groups their roles.
func (t *table) prepare(rec *request.Record, sample [][][]byte) (axisPlan, *Trouble) {
	t.codes = missingCodes(rec, t.point)
	if rec.Group != "" {
		at, trouble := t.find(rec.Group)
		if trouble != nil {
			return axisPlan{}, trouble
		}
		t.columns[at].role = groupRole
		t.group = []int32{}
	}
	plan, trouble := planAxis(t, rec, sample)
	if trouble != nil {
		return plan, trouble
	}
	if plan.column >= 0 && plan.clock != nil {
		t.columns[plan.column].role = timeRole
		t.clock = plan.clock
	}
	for _, c := range t.columns {
		t.plain = append(t.plain, c.role == plainRole)
	}
	return plan, nil
}

// expectedRows estimates the rows of a file from the length of its first.
func expectedRows(b *blocks, sample [][][]byte, size int64) int {
	text := sampleText(b)
	lines := bytes.Count(text, []byte{'\n'})
	if b.done || lines == 0 {
		return lines + 1
	}
	mean := float64(len(text)) / float64(lines)
	return int(float64(size)/mean*1.02) + 64
}

// asRecord turns a table that was read into a record.
func (t *table) asRecord(plan axisPlan, rec *request.Record) *Record {
	var declared request.Period
	if rec.Along != nil {
		declared, _ = request.ParsePeriod(rec.Along.Step)
	}
	r := &Record{Headers: t.headers, Rows: t.rows, Groups: t.labels, table: t}
	axis, order := makeAxis(t, plan, declared)
	r.Axis = axis
	for i, c := range t.columns {
		if t.headers[i] == "" && c.numbers() == 0 && c.unparsed == 0 {
			r.Columns = append(r.Columns, &Column{}) // made by a trailing delimiter
			continue
		}
		r.Columns = append(r.Columns, t.column(i, plan, axis, order))
	}
	t.values, t.group = nil, nil
	for _, c := range t.columns {
		c.values = nil
	}
	return r
}

func (t *table) column(i int, plan axisPlan, axis *Axis, order []int) *Column {
	c := t.columns[i]
	column := &Column{Name: c.name, HeaderUnit: c.unit, Missing: c.missing, Unparsed: c.unparsed,
		UnparsedLine: c.unparsedLine, UnparsedText: c.unparsedText, Censored: c.censored}
	if i == plan.column && c.role == timeRole {
		column.Numeric, column.Values, column.N = axis.Unit == Year, axis.Positions, len(axis.Positions)
		return column
	}
	if !c.numeric() {
		return column
	}
	column.Numeric, column.Values, column.N = true, c.values, c.numbers()
	if order != nil {
		column.Values = arranged(c.values, order)
	}
	if low, high, any := bounds(column.Values); any {
		column.Constant = low == high && column.N > 1
		column.Suspect, column.SuspectCount = suspect(column.Values, low, high)
	}
	return column
}

// Column returns a column by name: as the header has it, or without the unit
// behind it. The trouble names the nearest column there is.
func (r *Record) Column(name string) (*Column, *Trouble) {
	i, trouble := r.table.find(name)
	if trouble != nil {
		if r.SplitBy != "" {
			trouble.Message += "; the file looks split by another delimiter: delimiter = " + quotedDelimiter(r.SplitBy)
		}
		return nil, trouble
	}
	return r.Columns[i], nil
}

func quotedDelimiter(d string) string {
	if d == "\t" {
		return `"\t"`
	}
	return `"` + d + `"`
}
