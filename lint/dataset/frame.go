package dataset

import (
	"crypto/sha256"
	"math"

	"lagwise/stats/series"
)

// Frame is the rows that a request uses: complete, aligned, in the order of
// the axis.
type Frame struct {
	Names     []string
	Columns   [][]float64
	Positions []float64 // in Unit
	Step      []int     // whole-step index of each row, strictly increasing; modulo Season it is the place in the season
	Runs      []int     // end index of each stretch without a gap
	Season    int       // steps, 0 when there is none
	Even      bool
	Unit      AxisUnit
	StepText  string // of the rows
	From      string // first position
	Until     string // last position
	Lost      int    // positions with a value that are not shared by all series
	Digest    [32]byte
	Orders    []int // of the autoregression that prewhitened took off each column, when it came last
	Removed   int   // terms that transforms have taken off: seasonal means, lines
	Filled    int   // values made by interpolation, which was asked for
	Group     []int // group of each row; nil when there is one
	groups    []string
	scale     scale
}

// Column returns the values of a series.
func (f *Frame) Column(i int) []float64 { return f.Columns[i] }

// SeriesRuns returns the values of a series as its stretches without a gap.
func (f *Frame) SeriesRuns(i int) series.Runs {
	runs := make(series.Runs, 0, len(f.Runs))
	start := 0
	for _, end := range f.Runs {
		runs = append(runs, f.Columns[i][start:end])
		start = end
	}
	return runs
}

// At returns the positions, in the axis' unit.
func (f *Frame) At() []float64 { return f.Positions }

// Format returns a position as a person writes it.
func (f *Frame) Format(pos float64) string { return f.scale.format(pos) }

// Groups returns the labels of the groups that have rows, in their order.
func (f *Frame) Groups() []string {
	var labels []string
	for i, g := range f.Group {
		if i == 0 || g != f.Group[i-1] {
			labels = append(labels, f.groups[g])
		}
	}
	return labels
}

// stretches returns the first and end index of each group's rows.
func (f *Frame) stretches() [][2]int {
	if len(f.Positions) == 0 {
		return nil
	}
	all := [][2]int{{0, len(f.Positions)}}
	for i := 1; i < len(f.Group); i++ {
		if f.Group[i] != f.Group[i-1] {
			all[len(all)-1][1] = i
			all = append(all, [2]int{i, len(f.Positions)})
		}
	}
	return all
}

// runOf returns the run of each row.
func (f *Frame) runOf() []int {
	of := make([]int, len(f.Positions))
	start := 0
	for r, end := range f.Runs {
		for i := start; i < end; i++ {
			of[i] = r
		}
		start = end
	}
	return of
}

// number gives each row its whole step and finds the runs. On an even axis a
// run ends where a step is missing; on an uneven one only where the group
// changes. Steps of later groups are moved by whole seasons, so that they
// rise and keep their place in the season.
func (f *Frame) number(step float64) {
	f.Step = make([]int, len(f.Positions))
	f.Runs = nil
	offset, season := 0, max(1, f.Season)
	for _, s := range f.stretches() {
		for i := s[0]; i < s[1]; i++ {
			at := i
			if f.Even && step > 0 {
				at = int(math.Round(f.Positions[i] / step))
			}
			if i == s[0] && i > 0 && at+offset <= f.Step[i-1] {
				offset += (floorDiv(f.Step[i-1]-at-offset, season) + 2) * season
			}
			f.Step[i] = at + offset
			if i > 0 && (i == s[0] || f.Even && f.Step[i] != f.Step[i-1]+1) {
				f.Runs = append(f.Runs, i)
			}
		}
	}
	if n := len(f.Positions); n > 0 {
		f.Runs = append(f.Runs, n)
		f.From, f.Until = f.Format(f.Positions[0]), f.Format(f.Positions[n-1])
	}
}

// seal makes the digest of values, positions and runs.
func (f *Frame) seal() {
	h := sha256.New()
	for _, c := range f.Columns {
		hashFloats(h, c)
	}
	hashFloats(h, f.Positions)
	hashInts(h, f.Runs)
	hashInts(h, []int{f.Season, int(f.Unit), f.Removed})
	f.Digest = [32]byte(h.Sum(nil))
}
