package dataset

import (
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"lagwise/lint/request"
	"lagwise/stats"
)

func TestSharedRowsOfTwoRecords(t *testing.T) {
	a := one(t, plainRead(t, "year,a\n2000,1\n2001,2\n2002,\n2003,4\n2004,5\n2005,6\n"), "a")
	b := one(t, plainRead(t, "year,b\n2001,12\n2002,13\n2003,14\n2004,15\n2006,17\n"), "b")
	f := align(t, correlation("a", "b"), a, b)
	if !equal(f.Positions, []float64{2001, 2003, 2004}) || !equal(f.Columns[0], []float64{2, 4, 5}) || !equal(f.Columns[1], []float64{12, 14, 15}) {
		t.Errorf("%+v", f)
	}
	// 2002 is missing in a, so that the run ends there; 2000, 2002, 2005 and 2006 are not shared.
	if fmt.Sprint(f.Runs) != "[1 3]" || f.Lost != 4 || !f.Even || f.From != "2001" || f.Until != "2004" || f.StepText != "P1Y" {
		t.Errorf("%+v", f)
	}
	if runs := f.SeriesRuns(1); len(runs) != 2 || !equal(runs[1], []float64{14, 15}) {
		t.Errorf("%v", runs)
	}
	if !equal(a.Values, []float64{1, 2, math.NaN(), 4, 5, 6}) {
		t.Error("an input was changed")
	}
}

func TestWindow(t *testing.T) {
	months := rowsOf("month", "1999-11", "1999-12", "2000-01", "2000-02", "2000-12", "2001-01")
	r := plainRead(t, months)
	for bounds, want := range map[[2]string]string{
		{"2000", "2000"}: "2000-01 2000-12", {"", "1999"}: "1999-11 1999-12", {"1999-12", "2000-02-11"}: "1999-12 2000-02",
		{"2000-Q1", ""}: "2000-01 2001-01", {"", ""}: "1999-11 2001-01",
	} {
		req := correlation("x")
		req.From, req.Until = bounds[0], bounds[1]
		f := align(t, req, one(t, r, "x"))
		if got := f.From + " " + f.Until; got != want {
			t.Errorf("%v: got %s, want %s", bounds, got, want)
		}
	}
	r = plainRead(t, rowsOf("year", "1999", "2000", "2001"))
	req := correlation("x")
	req.From, req.Until = "2000-06-01", "2001-01-01"
	if f := align(t, req, one(t, r, "x")); !equal(f.Positions, []float64{2000, 2001}) {
		t.Errorf("%+v", f)
	}
	req.From = "soon"
	_, err := Align(t.Context(), []*Series{one(t, r, "x")}, req)
	wantMessage(t, err, `from = "soon"`, "1999")
	req.From, req.Until = "2050", ""
	_, err = Align(t.Context(), []*Series{one(t, r, "x")}, req)
	var u *stats.Undefined
	if !errors.As(err, &u) || u.Reason != stats.TooShort {
		t.Errorf("%v", err)
	}
}

func TestLags(t *testing.T) {
	r := plainRead(t, "year,a,b\n2000,1,11\n2001,2,12\n2002,3,13\n2003,4,14\n")
	a, b := one(t, r, "a"), one(t, r, "b")
	req := correlation("a", "b")
	req.Lag = 1 // b trails a: b of 2001 meets a of 2000
	if f := align(t, req, a, b); !equal(f.Columns[0], []float64{1, 2, 3}) || !equal(f.Columns[1], []float64{12, 13, 14}) || f.From != "2001" {
		t.Errorf("%+v", f)
	}
	req.Lag = -2
	if f := align(t, req, a, b); !equal(f.Columns[0], []float64{3, 4}) || !equal(f.Columns[1], []float64{11, 12}) {
		t.Errorf("%+v", f)
	}
	reg := &request.Request{Kind: request.Regression, Response: "b", Predictors: []request.Predictor{{Series: "a", Lag: 1}}}
	if f := align(t, reg, b, a); !equal(f.Columns[0], []float64{12, 13, 14}) || !equal(f.Columns[1], []float64{1, 2, 3}) {
		t.Errorf("%+v", f)
	}
	uneven := one(t, plainRead(t, "year,c\n2000,1\n2003,2\n2004,3\n2011,4\n"), "c")
	_, err := Align(t.Context(), []*Series{uneven, a}, req)
	wantMessage(t, err, "uneven", "every")
}

func TestAYearNeverMatchesAMonth(t *testing.T) {
	years := one(t, plainRead(t, "year,a\n2000,1\n2001,2\n2002,3\n"), "a")
	months := one(t, plainRead(t, "month,b\n2000-01,1\n2000-02,2\n2000-03,3\n"), "b")
	days := one(t, plainRead(t, "day,c\n2000-01-01,1\n2000-01-02,2\n2000-01-03,3\n"), "c")
	weeks := one(t, plainRead(t, "day,d\n2000-01-03,1\n2000-01-10,2\n2000-01-17,3\n"), "d")
	depth := one(t, plainRead(t, "depth,e\n1,1\n2,2\n3,3\n"), "e")
	quarters := one(t, plainRead(t, "q,f\n2000-Q1,1\n2000-Q2,2\n2000-Q3,3\n"), "f")
	for _, c := range []struct {
		a, b          *Series
		wordA, wordB  string
		coarser, says string
	}{
		{years, months, "yearly (P1Y)", "monthly (P1M)", "P1Y", "every = \"P1Y\""}, {months, years, "monthly (P1M)", "yearly (P1Y)", "P1Y", ""},
		{months, days, "monthly (P1M)", "daily (P1D)", "P1M", ""}, {days, weeks, "daily (P1D)", "weekly (P7D)", "P7D", ""},
		{years, depth, "yearly (P1Y)", "every 1", "", ""}, {months, quarters, "monthly (P1M)", "quarterly (P3M)", "P3M", ""},
	} {
		_, err := Align(t.Context(), []*Series{c.a, c.b}, correlation("x", "y"))
		var m *Mismatch
		if !errors.As(err, &m) {
			t.Errorf("%s %s: %v", c.wordA, c.wordB, err)
			continue
		}
		if m.StepA != c.wordA || m.StepB != c.wordB || m.Coarser != c.coarser || !strings.Contains(m.Message, c.says) || m.A != c.a.Name || m.B != c.b.Name {
			t.Errorf("%+v", m)
		}
	}
	apart := one(t, plainRead(t, "year,g\n1900,1\n1901,2\n1902,3\n"), "g")
	_, err := Align(t.Context(), []*Series{years, apart}, correlation("a", "g"))
	wantMessage(t, err, "share no position", "2000 to 2002", "1900 to 1902")
}

// Dates that stand for years and months meet those written as such.
func TestCalendarStepsMeetHoweverTheyAreWritten(t *testing.T) {
	a := one(t, plainRead(t, "date,a\n1999-08-01,1\n2000-08-01,2\n2001-08-01,3\n"), "a")
	b := one(t, plainRead(t, "year,b\n2000,5\n2001,6\n2002,7\n"), "b")
	if f := align(t, correlation("a", "b"), a, b); !equal(f.Columns[0], []float64{2, 3}) || !equal(f.Columns[1], []float64{5, 6}) {
		t.Errorf("%+v", f)
	}
}

func monthly(t *testing.T, values func(month int) string, from, months int) *Series {
	t.Helper()
	var b strings.Builder
	b.WriteString("month,x\n")
	for m := from; m < from+months; m++ {
		fmt.Fprintf(&b, "%s,%s\n", formatMonth(m), values(m))
	}
	return one(t, plainRead(t, b.String()), "x")
}

// Aggregation by hand: 2000 has months 0..11 (mean 5.5, sum 66), 2001 lacks
// two of twelve (10/12 = 0.83 are there), 2002 lacks three (0.75).
func TestAggregationToYears(t *testing.T) {
	s := monthly(t, func(m int) string {
		year, month := m/12, m%12
		if year == 2001 && month >= 10 || year == 2002 && month >= 9 {
			return ""
		}
		return fmt.Sprint(month)
	}, 2000*12, 36)
	req := correlation("x")
	req.Every = "P1Y"
	for how, want := range map[string][]float64{
		"": {5.5, 4.5}, "mean": {5.5, 4.5}, "sum": {66, 54}, "median": {5.5, 4.5}, "last": {11, 9}, "maximum": {11, 9},
	} {
		req.Aggregate = how
		f := align(t, req, s)
		if !near(f.Columns[0], want, 1e-12) || !equal(f.Positions, []float64{2000, 2001}) || f.Unit != Year || f.StepText != "P1Y" || f.Season != 0 {
			t.Errorf("%s: %+v", how, f)
		}
	}
	req.Aggregate, req.LeastShare = "", 0.75
	if f := align(t, req, s); len(f.Positions) != 3 {
		t.Errorf("%+v", f.Positions)
	}
	req.LeastShare = 0.8
	summed := *s
	summed.Support = "sum" // its mean of the ten present months, for twelve
	if f := align(t, req, &summed); !near(f.Columns[0], []float64{66, 54}, 1e-12) {
		t.Errorf("%+v", f.Columns)
	}
}

// A water year is named by the year it ends in: October 2000 to September 2001
// is 2001 (common practice).
func TestWaterYears(t *testing.T) {
	s := monthly(t, func(m int) string { return fmt.Sprint(m - 2000*12) }, 2000*12, 30)
	req := correlation("x")
	req.Every, req.YearStarts = "P1Y", "10-01"
	f := align(t, req, s)
	if !equal(f.Positions, []float64{2001}) { // 2000 and 2002 lack too many months
		t.Fatalf("%+v", f.Positions)
	}
	if !near(f.Columns[0], []float64{(9 + 20) / 2.0}, 1e-12) {
		t.Errorf("%+v", f.Columns)
	}
}

func TestAggregationOfDays(t *testing.T) {
	var b strings.Builder
	b.WriteString("day,x\n")
	for d := dayNumber(2000, 1, 1); d <= dayNumber(2000, 12, 31); d++ {
		year, month, day := dateOf(d)
		fmt.Fprintf(&b, "%04d-%02d-%02d,%d\n", year, month, day, month)
	}
	s := one(t, plainRead(t, b.String()), "x")
	req := correlation("x")
	req.Every, req.Aggregate = "P1M", "sum"
	f := align(t, req, s) // each month's number times its days, 2000 being a leap year
	if want := []float64{31, 58, 93, 120, 155, 180, 217, 248, 270, 310, 330, 372}; !equal(f.Columns[0], want) || f.Unit != Month || f.Season != 12 {
		t.Errorf("%+v", f)
	}
	req.Every, req.Aggregate = "P7D", "mean"
	if f := align(t, req, s); f.From != "2000-01-03" || f.StepText != "P7D" { // 3 January 2000 was a Monday
		t.Errorf("%s %s", f.From, f.StepText)
	}
	req.Every = "P3M"
	if f := align(t, req, s); f.From != "2000-Q1" || f.Until != "2000-Q4" || f.Season != 4 {
		t.Errorf("%s %s %d", f.From, f.Until, f.Season)
	}
	for every, want := range map[string]string{"PT1H": "finer", "1 year": "ISO 8601", "P1M3D": "mixes", "0": "ISO 8601"} {
		req.Every = every
		_, err := Align(t.Context(), []*Series{s}, req)
		wantMessage(t, err, want)
	}
	yearly := one(t, plainRead(t, "year,a\n2000,1\n2001,2\n2002,3\n"), "a")
	req.Every = "P1M"
	_, err := Align(t.Context(), []*Series{yearly}, req)
	wantMessage(t, err, "finer", "yearly")
}

func TestRepeatedPositionsNeedAnAnswer(t *testing.T) {
	s := one(t, mustRead(t, along("year", request.Time), "year,x\n2000,1\n2001,2\n2001,4\n2002,5\n"), "x")
	_, err := Align(t.Context(), []*Series{s}, correlation("x"))
	wantMessage(t, err, "2001", "line 4", "group", "every")
	req := correlation("x")
	req.Every = "P1Y"
	if f := align(t, req, s); !equal(f.Columns[0], []float64{1, 3, 5}) {
		t.Errorf("%+v", f)
	}
}

func TestTolerance(t *testing.T) {
	a := one(t, plainRead(t, "depth,a\n1.0,1\n2.1,2\n3.0,3\n4.0,4\n"), "a")
	b := one(t, plainRead(t, "depth,b\n1.1,11\n2.0,12\n3.4,13\n4.0,14\n"), "b")
	req := correlation("a", "b")
	if f := align(t, req, a, b); !equal(f.Columns[1], []float64{14}) {
		t.Errorf("%+v", f)
	}
	req.Tolerance = "0.15"
	if f := align(t, req, a, b); !equal(f.Columns[1], []float64{11, 12, 14}) || f.Lost != 2 {
		t.Errorf("%+v", f)
	}
	req.Tolerance = "P1D"
	_, err := Align(t.Context(), []*Series{a, b}, req)
	wantMessage(t, err, "tolerance")
	days := one(t, plainRead(t, "day,a\n2000-01-01,1\n2000-01-05,2\n2000-01-20,3\n"), "a")
	late := one(t, plainRead(t, "day,b\n2000-01-02,1\n2000-01-05,2\n2000-01-22,3\n"), "b")
	if f := align(t, req, days, late); !equal(f.Columns[1], []float64{1, 2}) || f.Even {
		t.Errorf("%+v", f)
	}
}

func TestUnevenRowsAreOneRun(t *testing.T) {
	s := one(t, plainRead(t, "depth,a\n1,1\n5,2\n6,3\n22,4\n23,5\n40,6\n"), "a")
	if f := align(t, correlation("a"), s); fmt.Sprint(f.Runs) != "[6]" || f.Even || f.Step[5] != 5 {
		t.Errorf("%+v", f)
	}
}

func TestGrid(t *testing.T) {
	s := one(t, plainRead(t, "depth,a\n0,0\n1,10\n3,30\n4,10\n"), "a")
	req := correlation("a")
	req.Grid = &request.Grid{Step: 0.5, By: "linear"}
	f := align(t, req, s)
	if !near(f.Columns[0], []float64{0, 5, 10, 15, 20, 25, 30, 20, 10}, 1e-12) || f.Filled != 5 || !f.Even {
		t.Errorf("%+v", f)
	}
	for _, g := range []request.Grid{{Step: 0}, {Step: -1}, {Step: 1e-9}, {Step: 1, By: "spline"}, {Step: math.NaN()}} {
		req.Grid = &g
		_, err := Align(t.Context(), []*Series{s}, req)
		wantMessage(t, err, "grid")
	}
}

func TestSequencesOfDifferentFilesShareNothing(t *testing.T) {
	a, b := one(t, plainRead(t, "a\n5\n1\n3\n"), "a"), one(t, plainRead(t, "b\n5\n1\n3\n"), "b")
	_, err := Align(t.Context(), []*Series{a, b}, correlation("a", "b"))
	wantMessage(t, err, "row order", "along")
}

func TestGroupsOfDifferentFilesMeetByLabel(t *testing.T) {
	rec := along("year", request.Time)
	rec.Group = "site"
	a := one(t, mustRead(t, rec, "site,year,a\nquay,2000,1\nquay,2001,2\nweir,2000,3\nweir,2001,4\n"), "a")
	b := one(t, mustRead(t, rec, "site,year,b\nweir,2000,13\nweir,2001,14\nquay,2001,12\nmole,2001,15\n"), "b")
	f := align(t, correlation("a", "b"), a, b)
	if !equal(f.Columns[0], []float64{2, 3, 4}) || !equal(f.Columns[1], []float64{12, 13, 14}) || fmt.Sprint(f.Runs) != "[1 3]" {
		t.Errorf("%+v", f)
	}
	for i := 1; i < len(f.Step); i++ {
		if f.Step[i] <= f.Step[i-1] {
			t.Errorf("steps %v do not rise", f.Step)
		}
	}
}

func TestDetectionLimit(t *testing.T) {
	r := plainRead(t, "year,x\n2000,0.04\n2001,0.05\n2002,0.06\n2003,<0.05\n")
	limit := 0.05
	s, _ := r.Series(&request.Series{Name: "x", DetectionLimit: &limit}, &request.Record{})
	if s.Censored != 3 || !equal(s.Values, []float64{math.NaN(), math.NaN(), 0.06, math.NaN()}) || s.Digest == one(t, r, "x").Digest {
		t.Errorf("%+v", s)
	}
}
