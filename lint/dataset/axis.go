package dataset

import (
	"fmt"
	"math"

	"lagwise/lint/request"
)

// Axis is the sorted positions of a record's rows, and what they show.
type Axis struct {
	Column    string // "" for the order of the rows
	Kind      request.AxisKind
	Unit      AxisUnit
	UnitName  string    // as declared or found in the header: ka, cm
	Positions []float64 // in Unit, sorted within each group, forward in time
	Step      float64   // most frequent distance of neighbours, in Unit; 0 when there is none
	StepText  string    // P1Y, P3M, PT15M, 0.5; "" when there is none
	Even      bool      // all distances are whole steps, and most are one
	Share     float64   // of the distances that are one step
	Variation float64   // coefficient of variation of the distances
	Gaps      int       // places where steps are missing (even axes)

	Backward      bool // the file runs backwards (not told of ages)
	Unsorted      bool // the file runs both ways
	Repeated      int  // rows at a position that stood before
	FirstRepeated string
	RepeatedLine  int // line of the file
	Unparsed      int // rows without a position; they are left out
	UnparsedLine  int
	UnparsedText  string
	Ambiguous     bool // dates like 01/02/2003 without a format: no positions

	quarters bool    // months written as quarters
	groups   []int32 // group of each row; nil: one
	labels   []string
	digest   onceDigest
}

// Format returns a position as a person writes it.
func (a *Axis) Format(pos float64) string { return a.scale().format(pos) }

// First and Last return the ends of the axis as a person writes them, "" when
// it has no rows.
func (a *Axis) First() string { return a.end(math.Min) }

// Last is the other end.
func (a *Axis) Last() string { return a.end(math.Max) }

func (a *Axis) end(of func(a, b float64) float64) string {
	if len(a.Positions) == 0 {
		return ""
	}
	end := a.Positions[0]
	for _, p := range a.Positions {
		end = of(end, p)
	}
	return a.Format(end)
}

// Per names the unit that rates and slopes along the axis are counted in.
func (a *Axis) Per() string {
	switch a.Unit {
	case Row:
		return "row"
	case Year:
		return "year"
	case Month:
		return "month"
	case Day:
		return "day"
	case Second:
		return "second"
	}
	return firstOf(a.UnitName, "unit of "+string(a.Kind))
}

func (a *Axis) scale() scale {
	return scale{unit: a.Unit, turned: a.Kind == request.Age, quarters: a.quarters}
}

// scale prints positions.
type scale struct {
	unit     AxisUnit
	turned   bool // positions are minus what is written
	quarters bool
}

func (s scale) format(pos float64) string {
	whole := int(math.Round(pos))
	switch s.unit {
	case Row:
		return fmt.Sprint(whole)
	case Year:
		if pos == math.Trunc(pos) {
			return formatYear(whole)
		}
	case Month:
		if s.quarters {
			return fmt.Sprintf("%s-Q%d", formatYear(floorDiv(whole, 12)), floorMod(whole, 12)/3+1)
		}
		return formatMonth(whole)
	case Day:
		return formatDay(int(math.Floor(pos)))
	case Second:
		return formatSecond(pos)
	}
	if s.turned {
		pos = -pos
	}
	return shortNumber(pos)
}

func formatSecond(pos float64) string {
	day := math.Floor(pos / daySeconds)
	second := pos - day*daySeconds
	whole := int(second)
	text := fmt.Sprintf("%sT%02d:%02d", formatDay(int(day)), whole/3600, whole/60%60)
	if rest := second - float64(whole/60*60); rest != 0 {
		text += ":" + map[bool]string{true: "0"}[rest < 10] + shortNumber(math.Round(rest*1e6)/1e6)
	}
	return text
}

// stepText prints a step: an ISO 8601 duration in time, else a number.
func stepText(unit AxisUnit, step float64) string {
	whole := step == math.Trunc(step)
	switch {
	case step <= 0:
		return ""
	case unit == Row || unit == Number || unit == Year && !whole || unit == Day && !whole:
		return shortNumber(step)
	case unit == Year:
		return fmt.Sprintf("P%.0fY", step)
	case unit == Month && math.Mod(step, 12) == 0:
		return fmt.Sprintf("P%.0fY", step/12)
	case unit == Month:
		return fmt.Sprintf("P%.0fM", step)
	case unit == Day:
		return fmt.Sprintf("P%.0fD", step)
	case math.Mod(step, daySeconds) == 0:
		return fmt.Sprintf("P%.0fD", step/daySeconds)
	case math.Mod(step, 3600) == 0:
		return fmt.Sprintf("PT%.0fH", step/3600)
	case math.Mod(step, 60) == 0:
		return fmt.Sprintf("PT%.0fM", step/60)
	}
	return "PT" + shortNumber(step) + "S"
}

// stepWords says a step in words, with its duration.
func stepWords(unit AxisUnit, step float64, even bool) string {
	text := stepText(unit, step)
	words := map[string]string{"P1Y": "yearly", "P3M": "quarterly", "P1M": "monthly", "P7D": "weekly", "P1D": "daily", "PT1H": "hourly"}[text]
	switch {
	case text == "":
		return "of no step (a single row)"
	case !even:
		return "uneven (most often " + text + ")"
	case words != "":
		return words + " (" + text + ")"
	case unit == Row:
		return "in row order"
	}
	return "every " + text
}
