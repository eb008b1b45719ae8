package dataset

import "strconv"

// form is how a time is written.
type form uint8

const (
	noForm form = iota
	yearForm
	decimalForm // a year with a fraction
	quarterForm // 2001-Q3; not of ISO 8601, but common
	monthForm
	weekForm
	dayForm
	secondForm
)

// moment is a time as written: its first instant and its form.
type moment struct {
	form    form
	year    int     // also of the forms below
	month   int     // 1 for years
	day     int     // since 1970-01-01, of the first day
	second  float64 // of the day, zone taken off
	decimal float64 // of decimalForm
}

// parseTime reads ISO 8601: YYYY, ±YYYYYY, YYYY-MM, YYYY-MM-DD, YYYY-DDD,
// YYYY-Www, YYYY-Www-D, their basic forms with a day, each date also with T or
// a space and a time of day with Z or an offset; 24:00 ends a day. Besides it
// reads years with a decimal fraction and quarters.
func parseTime(text []byte) (moment, bool) {
	s := scanner{text: text}
	m, ok := s.date()
	if !ok {
		return m, false
	}
	if s.done() {
		return m, true
	}
	if m.form != dayForm || !(s.take('T') || s.take('t') || s.take(' ')) || !s.clock(&m) {
		return m, false
	}
	m.form = secondForm
	return m, s.done()
}

// scanner walks over the text of one time.
type scanner struct {
	text []byte
	at   int
}

func (s *scanner) done() bool { return s.at == len(s.text) }

func (s *scanner) take(c byte) bool {
	if s.at < len(s.text) && s.text[s.at] == c {
		s.at++
		return true
	}
	return false
}

// digits returns the number of digits that follow.
func (s *scanner) digits() int {
	n := 0
	for s.at+n < len(s.text) && s.text[s.at+n]-'0' <= 9 {
		n++
	}
	return n
}

// number reads exactly n digits.
func (s *scanner) number(n int) (int, bool) {
	if s.digits() < n || n == 0 || n > 9 {
		return 0, false
	}
	v := 0
	for _, c := range s.text[s.at : s.at+n] {
		v = v*10 + int(c-'0')
	}
	s.at += n
	return v, true
}

func (s *scanner) date() (moment, bool) {
	negative := s.take('-')
	signed := negative || s.take('+')
	n := s.digits()
	switch {
	case n == 0 || signed && n < 4 || n > 9:
		return moment{}, false
	case s.at+n < len(s.text) && s.text[s.at+n] == '.':
		return s.decimal(negative)
	case !signed && (n == 8 || n == 7):
		return s.basic(n)
	case !signed && n > 4:
		return moment{}, false
	}
	year, _ := s.number(n)
	if negative {
		year = -year
	}
	if s.done() {
		return yearMoment(year), true
	}
	if n < 4 {
		return moment{}, false
	}
	extended := s.take('-')
	return s.within(year, extended)
}

func yearMoment(year int) moment {
	return moment{form: yearForm, year: year, month: 1, day: dayNumber(year, 1, 1)}
}

func (s *scanner) decimal(negative bool) (moment, bool) {
	v, ok := parsePlain(s.text[s.at:], '.')
	if negative {
		v = -v
	}
	s.at = len(s.text)
	return moment{form: decimalForm, decimal: v}, ok
}

// basic reads YYYYMMDD and YYYYDDD.
func (s *scanner) basic(n int) (moment, bool) {
	year, _ := s.number(4)
	if n == 7 {
		return s.ordinal(year)
	}
	month, _ := s.number(2)
	return s.dayOf(year, month)
}

// within reads what follows the year and its hyphen.
func (s *scanner) within(year int, extended bool) (moment, bool) {
	if s.take('W') || s.take('w') {
		return s.week(year, extended)
	}
	if s.take('Q') || s.take('q') {
		q, ok := s.number(1)
		month := 3*q - 2
		return moment{form: quarterForm, year: year, month: month, day: dayNumber(year, month, 1)}, ok && 1 <= q && q <= 4
	}
	if !extended {
		return moment{}, false
	}
	if s.digits() == 3 {
		return s.ordinal(year)
	}
	month, ok := s.number(2)
	if !ok || month < 1 || month > 12 {
		return moment{}, false
	}
	if !s.take('-') {
		return moment{form: monthForm, year: year, month: month, day: dayNumber(year, month, 1)}, true
	}
	return s.dayOf(year, month)
}

func (s *scanner) dayOf(year, month int) (moment, bool) {
	day, ok := s.number(2)
	if !ok || month < 1 || month > 12 || day < 1 || day > daysIn(year, month) {
		return moment{}, false
	}
	return moment{form: dayForm, year: year, month: month, day: dayNumber(year, month, day)}, true
}

func (s *scanner) ordinal(year int) (moment, bool) {
	nth, ok := s.number(3)
	if !ok || nth < 1 || nth > daysInYear(year) {
		return moment{}, false
	}
	return dayMoment(dayNumber(year, 1, nth)), true
}

func (s *scanner) week(year int, extended bool) (moment, bool) {
	week, ok := s.number(2)
	if !ok || week < 1 || week > weeksIn(year) {
		return moment{}, false
	}
	monday := weekMonday(year, week)
	if s.done() {
		m := dayMoment(monday)
		m.form = weekForm
		return m, true
	}
	if extended && !s.take('-') {
		return moment{}, false
	}
	weekday, ok := s.number(1)
	return dayMoment(monday + weekday - 1), ok && 1 <= weekday && weekday <= 7
}

func dayMoment(day int) moment {
	year, month, _ := dateOf(day)
	return moment{form: dayForm, year: year, month: month, day: day}
}

// clock reads hh, hh:mm, hh:mm:ss or their basic forms, a decimal fraction on
// the last, then the zone.
func (s *scanner) clock(m *moment) bool {
	second, unit, colon := 0.0, 3600.0, false
	for part := 0; part < 3; part++ {
		if part == 1 {
			colon = s.take(':')
		}
		if part == 2 && colon && !s.take(':') {
			break
		}
		if part > 0 && !colon && s.digits() == 0 {
			break
		}
		v, ok := s.number(2)
		most := 59
		if part == 0 {
			most = 24
		} else if part == 2 {
			most = 60 // a leap second
		}
		if !ok || v > most {
			return false
		}
		second += float64(v) * unit
		if s.take('.') || s.take(',') {
			fraction, ok := s.fraction()
			if !ok {
				return false
			}
			second += fraction * unit
			break
		}
		unit /= 60
	}
	if second > daySeconds {
		return false
	}
	offset, ok := s.zone()
	m.second = second - offset
	return ok
}

func (s *scanner) fraction() (float64, bool) {
	n := s.digits()
	if n == 0 {
		return 0, false
	}
	v, err := strconv.ParseFloat("0."+string(s.text[s.at:s.at+n]), 64)
	s.at += n
	return v, err == nil
}

// zone reads Z, ±hh, ±hh:mm or ±hhmm and returns its seconds; a time without
// one is taken as it stands.
func (s *scanner) zone() (float64, bool) {
	if s.done() || s.take('Z') || s.take('z') {
		return 0, true
	}
	sign := 1.0
	if s.take('-') {
		sign = -1
	} else if !s.take('+') {
		return 0, false
	}
	hours, ok := s.number(2)
	minutes := 0
	if ok && !s.done() {
		s.take(':')
		minutes, ok = s.number(2)
	}
	return sign * float64(3600*hours+60*minutes), ok && hours <= 24 && minutes <= 59
}

// isAmbiguous reports whether a text is a date whose day and month cannot be
// told apart without a format, such as 01/02/2003 or 1.2.03.
func isAmbiguous(text []byte) bool {
	s := scanner{text: text}
	for part := 0; part < 3; part++ {
		n := s.digits()
		if n == 0 || part < 2 && n > 2 || part == 2 && n != 2 && n != 4 {
			return false
		}
		s.number(n)
		if part < 2 && !s.take('/') && !s.take('.') && !s.take('-') {
			return false
		}
	}
	return s.done() || s.take(' ') || s.take('T')
}
