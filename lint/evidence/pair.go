package evidence

import (
	"context"
	"fmt"

	"lagwise/lint/dataset"
	"lagwise/lint/request"
	"lagwise/stats"
	"lagwise/stats/association"
)

// Unserved is the error of what a request asks and this version cannot
// compute; Key is the key that asks for it.
type Unserved struct{ Key, Message string }

func (u *Unserved) Error() string { return u.Message }

// Pair returns the correlation that the request asks of two of its columns.
func (c *Case) Pair(i, j int) (association.Result, error) {
	r, err := c.used()
	if err != nil {
		return association.Result{}, err
	}
	if err := c.served(); err != nil {
		return association.Result{}, err
	}
	got, err := c.store.correlated(c.ctx, r, i, j, c.Given(), &c.req)
	return got, c.note(err)
}

func (c *Case) served() error {
	switch {
	case c.req.Inference == "surrogates" || c.req.Inference == "modified-t":
		return &Unserved{"inference", fmt.Sprintf("inference = %q is not computed by this version; effective-n is", c.req.Inference)}
	case c.req.Lags != nil:
		return &Unserved{"lags", "a scan over lags is not computed by this version; lag = K is"}
	}
	return nil
}

func (s *Store) correlated(ctx context.Context, f *rows, i, j int, given []int, req *request.Request) (association.Result, error) {
	parts := []any{"correlated", f.key(i), f.key(j), req.Coefficient, req.Inference, Prewhitens(req.On), req.RemoveFrom}
	controls := make([][]float64, len(given))
	for k, g := range given {
		controls[k] = f.Columns[g]
		parts = append(parts, f.key(g))
	}
	return remember(ctx, s.derived, keyOf(parts...), func(context.Context) (association.Result, int64, error) {
		r, err := correlate(f.Frame, f.Columns[i], f.Columns[j], controls, req)
		return r, 128, err
	})
}

func correlate(f *dataset.Frame, x, y []float64, controls [][]float64, req *request.Request) (association.Result, error) {
	inference := association.Inference{
		EffectiveN:  req.Inference == "effective-n",
		Removed:     f.Removed,
		Prewhitened: Prewhitens(req.On),
		Level:       0.95,
	}
	switch {
	case len(controls) > 0 && req.RemoveFrom != "both" && req.RemoveFrom != "":
		return association.Semipartial(x, y, controls, f.Runs, req.RemoveFrom, req.Coefficient, inference)
	case len(controls) > 0:
		return association.Partial(x, y, controls, f.Runs, req.Coefficient, inference)
	case req.Coefficient == "spearman":
		return association.Spearman(x, y, f.Runs, inference)
	case req.Coefficient == "kendall":
		return association.Kendall(x, y, f.Runs, inference)
	}
	return association.Pearson(x, y, f.Runs, inference)
}

// Detectable returns the smallest correlation that the pair's effective n
// would find with 80 % power, or nil.
func (c *Case) Detectable(r association.Result) *float64 {
	n := r.EffectiveN
	if n == 0 {
		n = float64(r.N)
	}
	d, err := association.Detectable(n, len(c.req.Given), c.Settings.Alpha)
	if err != nil {
		return nil
	}
	return &d
}

// EffectiveN returns the effective n of two columns as they are used, whether
// or not the request asks for it.
func (c *Case) EffectiveN(i, j int) (float64, error) {
	frame, err := c.used()
	if err != nil {
		return 0, err
	}
	n, err := remember(c.ctx, c.store.derived, keyOf("effective-n", frame.key(i), frame.key(j)),
		func(context.Context) (float64, int64, error) {
			n, err := association.EffectiveN(frame.Columns[i], frame.Columns[j], frame.Runs)
			return n, 8, err
		})
	return n, c.note(err)
}

// Rows returns the number of rows that the request uses after all transforms.
func (c *Case) Rows() (int, error) {
	frame, err := c.Used()
	if err != nil {
		return 0, err
	}
	if len(frame.Positions) == 0 {
		return 0, &stats.Undefined{What: "the request", Reason: stats.TooShort, Need: 3}
	}
	return len(frame.Positions), nil
}
