package dataset

import (
	"context"
	"strings"
	"testing"

	"lagwise/lint/request"
)

// Any bytes, read and related, give rows or an error, and never a panic.
func FuzzRead(f *testing.F) {
	for _, text := range []string{"year,x\n2000,1\n2001,2\n2002,4\n", "a;b;\r\n\"1\n2\";<3;\r\n", "d\tx\n01/02/2003\t1\n", "x\n\n1\n\n", "\xEF\xBB\xBF\"",
		"q,x\n2000-Q1,1\n2000-Q2,2\n2000-Q3,5\n2000-Q4,1\n2001-Q1,4\n", "age,x\n1,2\n2,3\n", "t,x\n2000-01-01T00:00,1\n2000-01-01T01:00,2\n"} {
		for kind := range 4 {
			f.Add(text, kind)
		}
	}
	f.Fuzz(func(t *testing.T, text string, kind int) {
		rec := &request.Record{File: "x.csv", HeaderRows: 1, Thousands: []string{"", ","}[kind&1], Decimal: []string{"", ","}[kind&1&^(kind>>3)]}
		if rec.Decimal == "," {
			rec.Thousands = "."
		}
		if kind&2 != 0 {
			rec.Comment, rec.HeaderRows = "#", kind>>4&3
		}
		r, trouble := readRecord(context.Background(), strings.NewReader(text), int64(len(text)), rec, DefaultLimits())
		if trouble != nil {
			if trouble.Message == "" {
				t.Fatal("an error without words")
			}
			return
		}
		for _, c := range r.Columns {
			if c.Numeric && len(c.Values) != len(r.Axis.Positions) {
				t.Fatalf("%d values at %d positions", len(c.Values), len(r.Axis.Positions))
			}
			s, trouble := r.Series(&request.Series{Name: c.Name}, rec)
			if trouble != nil {
				continue
			}
			for _, every := range []string{"", "P1Y", "P7D", "2"} {
				frame, err := Align(context.Background(), []*Series{s}, &request.Request{Kind: request.Correlation, Every: every})
				if err != nil {
					continue
				}
				for _, on := range [][]request.Transform{steps("first-differences"), steps("anomalies"), steps("detrended"), steps("rates-of-change"), steps("prewhitened")} {
					frame.Transform(nil, on, []Shape{{true, true}})
				}
			}
		}
	})
}

func FuzzTime(f *testing.F) {
	for _, text := range []string{"2001-02-03T04:05:06+07:00", "2001-W05-1", "20010203", "-0001-060", "1990.5", "2001Q4"} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		if m, ok := parseTime([]byte(text)); ok && m.form == dayForm {
			again, ok := parseTime([]byte(formatDay(m.day)))
			if !ok || again.day != m.day {
				t.Fatalf("%q is %s, which is read as %+v", text, formatDay(m.day), again)
			}
		}
	})
}
