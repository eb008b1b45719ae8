package dataset

import (
	"math"

	"lagwise/lint/request"
)

// mostGrid bounds the rows that a grid can ask for.
const mostGrid = 50_000_000

// interpolated returns a track on a regular grid, by straight lines between
// neighbouring values, never beyond the first and last. It is done only when a
// request asks for it, and counted.
func (t *track) interpolated(g *request.Grid) (*track, error) {
	if !(g.Step > 0) || math.IsInf(g.Step, 0) {
		return nil, mismatch("grid = { step = %v } is not a width above 0", g.Step)
	}
	if g.By != "" && g.By != "linear" {
		return nil, mismatch("grid = { by = %q } is not known; write linear", g.By)
	}
	out := *t
	out.positions, out.values, out.group = nil, nil, nil
	out.step, out.even = g.Step, true
	out.season = usualSeason(t.unit, g.Step)
	for start := 0; start < len(t.values); {
		end := start + 1
		for end < len(t.values) && t.groupAt(end) == t.groupAt(start) {
			end++
		}
		if (t.positions[end-1]-t.positions[start])/g.Step > mostGrid {
			return nil, mismatch("grid = { step = %v } gives more than %d rows for %s; take a wider step", g.Step, mostGrid, t.name)
		}
		out.fillBetween(t, g.Step, start, end)
		start = end
	}
	return &out, nil
}

// fillBetween appends the grid positions of one group.
func (t *track) fillBetween(from *track, step float64, start, end int) {
	j := start
	last := from.positions[end-1]
	for k := math.Ceil(from.positions[start]/step - 1e-9); k*step <= last+1e-9*step; k++ {
		pos := k * step
		for j+1 < end-1 && from.positions[j+1] < pos {
			j++
		}
		v := from.values[j]
		if j+1 < end {
			a, b := from.positions[j], from.positions[j+1]
			share := min(1, max(0, (pos-a)/(b-a)))
			if share > 1e-9 && share < 1-1e-9 {
				t.filled++
			}
			v = from.values[j]*(1-share) + from.values[j+1]*share
		}
		t.positions = append(t.positions, pos)
		t.values = append(t.values, v)
		if from.group != nil {
			t.group = append(t.group, from.group[start])
		}
	}
}
