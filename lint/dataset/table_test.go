package dataset

import (
	"bytes"
	"compress/gzip"
	"encoding/csv"
	"fmt"
	"math"
	"math/rand/v2"
	"strconv"
	"strings"
	"testing"

	"golang.org/x/text/encoding/charmap"
	"golang.org/x/text/encoding/unicode"

	"lagwise/lint/request"
)

// RFC 4180, section 2: records with CRLF, a last record without a line end,
// quoted cells with commas, line ends and doubled quotes.
func TestQuotesOfRFC4180(t *testing.T) {
	r := plainRead(t, "\"year\",\"site, \"\"old\"\"\",\"note\"\r\n2001,1.5,\"a\r\nb\"\r\n2002,\"2.5\",\"c,d\"\r\n2003,3.5,\"e\"\"f\"")
	if got := r.Headers[1]; got != `site, "old"` {
		t.Errorf("header %q", got)
	}
	c := column(t, r, `site, "old"`)
	if !equal(c.Values, []float64{1.5, 2.5, 3.5}) {
		t.Errorf("values %v", c.Values)
	}
	note := column(t, r, "note")
	if note.Numeric || note.Unparsed != 3 || note.UnparsedLine != 2 || note.UnparsedText != "a\r\nb" {
		t.Errorf("%+v", note)
	}
	if r.Axis.Repeated != 0 || r.Axis.First() != "2001" || r.Axis.Last() != "2003" {
		t.Errorf("%+v", r.Axis)
	}
}

func TestDialects(t *testing.T) {
	for name, c := range map[string]struct {
		rec  request.Record
		text string
	}{
		"comma":              {request.Record{}, "year,boats\n2001,1.5\n2002,-2.5\n2003,1000\n"},
		"semicolon":          {request.Record{}, "year;boats\n2001;1.5\n2002;-2.5\n2003;1000\n"},
		"tab":                {request.Record{}, "year\tboats\n2001\t1.5\n2002\t-2.5\n2003\t1000\n"},
		"pipe":               {request.Record{}, "year|boats\n2001|1.5\n2002|-2.5\n2003|1000\n"},
		"decimal comma":      {request.Record{Decimal: ","}, "year;boats\n2001;1,5\n2002;-2,5\n2003;1000\n"},
		"thousands":          {request.Record{Thousands: ","}, "year,boats\n2001,1.5\n2002,-2.5\n2003,\"1,000\"\n"},
		"German thousands":   {request.Record{Thousands: ".", Decimal: ","}, "year;boats\n2001;1,5\n2002;-2,5\n2003;1.000\n"},
		"byte order mark":    {request.Record{}, "\xEF\xBB\xBFyear,boats\n2001,1.5\n2002,-2.5\n2003,1000\n"},
		"CRLF":               {request.Record{}, "year,boats\r\n2001,1.5\r\n2002,-2.5\r\n2003,1000"},
		"trailing":           {request.Record{}, "year,boats,\n2001,1.5,\n2002,-2.5,\n2003,1000,\n"},
		"trailing in header": {request.Record{}, "year,boats,\n2001,1.5\n2002,-2.5\n2003,1000\n"},
		"trailing in rows":   {request.Record{}, "year,boats\n2001,1.5,\n2002,-2.5,\n2003,1000,\n"},
		"comments":           {request.Record{Comment: "#"}, "# made by hand\nyear,boats\n# one\n2001,1.5\n2002,-2.5\n#2\n2003,1000\n"},
		"blank lines":        {request.Record{}, "\nyear,boats\n\n2001,1.5\n2002,-2.5\r\n\r\n2003,1000\n\n"},
		"spaces":             {request.Record{}, "year , boats\n2001, 1.5\n2002 ,-2.5 \n 2003, 1000\n"},
		"units below":        {request.Record{HeaderRows: 2}, "year,boats\n,{count}\n2001,1.5\n2002,-2.5\n2003,1000\n"},
	} {
		rec := c.rec
		if rec.HeaderRows == 0 {
			rec.HeaderRows = 1
		}
		r, trouble := tryRead(&rec, c.text)
		if trouble != nil {
			t.Errorf("%s: %s", name, trouble.Message)
			continue
		}
		boats := column(t, r, "boats")
		if !equal(boats.Values, []float64{1.5, -2.5, 1000}) || r.Axis.StepText != "P1Y" || r.Axis.Column != "year" {
			t.Errorf("%s: %v along %+v", name, boats.Values, r.Axis)
		}
	}
}

func TestEncodings(t *testing.T) {
	text := "Jahr;Trübung (µg/L)\n2001;1.5\n2002;2.5\n"
	latin, _ := charmap.ISO8859_1.NewEncoder().String(text)
	windows, _ := charmap.Windows1252.NewEncoder().String(text)
	wide, _ := unicode.UTF16(unicode.BigEndian, unicode.UseBOM).NewEncoder().String(text)
	for name, c := range map[string]struct{ encoding, text string }{
		"utf-8": {"", text}, "latin-1": {"latin-1", latin}, "windows-1252": {"windows-1252", windows},
		"utf-16": {"utf-16", wide}, "utf-16 by its mark": {"", wide},
	} {
		r := mustRead(t, &request.Record{HeaderRows: 1, Encoding: c.encoding}, c.text)
		got := column(t, r, "Trübung")
		if got.HeaderUnit != "µg/L" || !equal(got.Values, []float64{1.5, 2.5}) {
			t.Errorf("%s: %+v", name, got)
		}
	}
	_, trouble := tryRead(&request.Record{HeaderRows: 1}, latin)
	wantMessage(t, trouble, "line 1 is not valid UTF-8", "latin-1")
	_, trouble = tryRead(&request.Record{HeaderRows: 1, Encoding: "ebcdic"}, text)
	wantMessage(t, trouble, "ebcdic", "windows-1252")
}

func TestMissingCensoredUnparsed(t *testing.T) {
	text := "year,x\n2001,1\n2002,\n2003,NA\n2004,n.d.\n2005,-\n2006,-9999\n2007,-9999.0\n2008,<0.05\n2009,lost\n2010,null\n2011,2\n2012,3\n2013,4\n"
	c := column(t, mustRead(t, &request.Record{HeaderRows: 1, Missing: []string{"-9999"}}, text), "x")
	if c.N != 4 || c.Missing != 7 || c.Censored != 1 || c.Unparsed != 1 || c.UnparsedLine != 10 || c.UnparsedText != "lost" || !c.Numeric {
		t.Errorf("%+v", c)
	}
	c = column(t, mustRead(t, &request.Record{HeaderRows: 1, MissingOnly: []string{"lost"}}, text), "x")
	if c.N != 6 || c.Missing != 2 || c.Unparsed != 4 {
		t.Errorf("missing-only: %+v", c)
	}
}

func TestSuspectedMissingCode(t *testing.T) {
	for text, want := range map[string]float64{
		"3 4 -999 5 -999 6": -999, "3 4 -99.9 5 -99.9": -99.9, "3 4 9999 9999 5": 9999, "3 4 -999 5": 0, // once is not repeated
		"97 98 99 99 96": 0, "5000 -999 -999 4000 20": -999, "-1200 -999 -999 800": 0, "3 -5 -5 4": 0,
	} {
		r := plainRead(t, "x\n"+strings.ReplaceAll(text, " ", "\n")+"\n")
		if c := r.Columns[0]; c.Suspect != want || (c.SuspectCount > 0) != (want != 0) {
			t.Errorf("%s: got %v (%d), want %v", text, c.Suspect, c.SuspectCount, want)
		}
	}
}

func TestBlankLineOfOneColumnIsMissing(t *testing.T) {
	r := plainRead(t, "x\n1\n\n3\n\n\n")
	if c := r.Columns[0]; !equal(c.Values, []float64{1, math.NaN(), 3}) || c.Missing != 1 || r.Rows != 3 {
		t.Errorf("%+v", c)
	}
}

// Random files against encoding/csv and strconv, read in pieces that end
// anywhere.
func TestAgainstTheStandardLibrary(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 9))
	for round := range 60 {
		width, rows := 1+r.IntN(6), 1+r.IntN(400)
		if round%20 == 0 {
			rows = 60_000
		}
		text := randomCSV(r, width, rows)
		reader := csv.NewReader(strings.NewReader(text))
		reader.LazyQuotes = true
		records, err := reader.ReadAll()
		if err != nil {
			t.Fatal(err)
		}
		got := mustRead(t, &request.Record{HeaderRows: 1, Delimiter: ",", Along: &request.Along{Kind: request.Sequence}}, text)
		if got.Rows != len(records)-1 {
			t.Fatalf("round %d: %d rows, want %d", round, got.Rows, len(records)-1)
		}
		for c := range width {
			want := make([]float64, got.Rows)
			unparsed := 0
			for i, record := range records[1:] {
				cell := strings.TrimSpace(record[c])
				v, err := strconv.ParseFloat(cell, 64)
				if err != nil {
					v = math.NaN()
					if cell != "" && cell != "NA" {
						unparsed++
					}
				}
				want[i] = v
			}
			column := got.Columns[c]
			if column.Numeric && !equal(column.Values, want) || column.Unparsed != unparsed || column.N+column.Missing+column.Unparsed != got.Rows && column.Numeric {
				t.Fatalf("round %d column %d: %+v, want %d unparsed", round, c, column.Unparsed, unparsed)
			}
		}
	}
}

func randomCSV(r *rand.Rand, width, rows int) string {
	var b strings.Builder
	for c := range width {
		fmt.Fprintf(&b, "c%d%s", c, map[bool]string{true: ",", false: "\n"}[c < width-1])
	}
	for range rows {
		for c := range width {
			switch r.IntN(12) {
			case 0:
				fmt.Fprint(&b, map[bool]string{true: "NA", false: ""}[width == 1 || r.IntN(2) == 0])
			case 1:
				fmt.Fprintf(&b, `"%.2f"`, r.NormFloat64())
			case 2:
				fmt.Fprintf(&b, "\"a\nb\"\"%s,c\"", strings.Repeat("z", r.IntN(9)))
			case 3:
				fmt.Fprint(&b, r.NormFloat64())
			default:
				fmt.Fprintf(&b, "%.*f", r.IntN(8), 1e3*r.NormFloat64())
			}
			if c < width-1 {
				b.WriteByte(',')
			}
		}
		b.WriteString("\n")
	}
	return b.String()
}

func gzipped(text string) string {
	var b bytes.Buffer
	w := gzip.NewWriter(&b)
	w.Write([]byte(text))
	w.Close()
	return b.String()
}

func TestCompressed(t *testing.T) {
	r := mustRead(t, &request.Record{HeaderRows: 1, File: "weir.csv.gz"}, gzipped("year,nitrate\n2001,1\n2002,2\n"))
	if !equal(column(t, r, "nitrate").Values, []float64{1, 2}) {
		t.Error("values")
	}
	_, trouble := tryRead(&request.Record{HeaderRows: 1, File: "weir.csv.gz"}, "year,nitrate\n")
	wantMessage(t, trouble, "not a gzip file")
	_, trouble = tryRead(&request.Record{HeaderRows: 1, File: "weir.csv.gz", Comment: "#"}, gzipped("x\n#"+strings.Repeat(strings.Repeat(" ", 1000)+"\n#", 40_000)+"\n1\n"))
	if trouble == nil || trouble.Kind != ReachedLimit {
		t.Errorf("a bomb of ratio 1000 was read: %v", trouble)
	}
	whole := gzipped("year,nitrate\n2001,1\n2002,2\n")
	_, trouble = tryRead(&request.Record{HeaderRows: 1, File: "weir.csv.gz"}, whole[:len(whole)-6])
	wantMessage(t, trouble, "could not be read to its end")
}

func TestHostileTexts(t *testing.T) {
	wide := strings.Repeat("c,", 49_999) + "c\n" + strings.Repeat("1,", 49_999) + "1\n"
	for name, c := range map[string]struct {
		text string
		kind TroubleKind
		want string
	}{
		"empty":             {"", UnreadableRecord, "empty"},
		"blank":             {"\n\n\n", UnreadableRecord, "header"},
		"header only":       {"year,boats\n", UnreadableRecord, "no row of data"},
		"NUL":               {"year,boats\n2001,1\n2002,\x00\n", UnreadableRecord, "not a text file: line 3"},
		"binary":            {"\x7fELF\x02\x01\x00\x00", UnreadableRecord, "not a text file"},
		"invalid UTF-8":     {"year,boats\n2001,1\n2002,\xff\n", UnreadableRecord, "line 3 is not valid UTF-8"},
		"50,000 columns":    {wide, ReachedLimit, "limit columns of 16384 columns is reached (50000 here)"},
		"a short line":      {"year,boats,x\n2001,1,1\n2002,2\n", UnreadableRecord, "line 3 has 2 cells where the header has 3"},
		"a long line":       {"year,boats\n2001,1\n2002,2,3\n", UnreadableRecord, "line 3 has 3 cells where the header has 2"},
		"an open quote":     {"year,boats\n2001,1\n2002,\"2\n2003,3\n", UnreadableRecord, "line 3 is never closed"},
		"an endless line":   {"year,boats\n2001,\"" + strings.Repeat("x", 5<<20), ReachedLimit, "line-bytes"},
		"an endless header": {strings.Repeat("x", 5<<20), ReachedLimit, "line-bytes"},
		"old line ends":     {"year,boats\r2001,1\r2002,2", UnreadableRecord, "bare carriage return"},
	} {
		_, trouble := tryRead(&request.Record{HeaderRows: 1}, c.text)
		if trouble == nil || trouble.Kind != c.kind || !strings.Contains(trouble.Message, c.want) {
			t.Errorf("%s: %+v", name, trouble)
		}
		if trouble != nil && len(trouble.Message) > 400 {
			t.Errorf("%s: a message of %d bytes", name, len(trouble.Message))
		}
	}
}

func TestCellsAreBoundedBeforeTheyAreAllocated(t *testing.T) {
	limits := DefaultLimits()
	limits.Cells = 1000
	text := "a,b\n" + strings.Repeat("1,2\n", 600)
	_, trouble := readRecord(t.Context(), strings.NewReader(text), 1<<50, &request.Record{File: "x.csv", HeaderRows: 1}, limits)
	if trouble == nil || trouble.Kind != ReachedLimit || !strings.Contains(trouble.Message, "cells") {
		t.Errorf("%+v", trouble)
	}
}

func TestUnknownColumn(t *testing.T) {
	r := plainRead(t, "year,nitrate (mg/L),boats\n2001,1,2\n2002,2,3\n")
	_, trouble := r.Column("nitrat")
	if trouble == nil || trouble.Kind != UnknownColumn || trouble.Column != "nitrat" {
		t.Fatalf("%+v", trouble)
	}
	_, trouble = r.Column("boat")
	if trouble.Nearest != "boats" {
		t.Errorf("%+v", trouble)
	}
	if c := column(t, r, "nitrate"); c.HeaderUnit != "mg/L" || c != column(t, r, "nitrate (mg/L)") {
		t.Errorf("%+v", c)
	}
	r = mustRead(t, &request.Record{HeaderRows: 1, Delimiter: ","}, "year;boats\n2001;2\n2002;3\n")
	if r.SplitBy != ";" {
		t.Errorf("split by %q", r.SplitBy)
	}
	_, trouble = r.Column("boats")
	wantMessage(t, trouble, `delimiter = ";"`)
	_, trouble = plainRead(t, "x,x\n1,2\n3,4\n").Column("x")
	wantMessage(t, trouble, "several columns")
}

func TestTextInANumberColumn(t *testing.T) {
	r := plainRead(t, "year,site\n2001,weir\n2002,quay\n")
	_, trouble := r.Series(&request.Series{Name: "site"}, &request.Record{})
	wantMessage(t, trouble, `"weir" on line 2`)
}

func TestOneRowAndConstant(t *testing.T) {
	r := plainRead(t, "year,boats\n2001,7\n")
	if r.Rows != 1 || r.Axis.Step != 0 || r.Columns[1].Constant {
		t.Errorf("%+v %+v", r.Axis, r.Columns[1])
	}
	r = plainRead(t, "year,boats\n2001,7\n2002,7\n2003,\n")
	if seen := r.SeenOf(&request.Series{Name: "boats"}, &request.Record{}); !seen.Constant || seen.Value != 7 {
		t.Errorf("%+v", seen)
	}
}

func TestNoHeader(t *testing.T) {
	r := mustRead(t, &request.Record{HeaderRows: 0}, "2001,5\n2002,6\n2003,7\n")
	if r.Rows != 3 || !equal(column(t, r, "2").Values, []float64{5, 6, 7}) || r.Axis.Column != "1" {
		t.Errorf("%+v %+v", r, r.Axis)
	}
}
