package dataset

import (
	"math"
	"slices"

	"lagwise/lint/request"
)

// makeAxis sorts the rows of a table along its axis and measures it. order
// lists the rows of the file in that sequence; nil when they stand so already.
func makeAxis(t *table, plan axisPlan, declared request.Period) (a *Axis, order []int) {
	a = &Axis{Kind: plan.kind, UnitName: plan.unit, Ambiguous: plan.ambiguous, groups: t.group, labels: t.labels}
	if plan.column >= 0 {
		a.Column = t.columns[plan.column].name
	}
	if plan.column < 0 || plan.ambiguous {
		a.Unit = Row
		a.countRows(t.rows)
		if plan.ambiguous {
			a.notePlace(t, plan.column, 0, t.rows)
		}
	} else {
		a.read(t, plan)
	}
	if a.Unit != Row || a.groups != nil {
		order = a.sort(t)
	}
	if a.Unit == Year && plan.clock != nil && plan.clock.form == decimalForm {
		a.fromDecimalYears()
	}
	a.coarsen(declared)
	a.quarters = plan.clock != nil && plan.clock.form == quarterForm
	a.measure()
	return a, order
}

// countRows makes positions of the order of the rows, in each group by itself.
func (a *Axis) countRows(rows int) {
	a.Positions = make([]float64, rows)
	counts := make([]float64, max(1, len(a.labels)))
	for i := range a.Positions {
		g := a.groupOf(i)
		counts[g]++
		a.Positions[i] = counts[g]
	}
}

// notePlace tells of positions that could not be read, the first at row.
func (a *Axis) notePlace(t *table, column, row, count int) {
	a.Unparsed, a.UnparsedLine, a.UnparsedText = count, t.lineOf(row), t.columns[column].unparsedText
}

// read takes the positions of the axis column, forward in time.
func (a *Axis) read(t *table, plan axisPlan) {
	c := t.columns[plan.column]
	a.Unit = Number
	if plan.clock != nil {
		a.Unit = plan.clock.unit
	}
	a.Positions = c.values
	if plan.kind == request.Age {
		a.Positions = make([]float64, len(c.values))
		for i, v := range c.values {
			a.Positions[i] = -v
		}
	}
	for i, p := range a.Positions {
		if p != p {
			if a.Unparsed == 0 {
				a.notePlace(t, plan.column, i, 0)
			}
			a.Unparsed++
		}
	}
}

// sort tells in what order the file stands and brings the rows with a
// position forward, group by group.
func (a *Axis) sort(t *table) (order []int) {
	rises, falls := a.directions()
	sorted := falls == 0 && a.Unparsed == 0 && a.grouped()
	a.Backward = falls > 0 && rises == 0 && a.Kind != request.Age
	a.Unsorted = falls > 0 && rises > 0
	if !sorted {
		order = a.arrange()
	}
	a.noteRepeats(t, order)
	return order
}

func (a *Axis) groupOf(row int) int32 {
	if a.groups == nil {
		return 0
	}
	return a.groups[row]
}

// directions counts the neighbours in the file that rise and fall.
func (a *Axis) directions() (rises, falls int) {
	last := -1
	for i, p := range a.Positions {
		if p != p {
			continue
		}
		if last >= 0 && a.groupOf(i) == a.groupOf(last) {
			if p > a.Positions[last] {
				rises++
			} else if p < a.Positions[last] {
				falls++
			}
		}
		last = i
	}
	return rises, falls
}

// grouped reports whether the rows of each group stand together.
func (a *Axis) grouped() bool {
	for i := 1; i < len(a.groups); i++ {
		if a.groups[i] < a.groups[i-1] {
			return false
		}
	}
	return true
}

func (a *Axis) arrange() []int {
	order := make([]int, 0, len(a.Positions))
	for i, p := range a.Positions {
		if p == p {
			order = append(order, i)
		}
	}
	slices.SortStableFunc(order, func(i, j int) int {
		if d := int(a.groupOf(i)) - int(a.groupOf(j)); d != 0 {
			return d
		}
		switch {
		case a.Positions[i] < a.Positions[j]:
			return -1
		case a.Positions[i] > a.Positions[j]:
			return 1
		}
		return 0
	})
	a.Positions = arranged(a.Positions, order)
	if a.groups != nil {
		a.groups = arranged(a.groups, order)
	}
	return order
}

// arranged returns the values of the rows in an order.
func arranged[T any](values []T, order []int) []T {
	moved := make([]T, len(order))
	for i, row := range order {
		moved[i] = values[row]
	}
	return moved
}

func (a *Axis) noteRepeats(t *table, order []int) {
	for i := 1; i < len(a.Positions); i++ {
		if a.Positions[i] != a.Positions[i-1] || a.groupOf(i) != a.groupOf(i-1) {
			continue
		}
		row := i
		if order != nil {
			row = order[i]
		}
		if a.Repeated == 0 || t.lineOf(row) < a.RepeatedLine {
			a.FirstRepeated, a.RepeatedLine = a.Format(a.Positions[i]), t.lineOf(row)
		}
		a.Repeated++
	}
}

// fromDecimalYears recognises years in which only the fraction says the
// quarter or month. A month is written as its middle, (m - 0.5)/12 (NIST
// handbook, 6.4.4.1.2), or as its beginning, (m - 1)/12 (common practice); a
// quarter as its middle. A constant fraction is a year.
func (a *Axis) fromDecimalYears() {
	const rounding = 0.0051 // two decimals
	if len(a.Positions) < 4 {
		return
	}
	fraction := a.Positions[0] - math.Floor(a.Positions[0])
	if a.allNear(func(p float64) float64 { return math.Round(p-fraction) + fraction }, 1e-6) {
		a.replace(Year, math.Floor)
		return
	}
	for _, of := range []struct{ parts, shift float64 }{{4, 0.5}, {12, 0}, {12, 0.5}} {
		index := func(p float64) float64 { return math.Round(p*of.parts - of.shift) }
		if a.allNear(func(p float64) float64 { return (index(p) + of.shift) / of.parts }, rounding) {
			a.replace(Month, func(p float64) float64 { return index(p) * 12 / of.parts })
			return
		}
	}
}

func (a *Axis) allNear(of func(float64) float64, rounding float64) bool {
	for _, p := range a.Positions {
		if math.Abs(p-of(p)) > rounding {
			return false
		}
	}
	return true
}

func (a *Axis) replace(unit AxisUnit, of func(float64) float64) {
	replaced := make([]float64, len(a.Positions))
	for i, p := range a.Positions {
		replaced[i] = of(p)
	}
	a.Positions, a.Unit = replaced, unit
}

// coarsen takes calendar steps for what they are: instants always at one time
// of the day are days, days always at one day of the month (or its end) are
// months, months always the same are years. A declared step that is finer
// keeps the finer unit.
func (a *Axis) coarsen(declared request.Period) {
	enough := 3
	if declared.Months > 0 {
		enough = 2
	}
	if a.Unit == Second && declared.Seconds == 0 && len(a.Positions) >= 2 {
		a.coarsenBy(Day, func(p float64) (float64, float64) {
			day := math.Floor(p / daySeconds)
			return day, p - day*daySeconds
		})
	}
	if len(a.Positions) < enough || declared.Days > 0 || declared.Seconds > 0 {
		return
	}
	if a.Unit == Day && !a.coarsenBy(Month, monthOfDay(false)) {
		a.coarsenBy(Month, monthOfDay(true))
	}
	if a.Unit == Month {
		a.coarsenBy(Year, func(p float64) (float64, float64) {
			return math.Floor(p / 12), math.Mod(p, 12)
		})
	}
}

// monthOfDay parts a day into its month and place in it, from the beginning
// or from the end.
func monthOfDay(fromEnd bool) func(float64) (float64, float64) {
	return func(p float64) (float64, float64) {
		year, month, day := dateOf(int(p))
		if fromEnd {
			day -= daysIn(year, month)
		}
		return float64(year*12 + month - 1), float64(day)
	}
}

// coarsenBy changes the unit when the rest of all positions is the same.
func (a *Axis) coarsenBy(unit AxisUnit, part func(float64) (whole, rest float64)) bool {
	_, first := part(a.Positions[0])
	for _, p := range a.Positions {
		if _, rest := part(p); rest != first {
			return false
		}
	}
	if a.Positions[len(a.Positions)-1] == a.Positions[0] && a.groups == nil {
		return false
	}
	a.replace(unit, func(p float64) float64 {
		whole, _ := part(p)
		return whole
	})
	return true
}
