package dataset

import (
	"math"
	"slices"
	"strconv"
	"strings"

	"lagwise/lint/request"
)

// coarse is the periods that a request works at.
type coarse struct {
	unit  AxisUnit
	step  float64
	index func(pos float64) int   // period that holds a position
	begin func(index int) float64 // its first position, in the unit of the source
	label func(index int) float64 // its position, in unit
	month int                     // of the water year, 1 for calendar years
}

// aggregated returns a track at the coarser step of `every`. A period counts
// when at least least-share of the values that an even axis has in it are
// there. Instants and means are averaged, sums summed, unless `aggregate`
// says otherwise; the sum of a period that lacks values is its mean times the
// number there should be.
func (t *track) aggregated(req *request.Request) (*track, error) {
	c, err := coarseOf(t, req.Every, req.YearStarts)
	if err != nil {
		return nil, err
	}
	how := req.Aggregate
	if how == "" {
		how = "mean"
		if t.support == "sum" {
			how = "sum"
		}
	}
	share := req.LeastShare
	if share <= 0 {
		share = 0.8
	}
	out := *t
	out.positions, out.values, out.group = nil, nil, nil
	out.unit, out.step, out.even = c.unit, c.step, true
	out.season = usualSeason(c.unit, c.step)
	out.scale = scale{unit: c.unit, turned: t.scale.turned, quarters: c.unit == Month && c.step == 3 && c.month == 1}
	for i := 0; i < len(t.values); {
		k := c.index(t.positions[i])
		j := i
		for j < len(t.values) && t.groupAt(j) == t.groupAt(i) && c.index(t.positions[j]) == k {
			j++
		}
		want := 1.0
		if t.even && t.step > 0 {
			want = max(1, math.Round((c.begin(k+1)-c.begin(k))/t.step))
		}
		if float64(j-i) >= share*want-1e-9 {
			out.positions = append(out.positions, c.label(k))
			out.values = append(out.values, combine(how, t.values[i:j], max(want, float64(j-i)), t.even))
			if t.group != nil {
				out.group = append(out.group, t.group[i])
			}
		}
		i = j
	}
	return &out, nil
}

// combine returns one value for those of a period.
func combine(how string, values []float64, want float64, even bool) float64 {
	n := float64(len(values))
	switch how {
	case "median":
		sorted := slices.Clone(values)
		slices.Sort(sorted)
		return (sorted[(len(sorted)-1)/2] + sorted[len(sorted)/2]) / 2
	case "last":
		return values[len(values)-1]
	case "maximum":
		return slices.Max(values)
	}
	sum := 0.0
	for _, v := range values {
		sum += v
	}
	if how == "sum" && even && n < want {
		return sum / n * want
	}
	if how == "sum" {
		return sum
	}
	return sum / n
}

// coarseOf reads `every` for a track. A step finer than the track's own is a
// mismatch: values are never spread.
func coarseOf(t *track, every, yearStarts string) (*coarse, error) {
	if t.unit == Number || t.unit == Row {
		width, err := strconv.ParseFloat(every, 64)
		if err != nil || !(width > 0) || math.IsInf(width, 0) {
			return nil, mismatch("every = %q is not a width on the axis of %s, which is counted in numbers", every, t.name)
		}
		if t.step > width*(1+1e-9) {
			return nil, finer(t, every)
		}
		at := func(k int) float64 { return float64(k) * width }
		return &coarse{unit: t.unit, step: width, begin: at, label: at, index: func(p float64) int { return int(math.Floor(p/width + 1e-9)) }}, nil
	}
	p, err := request.ParsePeriod(every)
	if err != nil || p.Zero() {
		return nil, mismatch("every = %q is not an ISO 8601 duration such as P1Y, P3M, P7D or PT1H", every)
	}
	if t.even && t.step > lengthIn(p, t.unit)*(1+1e-2) {
		return nil, finer(t, every)
	}
	if p.Months > 0 && (p.Days > 0 || p.Seconds > 0) {
		return nil, mismatch("every = %q mixes calendar months with days; write one of them", every)
	}
	if p.Months > 0 {
		return coarseMonths(t, p.Months, yearStarts)
	}
	return coarseDays(t, p, every)
}

func finer(t *track, every string) *Mismatch {
	m := mismatch("every = %q is finer than %s, which is %s; values are never spread over finer steps", every, t.name, stepWords(t.unit, t.step, t.even))
	m.A, m.StepA, m.Coarser = t.name, stepWords(t.unit, t.step, t.even), stepText(t.unit, t.step)
	return m
}

// coarseMonths counts periods of calendar months. A year that does not begin
// in January is named by the year it ends in (common practice for water
// years).
func coarseMonths(t *track, months int, yearStarts string) (*coarse, error) {
	month, day := 1, 1
	if yearStarts != "" {
		m, d, ok := strings.Cut(yearStarts, "-")
		var err1, err2 error
		month, err1 = strconv.Atoi(m)
		day, err2 = strconv.Atoi(d)
		if !ok || err1 != nil || err2 != nil || month < 1 || month > 12 || day < 1 || day > 28 && day > daysIn(2001, month) {
			return nil, mismatch("year-starts = %q is not a month and day such as 10-01", yearStarts)
		}
	}
	if t.unit == Year && (month != 1 || months%12 != 0) {
		return nil, mismatch("%s is yearly; it cannot be counted in years that start on %s", t.name, yearStarts)
	}
	c := &coarse{unit: Month, step: float64(months), month: month}
	shift := month - 1
	c.index = func(p float64) int { return floorDiv(monthAt(t.unit, p, day)-shift, months) }
	c.begin = func(k int) float64 { return monthBegin(t.unit, k*months+shift, day) }
	c.label = func(k int) float64 { return float64(k*months + shift) }
	if months%12 == 0 {
		c.unit, c.step = Year, float64(months/12)
		late := 0
		if month > 1 || day > 1 {
			late = 1
		}
		c.label = func(k int) float64 { return float64(k*months/12 + late) }
	}
	return c, nil
}

// monthAt returns the month, counted from year 0, in which a position lies;
// months begin on the given day.
func monthAt(unit AxisUnit, pos float64, day int) int {
	switch unit {
	case Year:
		return int(math.Floor(pos*12 + 1e-6))
	case Month:
		return int(pos)
	case Second:
		pos = math.Floor(pos / daySeconds)
	}
	year, month, d := dateOf(int(math.Floor(pos)))
	if d < day {
		month--
	}
	return year*12 + month - 1
}

// monthBegin returns the first position of a month, in a unit.
func monthBegin(unit AxisUnit, month, day int) float64 {
	first := float64(dayNumber(floorDiv(month, 12), floorMod(month, 12)+1, day))
	switch unit {
	case Year:
		return float64(month) / 12
	case Month:
		return float64(month)
	case Second:
		return first * daySeconds
	}
	return first
}

// coarseDays counts periods of days, hours, minutes or seconds from
// 1970-01-01; whole weeks begin on Monday.
func coarseDays(t *track, p request.Period, every string) (*coarse, error) {
	if t.unit == Year || t.unit == Month {
		return nil, finer(t, every)
	}
	width := float64(p.Days)*daySeconds + p.Seconds
	scale := 1.0 // seconds in the unit of the source
	if t.unit == Day {
		scale = daySeconds
	}
	start := 0.0
	if math.Mod(width, 7*daySeconds) == 0 {
		start = -3 * daySeconds // 1970-01-01 was a Thursday
	}
	c := &coarse{unit: Second, step: width}
	c.index = func(pos float64) int { return int(math.Floor((pos*scale - start) / width)) }
	c.begin = func(k int) float64 { return (start + float64(k)*width) / scale }
	c.label = func(k int) float64 { return start + float64(k)*width }
	if math.Mod(width, daySeconds) == 0 {
		c.unit, c.step = Day, width/daySeconds
		c.label = func(k int) float64 { return (start + float64(k)*width) / daySeconds }
	} else if t.unit == Day {
		return nil, finer(t, every)
	}
	return c, nil
}
