package dataset

import (
	"context"
	"fmt"
	"math"
	"slices"

	"lagwise/lint/request"
	"lagwise/stats"
)

// Align brings the series of a request, in the order of its Columns method,
// onto shared rows: cut to from and until, at the coarser step of every or on
// the grid when one is asked for, lags applied, and only rows in which every
// series has a value. Positions match exactly, or within the tolerance asked
// for; a year never matches a month. In a correlation a lag moves the first
// series: the second at t meets the first at t - lag, so that it trails by the
// lag; in a regression each predictor is moved by its own.
//
// The error is a *Mismatch when the axes do not meet, a *stats.Undefined when
// no row is left.
func Align(ctx context.Context, all []*Series, req *request.Request) (*Frame, error) {
	tracks := make([]*track, len(all))
	for i, s := range all {
		if err := ctx.Err(); err != nil {
			return nil, err
		}
		t, err := prepared(s, req)
		if err != nil {
			return nil, err
		}
		tracks[i] = t
	}
	if len(tracks) == 0 {
		return nil, &stats.Undefined{What: "the request", Reason: stats.TooShort, Detail: "it names no series"}
	}
	if err := comparable(tracks); err != nil {
		return nil, err
	}
	slack, err := toleranceOf(tracks[0], req.Tolerance)
	if err != nil {
		return nil, err
	}
	for i, t := range tracks {
		if tracks[i], err = t.shifted(lagOf(i, req)); err != nil {
			return nil, err
		}
	}
	f := meet(tracks, slack)
	if len(f.Positions) == 0 {
		return nil, nothingShared(tracks)
	}
	f.number(stepOf(tracks))
	f.seal()
	return f, nil
}

// prepared takes a series through window, every and grid.
func prepared(s *Series, req *request.Request) (*track, error) {
	t, err := newTrack(s, req)
	if err == nil && req.Every != "" {
		t, err = t.aggregated(req)
	}
	if err == nil && req.Grid != nil {
		t, err = t.interpolated(req.Grid)
	}
	if err == nil && len(t.values) == 0 {
		err = &stats.Undefined{What: s.Name, Reason: stats.TooShort, Detail: "no value in what the request uses"}
	}
	return t, err
}

// lagOf returns by how many steps the i-th series is moved later.
func lagOf(i int, req *request.Request) int {
	if req.Kind != request.Regression {
		if i == 0 {
			return req.Lag
		}
		return 0
	}
	if i > 0 && i <= len(req.Predictors) {
		return req.Predictors[i-1].Lag
	}
	return 0
}

// comparable checks that all axes count the same steps.
func comparable(tracks []*track) error {
	a := tracks[0]
	for _, b := range tracks[1:] {
		switch {
		case (a.group == nil) != (b.group == nil):
			grouped, plain := a, b
			if a.group == nil {
				grouped, plain = b, a
			}
			return mismatch("%s stands in groups and %s does not; they share no rows", grouped.name, plain.name)
		case a.unit != b.unit || isTime(a) != isTime(b):
			return differ(a, b)
		case a.unit == Row && a.axis != b.axis:
			return mismatch("%s and %s are in row order only, in different files, so that nothing says which rows belong together; "+
				"name their axis in the manifest (along = …)", a.name, b.name)
		case isTime(a) && a.even && b.even && a.step > 0 && b.step > 0 && math.Abs(a.step-b.step) > 1e-6*a.step:
			return differ(a, b)
		case a.unit == Number && a.kind != b.kind:
			return mismatch("%s stands along %s and %s along %s; they share no axis", a.name, a.kind, b.name, b.kind)
		}
	}
	return nil
}

func isTime(t *track) bool { return t.unit != Number && t.unit != Row }

// differ says that two axes count different steps, and which is the coarser.
func differ(a, b *track) *Mismatch {
	m := &Mismatch{A: a.name, B: b.name, StepA: stepWords(a.unit, a.step, a.even), StepB: stepWords(b.unit, b.step, b.even)}
	m.Message = fmt.Sprintf("%s is %s and %s is %s: their positions do not match", a.name, m.StepA, b.name, m.StepB)
	if !isTime(a) || !isTime(b) {
		return m
	}
	coarser := a
	if b.step*secondsIn(b.unit) > a.step*secondsIn(a.unit) {
		coarser = b
	}
	m.Coarser = stepText(coarser.unit, coarser.step)
	if m.Coarser != "" {
		m.Message += fmt.Sprintf("; work at the coarser step: every = %q", m.Coarser)
	}
	return m
}

func secondsIn(unit AxisUnit) float64 {
	return map[AxisUnit]float64{Year: yearDays * daySeconds, Month: yearDays / 12 * daySeconds, Day: daySeconds, Second: 1}[unit]
}

// toleranceOf reads `tolerance` in the units of an axis; without one only
// rounding of the last bits is forgiven.
func toleranceOf(t *track, text string) (float64, error) {
	exact := 1e-9
	if t.even && t.step > 0 && t.unit == Number {
		exact = 1e-6 * t.step
	}
	if text == "" || text == "0" {
		return exact, nil
	}
	if v, ok := parsePlain([]byte(text), '.'); ok && v >= 0 {
		return max(exact, v), nil
	}
	p, err := request.ParsePeriod(text)
	if err != nil || !isTime(t) {
		return 0, mismatch("tolerance = %q is neither a number nor, on a time axis, a duration such as P1D", text)
	}
	return max(exact, lengthIn(p, t.unit)), nil
}

// stepOf returns the common step: that of the evenest axis, the coarsest of
// several.
func stepOf(tracks []*track) float64 {
	step := 0.0
	for _, t := range tracks {
		step = max(step, t.step)
	}
	return step
}

// meet keeps the rows of the first track that every other track has too.
func meet(tracks []*track, slack float64) *Frame {
	first := tracks[0]
	f := &Frame{Even: true, Unit: first.unit, scale: first.scale, Columns: make([][]float64, len(tracks)), groups: first.labels}
	step := stepOf(tracks)
	for _, t := range tracks {
		f.Names = append(f.Names, t.name)
		f.Even = f.Even && t.even && (t.step == 0 || math.Abs(t.step-step) <= 1e-6*step)
		f.Season = max(f.Season, t.season)
		f.Filled += t.filled
		f.Lost += len(t.values)
	}
	f.StepText = stepText(f.Unit, step)
	rank := groupRanks(tracks)
	next := make([]int, len(tracks))
	row := make([]int, len(tracks))
	for i, pos := range first.positions {
		g := first.groupAt(i)
		row[0] = i
		complete := true
		for k := 1; k < len(tracks) && complete; k++ {
			row[k], complete = tracks[k].near(&next[k], rank[k], g, pos, slack)
		}
		if !complete {
			continue
		}
		for k, t := range tracks {
			f.Columns[k] = append(f.Columns[k], t.values[row[k]])
		}
		f.Positions = append(f.Positions, pos)
		if first.group != nil {
			f.Group = append(f.Group, g)
		}
	}
	f.Lost = unionOf(tracks, rank, slack) - len(f.Positions)
	return f
}

// groupRanks maps the groups of each track to those of the first.
func groupRanks(tracks []*track) [][]int {
	ranks := make([][]int, len(tracks))
	for k, t := range tracks {
		ranks[k] = make([]int, len(t.labels))
		for i, l := range t.labels {
			ranks[k][i] = slices.Index(tracks[0].labels, l)
		}
	}
	return ranks
}

// near finds the row of a track that is nearest to a position of a group and
// within slack, from *next on; each row serves once.
func (t *track) near(next *int, rank []int, group int, pos, slack float64) (row int, ok bool) {
	n := len(t.values)
	i := *next
	if t.group != nil && (i >= n || rank[t.group[i]] != group) {
		i = t.groupStart(rank, group)
	}
	inside := func(i int) bool { return i < n && (t.group == nil || rank[t.group[i]] == group) }
	for inside(i) && t.positions[i] < pos-slack {
		i++
	}
	for inside(i+1) && math.Abs(t.positions[i+1]-pos) < math.Abs(t.positions[i]-pos) {
		i++
	}
	*next = i
	if !inside(i) || math.Abs(t.positions[i]-pos) > slack {
		return 0, false
	}
	*next = i + 1
	return i, true
}

func (t *track) groupStart(rank []int, group int) int {
	for i, g := range t.group {
		if rank[g] == group {
			return i
		}
	}
	return len(t.group)
}

// unionOf counts the positions at which any track has a value.
func unionOf(tracks []*track, rank [][]int, slack float64) int {
	type place struct {
		group int
		pos   float64
	}
	aligned := true
	for _, t := range tracks[1:] {
		aligned = aligned && slices.Equal(t.positions, tracks[0].positions)
	}
	if aligned {
		return len(tracks[0].positions)
	}
	var all []place
	for k, t := range tracks {
		for i, p := range t.positions {
			g := 0
			if t.group != nil {
				g = rank[k][t.group[i]]
				if g < 0 {
					g = len(tracks[0].labels) + t.group[i]
				}
			}
			all = append(all, place{g, p})
		}
	}
	slices.SortFunc(all, func(a, b place) int {
		if a.group != b.group {
			return a.group - b.group
		}
		switch {
		case a.pos < b.pos:
			return -1
		case a.pos > b.pos:
			return 1
		}
		return 0
	})
	n := 0
	for i, p := range all {
		if i == 0 || p.group != all[i-1].group || p.pos-all[i-1].pos > slack {
			n++
		}
	}
	return n
}

// nothingShared says why no row is left.
func nothingShared(tracks []*track) error {
	a := tracks[0]
	span := func(t *track) string {
		return fmt.Sprintf("%s runs from %s to %s", t.name, t.scale.format(t.positions[0]), t.scale.format(t.positions[len(t.positions)-1]))
	}
	for _, b := range tracks[1:] {
		if f := meet([]*track{a, b}, 1e-9); len(f.Positions) == 0 {
			m := mismatch("%s and %s share no position: %s, %s", a.name, b.name, span(a), span(b))
			m.A, m.B, m.StepA, m.StepB = a.name, b.name, stepWords(a.unit, a.step, a.even), stepWords(b.unit, b.step, b.even)
			return m
		}
	}
	return &stats.Undefined{What: "the request", Reason: stats.TooShort, Detail: "no row has a value of every series"}
}
