package evidence

import (
	"context"
	"math"

	"lagwise/lint/dataset"
	"lagwise/stats/association"
	"lagwise/stats/regression"
	"lagwise/stats/residual"
	"lagwise/stats/series"
)

// Scatter is what the look of a pair says about the coefficient that suits it.
// Nothing in it depends on the sign of either series.
type Scatter struct {
	X, Y       Shape
	Difference float64 // |Spearman - Pearson|
	Curvature  float64 // Cohen's f2 of RESET on whitened values
	CurvatureP float64
}

// Shape is the shape of one whitened series.
type Shape struct {
	Skewness, ExcessKurtosis float64
	W, P                     float64 // Shapiro-Wilk
}

// Reason says why Pearson's coefficient does not suit, or "".
func (s Scatter) Reason(set Settings) string {
	odd := func(h Shape) string {
		if h.P >= set.Alpha {
			return ""
		}
		if math.Abs(h.Skewness) >= set.Limit("material-skewness", 1) {
			return "skewed"
		}
		if h.ExcessKurtosis >= set.Limit("material-kurtosis", 3) {
			return "heavy-tailed"
		}
		return ""
	}
	switch {
	case s.CurvatureP < set.Alpha && s.Curvature >= set.Limit("material-curvature", 0.15):
		return "curved"
	case odd(s.X) != "":
		return odd(s.X)
	case odd(s.Y) != "":
		return odd(s.Y)
	case s.Difference >= set.Limit("rank-difference", 0.15):
		return "outlying"
	}
	return ""
}

// Scatter returns the look of two columns as they are used.
func (c *Case) Scatter(i, j int) (Scatter, error) {
	frame, err := c.used()
	if err != nil {
		return Scatter{}, err
	}
	k := keyOf("scatter", frame.key(i), frame.key(j))
	got, err := remember(c.ctx, c.store.derived, k, func(context.Context) (Scatter, int64, error) {
		s, err := look(frame.Frame, i, j)
		return s, 96, err
	})
	return got, c.note(err)
}

func look(f *dataset.Frame, i, j int) (Scatter, error) {
	x, y := f.Columns[i], f.Columns[j]
	usual := association.Inference{Level: 0.95}
	pearson, err := association.Pearson(x, y, f.Runs, usual)
	if err != nil {
		return Scatter{}, err
	}
	spearman, err := association.Spearman(x, y, f.Runs, usual)
	if err != nil {
		return Scatter{}, err
	}
	wx, wy, err := whitenedPair(f, x, y)
	if err != nil {
		return Scatter{}, err
	}
	s := Scatter{Difference: math.Abs(spearman.Estimate - pearson.Estimate), CurvatureP: 1}
	if s.X, err = shapeOf(wx); err != nil {
		return s, err
	}
	if s.Y, err = shapeOf(wy); err != nil {
		return s, err
	}
	s.curve(wx, wy)
	s.curve(wy, wx)
	return s, nil
}

// whitenedPair returns the residuals of both series' own autoregressions on
// the rows they share: the tests of shape assume independent values.
func whitenedPair(f *dataset.Frame, x, y []float64) (wx, wy []float64, err error) {
	ax, err := series.FitAR(x, f.Step, f.Runs, false, 0)
	if err != nil {
		return nil, nil, err
	}
	ay, err := series.FitAR(y, f.Step, f.Runs, false, 0)
	if err != nil {
		return nil, nil, err
	}
	at := make(map[int]float64, len(ay.Rows))
	for k, row := range ay.Rows {
		at[row] = ay.Residuals[k]
	}
	for k, row := range ax.Rows {
		if v, ok := at[row]; ok {
			wx, wy = append(wx, ax.Residuals[k]), append(wy, v)
		}
	}
	return wx, wy, nil
}

// mostShapiro is the range of Royston's approximation; beyond it a material
// skewness or kurtosis is never chance.
const mostShapiro = 5000

func shapeOf(x []float64) (Shape, error) {
	m, err := series.Describe(x)
	if err != nil {
		return Shape{}, err
	}
	s := Shape{Skewness: m.Skewness, ExcessKurtosis: m.Kurtosis - 3}
	if len(x) <= mostShapiro {
		s.W, s.P, err = residual.ShapiroWilk(x)
	}
	return s, err
}

// curve keeps the more material curvature of y on x.
func (s *Scatter) curve(x, y []float64) {
	d := regression.Design{Y: y, X: [][]float64{x}, Runs: []int{len(y)}}
	fit, err := regression.OLS(d, 0.95)
	if err != nil {
		return
	}
	got, err := residual.RESET(d, fit)
	if err == nil && got.PartialF2 > s.Curvature {
		s.Curvature, s.CurvatureP = got.PartialF2, got.P
	}
}
