package dataset

import (
	"bytes"
	"slices"
	"strings"

	"lagwise/lint/request"
)

// axisPlan says which column is the axis and how it is read, decided on a
// sample before the file is read.
type axisPlan struct {
	column    int // -1: row order
	kind      request.AxisKind
	unit      string
	clock     *clock
	ambiguous bool // dates like 01/02/2003 without a format
}

// axisNames are column names that say what an axis measures.
var axisNames = map[string]request.AxisKind{
	"year": request.Time, "years": request.Time, "yr": request.Time, "date": request.Time, "datetime": request.Time,
	"time": request.Time, "timestamp": request.Time, "month": request.Time, "quarter": request.Time, "week": request.Time,
	"day": request.Time, "decimal_year": request.Time, "decimal year": request.Time, "decimal-year": request.Time,
	"year_month": request.Time, "yearmonth": request.Time,
	"age": request.Age, "depth": request.Depth, "distance": request.Distance, "chainage": request.Distance,
}

// planAxis takes the declared axis, or finds one.
func planAxis(t *table, rec *request.Record, sample [][][]byte) (axisPlan, *Trouble) {
	if rec.At != nil {
		return axisPlan{column: -1, kind: request.Sequence}, nil
	}
	along := rec.Along
	if along == nil {
		return findAxis(t, rec, sample), nil
	}
	if along.Kind == request.Sequence || along.Column == "" && along.Kind == "" {
		if along.Kind == "" {
			return findAxis(t, rec, sample), nil
		}
		return axisPlan{column: -1, kind: request.Sequence}, nil
	}
	plan := axisPlan{kind: along.Kind, unit: along.Unit, column: -1}
	if along.Column == "" {
		plan = findAxis(t, rec, sample)
		if plan.kind != along.Kind {
			return plan, &Trouble{Kind: UnknownColumn, Column: string(along.Kind), Message: "no column looks like an axis of kind " +
				string(along.Kind) + "; name it: along = { column = \"…\", kind = \"" + string(along.Kind) + "\" }"}
		}
		plan.unit = along.Unit
		return plan, nil
	}
	index, trouble := t.find(along.Column)
	if trouble != nil {
		return plan, trouble
	}
	plan.column = index
	if plan.unit == "" {
		plan.unit = t.columns[index].unit
	}
	column := columnOf(sample, index)
	if plan.kind == "" {
		plan.kind = kindOf(t.columns[index].name, column, t.point)
	}
	if plan.kind == request.Time {
		return planTime(t, plan, along.Format, column)
	}
	return plan, nil
}

func planTime(t *table, plan axisPlan, format string, column [][]byte) (axisPlan, *Trouble) {
	var l *layout
	if format != "" {
		read, trouble := newLayout(format)
		if trouble != nil {
			return plan, trouble
		}
		l = &read
	}
	plan.clock = newClock(column, l, t.point)
	if plan.clock == nil {
		plan.ambiguous = l == nil && mostly(column, isAmbiguous)
		if !plan.ambiguous {
			plan.clock = &clock{unit: Year, form: yearForm, layout: l, point: t.point}
		}
	}
	return plan, nil
}

// kindOf is the kind of a declared column whose kind was not said.
func kindOf(name string, column [][]byte, point byte) request.AxisKind {
	if kind, ok := axisNames[strings.ToLower(name)]; ok && kind != request.Time {
		return kind
	}
	if newClock(column, nil, point) != nil || mostly(column, isAmbiguous) {
		return request.Time
	}
	return request.Distance
}

// findAxis looks for a time column: written as dates, or named or holding
// years; then for a monotone column whose name says depth, age or distance;
// else the rows are a sequence.
func findAxis(t *table, rec *request.Record, sample [][][]byte) axisPlan {
	for i, c := range t.columns {
		column := columnOf(sample, i)
		if c.name == rec.Group && rec.Group != "" {
			continue
		}
		clock := newClock(column, nil, t.point)
		named := axisNames[strings.ToLower(c.name)] == request.Time
		switch {
		case clock != nil && clock.form != yearForm && clock.form != decimalForm && !compact(column):
		case clock != nil && clock.form == dayForm && compact(column) && named:
		case clock != nil && (named || c.name == "") && years(column, t.point):
		case clock != nil && monotone(column, t.point) > 0 && years(column, t.point) && clock.form == yearForm:
		case clock == nil && mostly(column, isAmbiguous):
			return axisPlan{column: i, kind: request.Time, ambiguous: true}
		default:
			continue
		}
		return axisPlan{column: i, kind: request.Time, clock: clock}
	}
	for i, c := range t.columns {
		kind := axisNames[strings.ToLower(c.name)]
		if kind == "" || kind == request.Time {
			continue
		}
		if monotone(columnOf(sample, i), t.point) != 0 {
			return axisPlan{column: i, kind: kind, unit: c.unit}
		}
	}
	return axisPlan{column: -1, kind: request.Sequence}
}

// columnOf returns the cells of a column that are not empty.
func columnOf(sample [][][]byte, i int) [][]byte {
	var column [][]byte
	for _, record := range sample {
		if i < len(record) && len(record[i]) > 0 {
			column = append(column, record[i])
		}
	}
	return column
}

func mostly(column [][]byte, is func([]byte) bool) bool {
	n := 0
	for _, cell := range column {
		if is(cell) {
			n++
		}
	}
	return 2*n > len(column)
}

// compact reports whether dates are written as digits only, as numbers are.
func compact(column [][]byte) bool {
	return mostly(column, func(cell []byte) bool { return len(bytes.Trim(cell, "0123456789")) == 0 })
}

// years reports whether all cells are numbers that can be calendar years.
func years(column [][]byte, point byte) bool {
	for _, cell := range column {
		if v, ok := parsePlain(cell, point); !ok || v < 1000 || v >= 2500 {
			return false
		}
	}
	return len(column) > 0
}

// monotone returns 1 for numbers that only rise, -1 for those that only fall,
// else 0.
func monotone(column [][]byte, point byte) int {
	direction, last := 0, 0.0
	for i, cell := range column {
		v, ok := parsePlain(cell, point)
		if !ok {
			return 0
		}
		if i > 0 {
			step := 1
			if v < last {
				step = -1
			}
			if v == last || direction != 0 && step != direction {
				return 0
			}
			direction = step
		}
		last = v
	}
	return direction
}

// find returns the column of a name: as the header has it, or without the
// unit behind it.
func (t *table) find(name string) (int, *Trouble) {
	same := func(is func(i int) bool) []int {
		var found []int
		for i := range t.columns {
			if is(i) {
				found = append(found, i)
			}
		}
		return found
	}
	found := same(func(i int) bool { return t.headers[i] == name })
	if len(found) == 0 {
		found = same(func(i int) bool { return t.columns[i].name == name })
	}
	switch len(found) {
	case 1:
		return found[0], nil
	case 0:
		return -1, unknownColumn(name, t.headers)
	}
	return -1, &Trouble{Kind: UnknownColumn, Column: name, Message: "several columns of the file are named \"" + name + "\"; give each its own header"}
}

func unknownColumn(name string, headers []string) *Trouble {
	t := &Trouble{Kind: UnknownColumn, Column: name, Nearest: request.Nearest(name, headers)}
	t.Message = "the file has no column named \"" + name + "\""
	if t.Nearest != "" {
		t.Message += "; did you mean \"" + t.Nearest + "\"?"
	} else if shown := slices.DeleteFunc(slices.Clone(headers), func(h string) bool { return h == "" }); len(shown) > 0 {
		if len(shown) > 12 {
			shown = append(shown[:12:12], "…")
		}
		t.Message += "; it has " + strings.Join(shown, ", ")
	}
	return t
}
