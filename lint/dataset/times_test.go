package dataset

import (
	"fmt"
	"testing"
	"time"
)

// Examples of ISO 8601:2004/2019: a calendar date 1985-04-12 is the ordinal
// date 1985-102 and the week date 1985-W15-5 (the standard's own example);
// 1995-W01-1 is 1995-01-02 and 2008-W52-7 is 2008-12-28. Instants are compared
// with the standard library's time package.
func TestISOTimes(t *testing.T) {
	day := func(y int, m time.Month, d int) int64 { return time.Date(y, m, d, 0, 0, 0, 0, time.UTC).Unix() }
	for text, want := range map[string]int64{
		"1985-04-12": day(1985, 4, 12), "19850412": day(1985, 4, 12), "1985-102": day(1985, 4, 12), "1985102": day(1985, 4, 12),
		"1985-W15-5": day(1985, 4, 12), "1985W155": day(1985, 4, 12), "1985-W15": day(1985, 4, 8),
		"1995-W01-1": day(1995, 1, 2), "2008-W52-7": day(2008, 12, 28), "2009-W53-7": day(2010, 1, 3), "2009-W01-1": day(2008, 12, 29),
		"1985": day(1985, 1, 1), "1985-04": day(1985, 4, 1), "+001985-04-12": day(1985, 4, 12), "-0001-01-01": day(-1, 1, 1), "0000-02-29": day(0, 2, 29),
		"2000-02-29": day(2000, 2, 29), "2000-366": day(2000, 12, 31), "2001-Q3": day(2001, 7, 1), "2001Q1": day(2001, 1, 1),
		"1985-04-12T23:20:30": day(1985, 4, 12) + 84030, "1985-04-12T23:20:30Z": day(1985, 4, 12) + 84030, "19850412T232030Z": day(1985, 4, 12) + 84030,
		"1985-04-12T23:20:30+04:00": day(1985, 4, 12) + 84030 - 4*3600, "1985-04-12T23:20:30-0400": day(1985, 4, 12) + 84030 + 4*3600,
		"1985-04-12T24:00": day(1985, 4, 13), "1985-04-12 09:15": day(1985, 4, 12) + 33300, "1985-04-12T10,5": day(1985, 4, 12) + 37800,
		"2016-12-31T23:59:60Z": day(2017, 1, 1),
	} {
		m, ok := parseTime([]byte(text))
		if got := int64(m.in(Second)); !ok || got != want {
			t.Errorf("%s: got %d (%v), want %d", text, got, ok, want)
		}
	}
}

func TestNoTimes(t *testing.T) {
	for _, text := range []string{"", "x", "2001-13", "2001-02-29", "1900-02-29", "2001-366", "2001-000", "2001-W54-1", "2001-W53", "2001-W10-8",
		"2001-04-31", "2001-1-2", "2001-01-01T25:00", "2001-01-01T24:01", "2001-01-01T12:60", "2001-01-01T", "2001-01-01T12:00+", "2001-01T12:00",
		"01/02/2003", "12345", "2001-Q5", "20011301", "2001-01-01T12:00Zx", "1.2.3", "-5"} {
		if m, ok := parseTime([]byte(text)); ok {
			t.Errorf("%q was read as %+v", text, m)
		}
	}
}

func TestAmbiguousDates(t *testing.T) {
	for text, want := range map[string]bool{"01/02/2003": true, "1.2.03": true, "13/02/2003": true, "1-2-2003 10:00": true,
		"2003-02-01": false, "1.25": false, "01/2003": false, "1/2/3": false} {
		if isAmbiguous([]byte(text)) != want {
			t.Errorf("%s: want %v", text, want)
		}
	}
}

// Every day of four centuries against the standard library.
func TestDayNumbers(t *testing.T) {
	for at := time.Date(1899, 12, 30, 0, 0, 0, 0, time.UTC); at.Year() < 2301; at = at.AddDate(0, 0, 1) {
		n := int(at.Unix() / 86400)
		if at.Unix() < 0 {
			n = int((at.Unix() - 86399) / 86400)
		}
		if got := dayNumber(at.Year(), int(at.Month()), at.Day()); got != n {
			t.Fatalf("%s: got %d, want %d", at, got, n)
		}
		if y, m, d := dateOf(n); y != at.Year() || m != int(at.Month()) || d != at.Day() {
			t.Fatalf("%d: got %d-%d-%d, want %s", n, y, m, d, at)
		}
		year, week := at.ISOWeek()
		if monday := weekMonday(year, week); n < monday || n > monday+6 {
			t.Fatalf("%s is not in week %d-W%02d from %d", at, year, week, monday)
		}
	}
}

func TestStrftime(t *testing.T) {
	for _, c := range []struct{ format, text, want string }{
		{"%d/%m/%Y", "01/02/2003", "2003-02-01"}, {"%m/%d/%Y", "01/02/2003", "2003-01-02"}, {"%d.%m.%y", "1.2.69", "1969-02-01"},
		{"%d.%m.%y", "1.2.68", "2068-02-01"}, {"%d %b %Y", "9 Feb 2003", "2003-02-09"}, {"%B %d, %Y", "March 9, 2003", "2003-03-09"},
		{"%Y-%j", "2004-060", "2004-02-29"}, {"%F", "2003-02-01", "2003-02-01"}, {"%Y%m%d", "20030201", "2003-02-01"},
	} {
		l, trouble := newLayout(c.format)
		if trouble != nil {
			t.Fatal(trouble.Message)
		}
		m, ok := l.parse([]byte(c.text))
		if got := formatDay(m.day); !ok || got != c.want {
			t.Errorf("%s of %s: got %s (%v), want %s", c.format, c.text, got, ok, c.want)
		}
	}
	l, _ := newLayout("%d/%m/%Y %H:%M")
	if m, ok := l.parse([]byte("01/02/2003 04:05")); !ok || formatSecond(m.in(Second)) != "2003-02-01T04:05" {
		t.Errorf("got %+v (%v)", m, ok)
	}
	for _, text := range []string{"31/02/2003 04:05", "1/2/2003", "01/02/2003 04:05x", "01/13/2003 04:05"} {
		if _, ok := l.parse([]byte(text)); ok {
			t.Errorf("%q was read", text)
		}
	}
	for _, format := range []string{"%d/%m", "%Q", "%Y %", "%Y %H"} {
		if _, trouble := newLayout(format); trouble == nil {
			t.Errorf("the format %q was taken", format)
		}
	}
}

func TestFormatGivesBackWhatWasWritten(t *testing.T) {
	for _, text := range []string{"2001-02-03T04:05", "2001-02-03T04:05:06", "2001-02-03T04:05:06.5", "1969-12-31T23:59"} {
		m, _ := parseTime([]byte(text))
		if got := formatSecond(m.in(Second)); got != text {
			t.Errorf("got %s, want %s", got, text)
		}
	}
	for month, want := range map[int]string{2001*12 + 1: "2001-02", -12: "-0001-01", 12000 * 12: "+12000-01"} {
		if got := formatMonth(month); got != want {
			t.Errorf("got %s, want %s", got, want)
		}
	}
	if got := fmt.Sprint(formatDay(-1)); got != "1969-12-31" {
		t.Errorf("got %s", got)
	}
}
