package dataset

// AxisUnit says what one unit of an axis' positions is.
type AxisUnit uint8

// The units of positions.
const (
	Row    AxisUnit = iota // row of the file, from 1
	Number                 // the number itself; ages are negative, so that they run forward in time
	Year                   // years; with a fraction where the axis is uneven
	Month                  // months since January of year 0
	Day                    // days since 1970-01-01
	Second                 // seconds since 1970-01-01
)

// clock reads the cells of a time column as positions of one unit.
type clock struct {
	unit   AxisUnit
	form   form
	layout *layout
	point  byte
}

// newClock chooses the unit from a sample of cells: seconds when any cell has
// a time of day, else what most cells show. It returns nil when less than most
// of them are times.
func newClock(sample [][]byte, l *layout, point byte) *clock {
	c := &clock{layout: l, point: point}
	var counts [secondForm + 1]int
	read, best := 0, noForm
	for _, cell := range sample {
		if m, ok := c.parse(cell); ok {
			counts[m.form]++
			read++
		}
	}
	if 2*read <= len(sample) {
		return nil
	}
	for f := yearForm; f <= secondForm; f++ {
		if counts[f] > counts[best] {
			best = f
		}
	}
	switch {
	case counts[secondForm] > 0:
		best = secondForm
	case counts[decimalForm] > 0 && best == yearForm:
		best = decimalForm
	}
	c.form = best
	c.unit = [...]AxisUnit{Row, Year, Year, Month, Month, Day, Day, Second}[best]
	return c
}

func (c *clock) parse(cell []byte) (moment, bool) {
	if c.layout != nil {
		return c.layout.parse(cell)
	}
	m, ok := parseTime(cell)
	if !ok && c.point != '.' {
		if v, plain := parsePlain(cell, c.point); plain {
			return moment{form: decimalForm, decimal: v}, true
		}
	}
	return m, ok
}

// position returns where a cell stands, in the clock's unit; ok is false when
// it is no time or is written in a form that does not fit the unit.
func (c *clock) position(cell []byte) (float64, bool) {
	m, ok := c.parse(cell)
	if !ok {
		return 0, false
	}
	switch {
	case m.form == c.form:
	case c.form == secondForm && m.form == dayForm:
	case c.form == decimalForm && m.form == yearForm, c.form == yearForm && m.form == decimalForm:
	default:
		return 0, false
	}
	if m.form == decimalForm {
		return m.decimal, true
	}
	return m.in(c.unit), true
}

// in returns the first instant of a moment in a unit, rounded down to it.
func (m moment) in(unit AxisUnit) float64 {
	switch unit {
	case Year:
		return float64(m.year)
	case Month:
		return float64(m.year*12 + m.month - 1)
	case Day:
		return float64(m.day)
	}
	return float64(m.day)*daySeconds + m.second
}

// after returns the first instant behind what a moment stands for, in a unit.
func (m moment) after(unit AxisUnit) float64 {
	next := m
	switch m.form {
	case yearForm:
		next = yearMoment(m.year + 1)
	case monthForm, quarterForm:
		months := 1
		if m.form == quarterForm {
			months = 3
		}
		month := m.year*12 + m.month - 1 + months
		next.year, next.month = floorDiv(month, 12), floorMod(month, 12)+1
		next.day = dayNumber(next.year, next.month, 1)
	case weekForm:
		next = dayMoment(m.day + 7)
	case dayForm:
		next = dayMoment(m.day + 1)
	default:
		return m.in(unit)
	}
	return next.in(unit)
}
