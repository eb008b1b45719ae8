package dataset

import (
	"fmt"
	"strings"
	"testing"

	"lagwise/lint/request"
)

// rowsOf makes a file of a position column and a counter.
func rowsOf(header string, positions ...string) string {
	var b strings.Builder
	fmt.Fprintf(&b, "%s,x\n", header)
	for i, p := range positions {
		fmt.Fprintf(&b, "%s,%d\n", p, i+1)
	}
	return b.String()
}

func TestAxesAreFoundAndMeasured(t *testing.T) {
	for name, c := range map[string]struct {
		text        string
		column      string
		kind        request.AxisKind
		unit        AxisUnit
		step        string
		even        bool
		gaps        int
		first, last string
	}{
		"years":            {rowsOf("year", "1990", "1991", "1992", "1993"), "year", "time", Year, "P1Y", true, 0, "1990", "1993"},
		"years by value":   {rowsOf("saison", "1990", "1991", "1992", "1993"), "saison", "time", Year, "P1Y", true, 0, "1990", "1993"},
		"a gap":            {rowsOf("year", "1990", "1991", "1992", "1995", "1996"), "year", "time", Year, "P1Y", true, 1, "1990", "1996"},
		"uneven years":     {rowsOf("year", "1990", "1993", "1994", "2001", "2003", "2010"), "year", "time", Year, "P7Y", false, 0, "1990", "2010"},
		"months":           {rowsOf("month", "1999-11", "1999-12", "2000-01", "2000-02"), "month", "time", Month, "P1M", true, 0, "1999-11", "2000-02"},
		"quarters":         {rowsOf("quarter", "1999-Q3", "1999-Q4", "2000-Q1", "2000-Q2"), "quarter", "time", Month, "P3M", true, 0, "1999-Q3", "2000-Q2"},
		"days of February": {rowsOf("d", "2000-02-27", "2000-02-28", "2000-02-29", "2000-03-01"), "d", "time", Day, "P1D", true, 0, "2000-02-27", "2000-03-01"},
		"weeks":            {rowsOf("w", "2004-W52", "2004-W53", "2005-W01", "2005-W02"), "w", "time", Day, "P7D", true, 0, "2004-12-20", "2005-01-10"},
		"months as days":   {rowsOf("date", "2001-01-15", "2001-02-15", "2001-03-15", "2001-05-15"), "date", "time", Month, "P1M", true, 1, "2001-01", "2001-05"},
		"month ends":       {rowsOf("date", "2001-01-31", "2001-02-28", "2001-03-31", "2001-04-30"), "date", "time", Month, "P1M", true, 0, "2001-01", "2001-04"},
		"years as days":    {rowsOf("date", "1999-08-01", "2000-08-01", "2001-08-01"), "date", "time", Year, "P1Y", true, 0, "1999", "2001"},
		"hours":            {rowsOf("t", "2001-03-01T22:00", "2001-03-01T23:00", "2001-03-02T00:00", "2001-03-02T01:00"), "t", "time", Second, "PT1H", true, 0, "2001-03-01T22:00", "2001-03-02T01:00"},
		"quarter hours":    {rowsOf("t", "2001-03-01 00:00", "2001-03-01 00:15", "2001-03-01 00:30", "2001-03-01 01:00"), "t", "time", Second, "PT15M", true, 1, "2001-03-01T00:00", "2001-03-01T01:00"},
		"days at nine":     {rowsOf("t", "2001-03-01T09:00Z", "2001-03-02T09:00Z", "2001-03-03T09:00Z"), "t", "time", Day, "P1D", true, 0, "2001-03-01", "2001-03-03"},
		"depth":            {rowsOf("depth (cm)", "0.5", "1", "1.5", "2.5"), "depth", "depth", Number, "0.5", true, 1, "0.5", "2.5"},
		"uneven depth":     {rowsOf("depth", "1", "5", "6", "22", "23", "40"), "depth", "depth", Number, "1", false, 0, "1", "40"},
		"age":              {rowsOf("age", "0.1", "0.2", "0.3", "0.4"), "age", "age", Number, "0.1", true, 0, "0.4", "0.1"},
		"sequence":         {rowsOf("n", "3", "1", "2", "9"), "", "sequence", Row, "1", true, 0, "1", "4"},
		"compact days":     {rowsOf("date", "20010101", "20010102", "20010103"), "date", "time", Day, "P1D", true, 0, "2001-01-01", "2001-01-03"},
		// NIST handbook 6.4.4.1.2: decimal year = year + (month - 0.5)/12.
		"NIST months":           {rowsOf("year", "1974.38", "1974.46", "1974.54", "1974.63", "1974.71", "1974.79"), "year", "time", Month, "P1M", true, 0, "1974-05", "1974-10"},
		"months from the start": {rowsOf("year", "1990.000", "1990.083", "1990.167", "1990.250", "1990.333"), "year", "time", Month, "P1M", true, 0, "1990-01", "1990-05"},
		"mid years":             {rowsOf("year", "1990.5", "1991.5", "1992.5", "1993.5"), "year", "time", Year, "P1Y", true, 0, "1990", "1993"},
		"mid quarters":          {rowsOf("year", "1990.125", "1990.375", "1990.625", "1990.875"), "year", "time", Month, "P3M", true, 0, "1990-01", "1990-10"},
	} {
		a := plainRead(t, c.text).Axis
		if a.Column != c.column || a.Kind != c.kind || a.Unit != c.unit || a.StepText != c.step || a.Even != c.even || a.Gaps != c.gaps || a.Unparsed != 0 {
			t.Errorf("%s: %q %s unit %d step %s even %v gaps %d", name, a.Column, a.Kind, a.Unit, a.StepText, a.Even, a.Gaps)
		}
		if first, last := a.First(), a.Last(); c.unit != Number && (first != c.first || last != c.last) {
			t.Errorf("%s: %s to %s", name, first, last)
		}
	}
}

func TestOrderOfTheFile(t *testing.T) {
	r := plainRead(t, rowsOf("year", "1993", "1992", "1991", "1990"))
	if a := r.Axis; !a.Backward || a.Unsorted || !equal(column(t, r, "x").Values, []float64{4, 3, 2, 1}) || !equal(a.Positions, []float64{1990, 1991, 1992, 1993}) {
		t.Errorf("reversed years: %+v", a)
	}
	r = mustRead(t, along("year", request.Time), rowsOf("year", "1993", "1990", "1991", "1992"))
	if a := r.Axis; a.Backward || !a.Unsorted || !equal(column(t, r, "x").Values, []float64{2, 3, 4, 1}) {
		t.Errorf("unsorted years: %+v", a)
	}
	r = mustRead(t, along("year", request.Time), rowsOf("year", "1990", "1991", "1991", "1992", "1990"))
	if a := r.Axis; a.Repeated != 2 || a.FirstRepeated != "1991" || a.RepeatedLine != 4 {
		t.Errorf("duplicate years: %+v", a)
	}
	r = mustRead(t, along("year", request.Time), rowsOf("year", "1990", "spring", "1992", "", "1993"))
	if a := r.Axis; a.Unparsed != 2 || a.UnparsedLine != 3 || a.UnparsedText != "spring" || !equal(column(t, r, "x").Values, []float64{1, 3, 5}) {
		t.Errorf("unparsed years: %+v", a)
	}
}

// Ages run backwards in time: positions are turned, so that a change is one
// forward in time, and what is printed is the age.
func TestAgesRunForwardInTime(t *testing.T) {
	r := mustRead(t, along("age", request.Age, func(a *request.Along) { a.Unit = "ka" }), rowsOf("age", "1", "2", "3", "4"))
	a := r.Axis
	if a.Backward || !equal(a.Positions, []float64{-4, -3, -2, -1}) || !equal(column(t, r, "x").Values, []float64{4, 3, 2, 1}) {
		t.Errorf("%+v", a)
	}
	if a.Format(a.Positions[0]) != "4" || a.Per() != "ka" {
		t.Errorf("%s per %s", a.Format(a.Positions[0]), a.Per())
	}
	f := align(t, &request.Request{Kind: request.Correlation, From: "3", Until: "1"}, one(t, r, "x"))
	g := align(t, &request.Request{Kind: request.Correlation, From: "1", Until: "3"}, one(t, r, "x"))
	for _, f := range []*Frame{f, g} {
		if !equal(f.Positions, []float64{-3, -2, -1}) || f.From != "3" || f.Until != "1" {
			t.Errorf("%+v", f)
		}
	}
}

func TestAmbiguousDatesAreNeverGuessed(t *testing.T) {
	text := rowsOf("date", "01/02/2003", "01/03/2003", "01/04/2003")
	for _, r := range []*Record{plainRead(t, text), mustRead(t, along("date", request.Time), text)} {
		if !r.Axis.Ambiguous || r.Axis.UnparsedText != "01/02/2003" || r.Axis.UnparsedLine != 2 || r.Axis.Unparsed != 3 {
			t.Errorf("%+v", r.Axis)
		}
		_, err := Align(t.Context(), []*Series{one(t, r, "x")}, correlation("x"))
		wantMessage(t, err, "two ways", "format")
	}
	a := mustRead(t, along("date", request.Time, func(a *request.Along) { a.Format = "%d/%m/%Y" }), text).Axis
	if a.Ambiguous || a.StepText != "P1M" || a.First() != "2003-02" {
		t.Errorf("%+v", a)
	}
}

func TestDeclaredDaysStayDays(t *testing.T) {
	text := rowsOf("date", "2001-01-01", "2001-02-01", "2001-03-01")
	a := mustRead(t, along("date", request.Time, func(a *request.Along) { a.Step = "P1D" }), text).Axis
	if a.Unit != Day || a.StepText != "P31D" && a.StepText != "P28D" {
		t.Errorf("%+v", a)
	}
}

func TestGroups(t *testing.T) {
	rec := along("", request.Sequence)
	rec.Group = "animal"
	r := mustRead(t, rec, "animal,x\na,1\na,2\nb,3\na,4\nb,5\n")
	if !equal(column(t, r, "x").Values, []float64{1, 2, 4, 3, 5}) || len(r.Groups) != 2 {
		t.Errorf("%v %v", column(t, r, "x").Values, r.Groups)
	}
	f := align(t, correlation("x"), one(t, r, "x"))
	if fmt.Sprint(f.Runs) != "[3 5]" || !equal(f.Positions, []float64{1, 2, 3, 1, 2}) {
		t.Errorf("runs %v of %v", f.Runs, f.Positions)
	}
	req := correlation("x")
	req.GroupList = []string{"b"}
	if f := align(t, req, one(t, r, "x")); !equal(f.Columns[0], []float64{3, 5}) || fmt.Sprint(f.Groups()) != "[b]" {
		t.Errorf("%+v", f)
	}
}

func TestSeasons(t *testing.T) {
	months := plainRead(t, rowsOf("month", "1999-11", "1999-12", "2000-01", "2000-02")).Axis
	quarters := plainRead(t, rowsOf("q", "1999-Q3", "1999-Q4", "2000-Q1", "2000-Q2")).Axis
	hours := plainRead(t, rowsOf("t", "2001-03-01T22:00", "2001-03-01T23:00", "2001-03-02T00:00")).Axis
	days := plainRead(t, rowsOf("t", "2001-03-01", "2001-03-02", "2001-03-03")).Axis
	years := plainRead(t, rowsOf("year", "2001", "2002", "2003")).Axis
	for _, c := range []struct {
		declared string
		axis     *Axis
		want     int
	}{{"", months, 12}, {"", quarters, 4}, {"", hours, 24}, {"", days, 0}, {"", years, 0}, {"false", months, 0}, {"P1Y", months, 12},
		{"P1Y", days, 365}, {"P7D", days, 7}, {"P1D", hours, 24}, {"6", months, 6}, {"P11Y", years, 11}, {"1", months, 0}, {"P1M", months, 0}} {
		if got := seasonOf(c.declared, c.axis); got != c.want {
			t.Errorf("%q at %s: got %d, want %d", c.declared, c.axis.StepText, got, c.want)
		}
	}
}
