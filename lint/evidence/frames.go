package evidence

import (
	"context"
	"errors"

	"lagwise/lint/dataset"
	"lagwise/lint/request"
)

// The three frames of a case.
const (
	levels = iota // aligned, in the window, lags applied: the values as measured
	base          // after the steps that say what is measured (log, increments, …): what the verdict is of
	used          // after all transforms: what is correlated or regressed
)

// Levels returns the rows that the request uses, as measured. The error is a
// *Unavailable, a *dataset.Mismatch or a *stats.Undefined.
func (c *Case) Levels() (*dataset.Frame, error) { return plain(c.levels()) }

// Base returns the rows after the steps of on-each and the leading steps of
// on that only restate what is measured.
func (c *Case) Base() (*dataset.Frame, error) { return plain(c.base()) }

// Used returns the rows after all transforms.
func (c *Case) Used() (*dataset.Frame, error) { return plain(c.used()) }

func plain(r *rows, err error) (*dataset.Frame, error) {
	if err != nil {
		return nil, err
	}
	return r.Frame, nil
}

func (c *Case) levels() (*rows, error) {
	return c.framed(levels, func() (*rows, error) {
		all, err := c.load()
		if err != nil {
			return nil, err
		}
		return c.store.aligned(c.ctx, all, &c.req)
	})
}

func (c *Case) base() (*rows, error) {
	return c.framed(base, func() (*rows, error) {
		r, err := c.levels()
		if err != nil {
			return nil, err
		}
		head, _ := SplitOn(c.req.On)
		if len(head) == 0 && len(c.req.OnEach) == 0 {
			return r, nil
		}
		return c.store.transformed(c.ctx, r, c.each(), head, nil)
	})
}

func (c *Case) used() (*rows, error) {
	return c.framed(used, func() (*rows, error) {
		r, err := c.base()
		if err != nil {
			return nil, err
		}
		_, tail := SplitOn(c.req.On)
		if len(tail) == 0 {
			return r, nil
		}
		shapes, err := c.shapes(tail)
		if err != nil {
			return nil, err
		}
		return c.store.transformed(c.ctx, r, nil, tail, shapes)
	})
}

func (c *Case) framed(which int, make func() (*rows, error)) (*rows, error) {
	c.mu.Lock()
	got := c.frames[which]
	c.mu.Unlock()
	if got != nil {
		return got.rows, got.err
	}
	r, err := make()
	c.note(err)
	if err == nil || !passing(err) {
		c.mu.Lock()
		c.frames[which] = &framed{r, err}
		c.mu.Unlock()
	}
	return r, err
}

// SplitOn parts the transforms into those that restate what is measured and
// the rest, beginning with the first step that removes drift, season or
// autocorrelation.
func SplitOn(on []request.Transform) (head, tail []request.Transform) {
	for i, t := range on {
		switch t.Name {
		case request.Log, request.Increments, request.MovingMean, request.Standardized:
		default:
			return on[:i], on[i:]
		}
	}
	return on, nil
}

func (c *Case) each() [][]request.Transform {
	if len(c.req.OnEach) == 0 {
		return nil
	}
	names := c.Names()
	steps := make([][]request.Transform, len(names))
	for i, name := range names {
		steps[i] = c.req.OnEach[name]
	}
	return steps
}

// shapes says which terms the autoregression of each series has when it is
// prewhitened: a trend where the verdict is trend-stationary, seasonal terms
// where the season is fixed.
func (c *Case) shapes(tail []request.Transform) ([]dataset.Shape, error) {
	if !hasStep(tail, request.Prewhitened) {
		return nil, nil
	}
	shapes := make([]dataset.Shape, len(c.Names()))
	if tail[0].Name != request.Prewhitened {
		return shapes, nil
	}
	for i := range shapes {
		p, err := c.BaseProfile(i)
		if err != nil {
			return nil, err
		}
		shapes[i] = dataset.Shape{Trend: p.Verdict == TrendStationary, Season: p.Season.Material && !p.Season.Stochastic}
	}
	return shapes, nil
}

func hasStep(on []request.Transform, names ...string) bool {
	for _, t := range on {
		for _, n := range names {
			if t.Name == n {
				return true
			}
		}
	}
	return false
}

// Differences reports whether the transforms hold a step that takes a drift
// off by differencing.
func Differences(on []request.Transform) bool {
	return hasStep(on, request.FirstDifferences, request.SeasonalDifferences, request.RatesOfChange, request.Differences)
}

// Prewhitens reports whether the transforms hold prewhitened.
func Prewhitens(on []request.Transform) bool { return hasStep(on, request.Prewhitened) }

// Detrends reports whether the transforms hold detrended.
func Detrends(on []request.Transform) bool { return hasStep(on, request.Detrended) }

// BaseProfile returns what is known of a series before its drift, season or
// autocorrelation is removed.
func (c *Case) BaseProfile(i int) (*Profile, error) {
	r, err := c.base()
	if err != nil {
		return nil, err
	}
	p, err := c.store.profile(c.ctx, r.column(i), c.Settings)
	return p, c.note(err)
}

// UsedProfile returns what is known of a series after all transforms.
func (c *Case) UsedProfile(i int) (*Profile, error) {
	r, err := c.used()
	if err != nil {
		return nil, err
	}
	col := r.column(i)
	col.around = Detrends(c.req.On) && !Differences(c.req.On) && !Prewhitens(c.req.On)
	p, err := c.store.profile(c.ctx, col, c.Settings)
	return p, c.note(err)
}

// aligned aligns the series as the request asks, remembered.
func (s *Store) aligned(ctx context.Context, all []*dataset.Series, req *request.Request) (*rows, error) {
	parts := []any{"aligned", req.From, req.Until, req.Every, req.Aggregate, req.LeastShare, req.YearStarts,
		req.Tolerance, req.Lag, int(req.Kind), req.Columns(), req.Groups, req.GroupList}
	if req.Grid != nil {
		parts = append(parts, *req.Grid)
	}
	for _, one := range all {
		parts = append(parts, one.Name, one.Digest, one.Season)
	}
	return remember(ctx, s.derived, keyOf(parts...), func(ctx context.Context) (*rows, int64, error) {
		frame, err := dataset.Align(ctx, all, req)
		return rowsOf(frame), bytesOf(frame), err
	})
}

func (s *Store) transformed(ctx context.Context, r *rows, each [][]request.Transform, on []request.Transform, shapes []dataset.Shape) (*rows, error) {
	k := keyOf("transformed", r.Digest, r.Names, r.Season, r.Removed, each, on, shapes)
	return remember(ctx, s.derived, k, func(context.Context) (*rows, int64, error) {
		frame, err := r.Transform(each, on, shapes)
		return rowsOf(frame), bytesOf(frame), err
	})
}

func bytesOf(f *dataset.Frame) int64 {
	if f == nil {
		return 0
	}
	return int64(8 * (len(f.Columns) + 2) * (1 + len(f.Positions)))
}

// IsMismatch returns the mismatch of axes that an error speaks of.
func IsMismatch(err error) (*dataset.Mismatch, bool) {
	var m *dataset.Mismatch
	return m, errors.As(err, &m)
}
