package dataset

// Proleptic Gregorian calendar, as ISO 8601 has it; year 0 is 1 BC. Days are
// counted from 1970-01-01, months from January of year 0.

const (
	daySeconds  = 86400
	yearDays    = 365.2425 // mean Gregorian year
	epochOffset = 719468   // days from 0000-03-01 to 1970-01-01
	eraDays     = 146097   // days in 400 years
)

// dayNumber returns the day of a date. The year is taken to begin in March, so
// that the leap day ends it.
func dayNumber(year, month, day int) int {
	if month <= 2 {
		year--
	}
	era := floorDiv(year, 400)
	yearOfEra := year - era*400
	dayOfYear := (153*((month+9)%12)+2)/5 + day - 1
	return era*eraDays + yearOfEra*365 + yearOfEra/4 - yearOfEra/100 + dayOfYear - epochOffset
}

// dateOf is the inverse of dayNumber.
func dateOf(day int) (year, month, dayOfMonth int) {
	day += epochOffset
	era := floorDiv(day, eraDays)
	day -= era * eraDays
	yearOfEra := (day - day/1460 + day/36524 - day/146096) / 365
	day -= 365*yearOfEra + yearOfEra/4 - yearOfEra/100
	m := (5*day + 2) / 153
	month = (m+2)%12 + 1
	year = yearOfEra + era*400
	if month <= 2 {
		year++
	}
	return year, month, day - (153*m+2)/5 + 1
}

func isLeap(year int) bool { return year%4 == 0 && (year%100 != 0 || year%400 == 0) }

func daysIn(year, month int) int {
	switch month {
	case 4, 6, 9, 11:
		return 30
	case 2:
		if isLeap(year) {
			return 29
		}
		return 28
	}
	return 31
}

func daysInYear(year int) int {
	if isLeap(year) {
		return 366
	}
	return 365
}

// weekMonday returns the day on which an ISO week begins: week 1 holds the
// year's 4 January.
func weekMonday(year, week int) int {
	fourth := dayNumber(year, 1, 4)
	return fourth - floorMod(fourth+3, 7) + 7*(week-1)
}

// weeksIn returns the number of ISO weeks of a year, 52 or 53.
func weeksIn(year int) int { return (weekMonday(year+1, 1) - weekMonday(year, 1)) / 7 }

func floorDiv(a, b int) int {
	q := a / b
	if a%b != 0 && (a < 0) != (b < 0) {
		q--
	}
	return q
}

func floorMod(a, b int) int { return a - b*floorDiv(a, b) }
