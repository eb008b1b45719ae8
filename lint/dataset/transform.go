package dataset

import (
	"crypto/sha256"
	"fmt"
	"hash"
	"math"

	"lagwise/lint/request"
	"lagwise/stats"
	"lagwise/stats/series"
)

// Shape is what the autoregression of one series takes along when it is
// prewhitened.
type Shape struct{ Trend, Season bool }

// Transform returns the frame after the transforms of each column, then those
// of all, in their order. Nothing crosses a gap or a group; lines, means and
// autoregressions are of each group by itself; a row that one column loses is
// lost by all. Removed counts the terms taken off: s - 1 for each group by
// anomalies, 1 by detrended, those of the autoregression by prewhitened.
//
// The error is a *stats.Undefined that names the series.
func (f *Frame) Transform(each [][]request.Transform, on []request.Transform, shapes []Shape) (*Frame, error) {
	out, err := f.transformEach(each)
	if err != nil {
		return nil, err
	}
	for _, step := range on {
		if out, err = out.transformAll(step, shapes); err != nil {
			return nil, err
		}
	}
	if out != f {
		out.Digest = derived(f.Digest, func(h hash.Hash) { fmt.Fprint(h, each, on, shapes) })
	}
	return out, nil
}

func derived(from [32]byte, write func(h hash.Hash)) [32]byte {
	h := sha256.New()
	h.Write(from[:])
	write(h)
	return [32]byte(h.Sum(nil))
}

func (f *Frame) transformEach(each [][]request.Transform) (*Frame, error) {
	columns := append([][]float64{}, f.Columns...)
	removed, changed := 0, false
	for i := range columns {
		if i >= len(each) {
			break
		}
		taken, one := 0, f
		for _, step := range each[i] {
			p := part{frame: one, index: i}
			values, n, err := p.apply(step, Shape{})
			if err != nil {
				return nil, err
			}
			changed = true
			taken += n
			columns[i] = values
			one = one.with(i, values)
		}
		removed = max(removed, taken)
	}
	if !changed {
		return f, nil
	}
	return f.keep(columns, removed)
}

// with returns a frame of the same rows in which one column is replaced; NaN
// stands for lost rows until keep drops them.
func (f *Frame) with(i int, values []float64) *Frame {
	g := *f
	g.Columns = append([][]float64{}, f.Columns...)
	g.Columns[i] = values
	return &g
}

func (f *Frame) transformAll(step request.Transform, shapes []Shape) (*Frame, error) {
	columns := make([][]float64, len(f.Columns))
	var orders []int
	removed := 0
	for i := range f.Columns {
		shape := Shape{}
		if i < len(shapes) {
			shape = shapes[i]
		}
		p := part{frame: f, index: i}
		values, n, err := p.apply(step, shape)
		if err != nil {
			return nil, err
		}
		columns[i] = values
		removed = max(removed, n)
		if step.Name == request.Prewhitened {
			orders = append(orders, p.lost(values))
		}
	}
	out, err := f.keep(columns, removed)
	if err == nil {
		out.Orders = orders
	}
	return out, err
}

// lost is how many rows the start of each run lost to the order of an
// autoregression.
func (p part) lost(values []float64) int {
	order := 0
	for order < len(values) && values[order] != values[order] {
		order++
	}
	return order
}

// keep returns the rows that no column has lost.
func (f *Frame) keep(columns [][]float64, removed int) (*Frame, error) {
	out := &Frame{Names: f.Names, Season: f.Season, Even: f.Even, Unit: f.Unit, StepText: f.StepText, Lost: f.Lost,
		Removed: f.Removed + removed, Filled: f.Filled, groups: f.groups, scale: f.scale, Columns: make([][]float64, len(columns))}
	kept := make([]int, 0, len(f.Positions))
	for row := range f.Positions {
		complete := true
		for _, c := range columns {
			complete = complete && c[row] == c[row]
		}
		if complete {
			kept = append(kept, row)
		}
	}
	if len(kept) == 0 {
		return nil, &stats.Undefined{What: "the transformed series", Reason: stats.TooShort, N: 0,
			Detail: fmt.Sprintf("the transforms leave no row of %d", len(f.Positions))}
	}
	for i, c := range columns {
		out.Columns[i] = arranged(c, kept)
	}
	out.Positions, out.Step = arranged(f.Positions, kept), arranged(f.Step, kept)
	if f.Group != nil {
		out.Group = arranged(f.Group, kept)
	}
	run := f.runOf()
	for i := 1; i < len(kept); i++ {
		if kept[i] != kept[i-1]+1 || run[kept[i]] != run[kept[i-1]] {
			out.Runs = append(out.Runs, i)
		}
	}
	out.Runs = append(out.Runs, len(kept))
	out.From, out.Until = out.Format(out.Positions[0]), out.Format(out.Positions[len(kept)-1])
	return out, nil
}

// part is one column that is transformed.
type part struct {
	frame *Frame
	index int
}

func (p part) values() []float64 { return p.frame.Columns[p.index] }

func (p part) undefined(reason stats.Reason, format string, args ...any) error {
	return &stats.Undefined{What: p.frame.Names[p.index], Reason: reason, N: len(p.values()), Detail: fmt.Sprintf(format, args...)}
}

// apply returns the values after one step, NaN where a row is lost, and the
// terms that were taken off.
func (p part) apply(step request.Transform, shape Shape) (values []float64, removed int, err error) {
	switch step.Name {
	case request.Log:
		values, err = p.log()
	case request.Anomalies:
		return p.anomalies()
	case request.Detrended:
		return p.detrended()
	case request.FirstDifferences, request.Increments:
		values = p.differences(1)
	case request.Differences:
		values, err = p.over(step.K, p.differences)
	case request.MovingMean:
		values, err = p.over(step.K, p.movingMean)
	case request.SeasonalDifferences:
		if err = p.needsSeason("seasonal-differences"); err == nil {
			values = p.differences(p.frame.Season)
		}
	case request.RatesOfChange:
		values, err = p.rates()
	case request.Standardized:
		values, err = p.standardized()
	case request.Prewhitened:
		return p.prewhitened(shape)
	default:
		err = p.undefined(stats.NotFinite, "the transform %q is not known", step.Name)
	}
	return values, 0, err
}

func (p part) over(k int, of func(int) []float64) ([]float64, error) {
	if k < 1 {
		return nil, p.undefined(stats.TooShort, "a transform over %d steps does not exist", k)
	}
	return of(k), nil
}

func (p part) needsSeason(name string) error {
	if p.frame.Season < 2 {
		return p.undefined(stats.TooShort, "%s needs a season, and none is declared or follows from the step", name)
	}
	return nil
}

// blank returns a column in which every row is lost.
func (p part) blank() []float64 {
	values := make([]float64, len(p.values()))
	for i := range values {
		values[i] = math.NaN()
	}
	return values
}

// eachRun calls do with the first and end index of each run.
func (p part) eachRun(do func(start, end int)) {
	start := 0
	for _, end := range p.frame.Runs {
		do(start, end)
		start = end
	}
}

func (p part) prewhitened(shape Shape) ([]float64, int, error) {
	f := p.frame
	if !f.Even {
		return nil, 0, p.undefined(stats.TooShort, "prewhitened needs even steps; take rates-of-change or a coarser step (every = …)")
	}
	out, removed := p.blank(), 0
	season := 0
	if shape.Season {
		season = f.Season
	}
	for _, s := range f.stretches() {
		rows, runs := p.present(s[0], s[1])
		x, at := arranged(p.values(), rows), arranged(f.Step, rows)
		fit, err := series.FitAR(x, at, runs, shape.Trend, season)
		if err != nil {
			return nil, 0, p.named(err)
		}
		for i, row := range fit.Rows {
			out[rows[row]] = fit.Residuals[i]
		}
		removed = max(removed, fit.Terms)
	}
	return out, removed, nil
}

// present returns the rows from start to end that were not lost, and where
// their stretches end.
func (p part) present(start, end int) (rows, runs []int) {
	run := p.frame.runOf()
	for i := start; i < end; i++ {
		if v := p.values()[i]; v != v {
			continue
		}
		if n := len(rows); n > 0 && (rows[n-1] != i-1 || run[i] != run[rows[n-1]]) {
			runs = append(runs, n)
		}
		rows = append(rows, i)
	}
	return rows, append(runs, len(rows))
}

// named says of which series a statistic is undefined.
func (p part) named(err error) error {
	if u, ok := err.(*stats.Undefined); ok {
		named := *u
		named.What = p.frame.Names[p.index] + ", " + u.What
		return &named
	}
	return err
}
