package request

import (
	"fmt"
	"strconv"
	"strings"
)

// Period is an ISO 8601 duration. Months are calendar months (twelve to a
// year), days calendar days (seven to a week), seconds the rest.
type Period struct {
	Months  int
	Days    int
	Seconds float64
}

// Zero reports whether the period has no length.
func (p Period) Zero() bool { return p == Period{} }

// ParsePeriod reads an ISO 8601 duration: P1Y, P3M, P7D, P1W, PT15M,
// P1DT12H. Designators stand in their order, each at most once. A decimal
// fraction may stand on the last number of the time part only: parts of
// years, months and days have no one length. A bare number, a sign and lower
// case are errors.
func ParsePeriod(s string) (Period, error) {
	fail := func(why string) (Period, error) {
		return Period{}, fmt.Errorf("%s is not an ISO 8601 duration: %s; write it like P1Y, P3M, P7D or PT15M", shown(s), why)
	}
	rest, ok := strings.CutPrefix(s, "P")
	if !ok {
		return fail("it does not begin with P")
	}
	date, clock, hasClock := strings.Cut(rest, "T")
	if date == "" && !hasClock || hasClock && clock == "" {
		return fail("a number with its unit is missing")
	}
	var p Period
	days, err := designators(date, "YMWD")
	if err != "" {
		return fail(err)
	}
	for unit, v := range days {
		if v != float64(int(v)) {
			return fail("only hours, minutes and seconds may have a fraction")
		}
		switch unit {
		case 'Y':
			p.Months += 12 * int(v)
		case 'M':
			p.Months += int(v)
		case 'W':
			p.Days += 7 * int(v)
		case 'D':
			p.Days += int(v)
		}
	}
	times, err := designators(clock, "HMS")
	if err != "" {
		return fail(err)
	}
	p.Seconds = 3600*times['H'] + 60*times['M'] + times['S']
	return p, nil
}

// designators reads pairs of number and unit, units in the given order.
func designators(s, units string) (values map[byte]float64, trouble string) {
	values = map[byte]float64{}
	for s != "" {
		end := strings.IndexFunc(s, func(r rune) bool { return (r < '0' || r > '9') && r != '.' && r != ',' })
		if end < 0 {
			return nil, "a number has no unit"
		}
		if end == 0 || end > 9 {
			return nil, "a number is missing or too long"
		}
		unit := strings.IndexByte(units, s[end])
		if unit < 0 {
			return nil, "a unit is unknown or out of its order"
		}
		v, err := strconv.ParseFloat(strings.Replace(s[:end], ",", ".", 1), 64)
		if err != nil || s[0] < '0' || s[0] > '9' || s[end-1] < '0' || s[end-1] > '9' {
			return nil, "a number cannot be read"
		}
		if s[end+1:] != "" && strings.ContainsAny(s[:end], ".,") {
			return nil, "only the last number may have a fraction"
		}
		values[s[end]] = v
		units, s = units[unit+1:], s[end+1:]
	}
	return values, ""
}
