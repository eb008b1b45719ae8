package dataset

import (
	"fmt"
	"strings"
)

var monthNames = [...]string{"jan", "feb", "mar", "apr", "may", "jun", "jul", "aug", "sep", "oct", "nov", "dec"}

// layout reads times by POSIX strftime codes: %Y %y %m %b %B %d %e %j %H %M %S
// %F %T %%. White space matches any white space.
type layout struct {
	codes string
	form  form
}

func newLayout(format string) (layout, *Trouble) {
	format = strings.NewReplacer("%F", "%Y-%m-%d", "%T", "%H:%M:%S", "%R", "%H:%M", "%D", "%m/%d/%y").Replace(format)
	l := layout{codes: format}
	seen := map[byte]bool{}
	for i := 0; i < len(format); i++ {
		if format[i] != '%' {
			continue
		}
		i++
		if i == len(format) || !strings.ContainsRune("YymbBdejHMS%", rune(format[i])) {
			return l, unreadable("format = %q: only the codes %%Y %%y %%m %%b %%d %%j %%H %%M %%S %%F %%T are known", format)
		}
		seen[format[i]] = true
	}
	month := seen['m'] || seen['b'] || seen['B']
	switch {
	case !seen['Y'] && !seen['y']:
		return l, unreadable("format = %q names no year (%%Y or %%y)", format)
	case seen['H']:
		l.form = secondForm
	case seen['j'] || month && (seen['d'] || seen['e']):
		l.form = dayForm
	case month:
		l.form = monthForm
	default:
		l.form = yearForm
	}
	if l.form == secondForm && !seen['j'] && !(month && (seen['d'] || seen['e'])) {
		return l, unreadable("format = %q names a time of day but no day", format)
	}
	return l, nil
}

// fields are what a layout has read.
type fields struct{ year, month, day, nth, hour, minute, second int }

func (l layout) parse(text []byte) (moment, bool) {
	s := scanner{text: text}
	f := fields{month: 1, day: 1}
	for i := 0; i < len(l.codes); i++ {
		c := l.codes[i]
		switch {
		case c == ' ':
			for s.take(' ') || s.take('\t') {
			}
		case c != '%':
			if !s.take(c) {
				return moment{}, false
			}
		default:
			i++
			if !s.field(l.codes[i], &f) {
				return moment{}, false
			}
		}
	}
	if !s.done() || f.month < 1 || f.month > 12 || f.day < 1 || f.day > daysIn(f.year, f.month) || f.nth > daysInYear(f.year) ||
		f.hour > 24 || f.minute > 59 || f.second > 60 {
		return moment{}, false
	}
	m := moment{form: l.form, year: f.year, month: f.month, day: dayNumber(f.year, f.month, f.day)}
	if f.nth > 0 {
		m = dayMoment(dayNumber(f.year, 1, f.nth))
		m.form = l.form
	}
	m.second = float64(3600*f.hour + 60*f.minute + f.second)
	return m, m.second <= daySeconds
}

// field reads one code. Numbers may lack leading zeros.
func (s *scanner) field(code byte, f *fields) bool {
	read := func(to *int, most int) bool {
		v, ok := s.number(min(most, s.digits()))
		*to = v
		return ok
	}
	switch code {
	case '%':
		return s.take('%')
	case 'Y':
		return read(&f.year, 4)
	case 'y':
		ok := read(&f.year, 2)
		if f.year += 1900; f.year < 1969 { // POSIX: 69-99 are 1969-1999, 00-68 are 2000-2068
			f.year += 100
		}
		return ok
	case 'm':
		return read(&f.month, 2)
	case 'd', 'e':
		for s.take(' ') {
		}
		return read(&f.day, 2)
	case 'j':
		return read(&f.nth, 3) && f.nth >= 1
	case 'H':
		return read(&f.hour, 2)
	case 'M':
		return read(&f.minute, 2)
	case 'S':
		return read(&f.second, 2)
	}
	return s.monthName(f)
}

func (s *scanner) monthName(f *fields) bool {
	end := s.at
	for end < len(s.text) && isLetter(s.text[end]) {
		end++
	}
	word := strings.ToLower(string(s.text[s.at:end]))
	for i, name := range monthNames {
		if strings.HasPrefix(word, name) {
			f.month, s.at = i+1, end
			return true
		}
	}
	return false
}

// formatMonth and formatDay print what ISO 8601 has for them.
func formatMonth(month int) string {
	return fmt.Sprintf("%s-%02d", formatYear(floorDiv(month, 12)), floorMod(month, 12)+1)
}

func formatDay(day int) string {
	year, month, d := dateOf(day)
	return fmt.Sprintf("%s-%02d-%02d", formatYear(year), month, d)
}

func formatYear(year int) string {
	switch {
	case year < 0:
		return fmt.Sprintf("-%04d", -year)
	case year > 9999:
		return fmt.Sprintf("+%d", year)
	}
	return fmt.Sprintf("%04d", year)
}
