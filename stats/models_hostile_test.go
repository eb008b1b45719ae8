package stats_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"lagwise/stats"
	"lagwise/stats/association"
	"lagwise/stats/regression"
	"lagwise/stats/residual"
)

// hostilePair are three columns of one length of odd kinds: noise, ties,
// constants, lines, copies of each other, one value not finite; in units from
// 1e-300 to 1e300, on offsets up to 1e12 units; with gaps.
type hostilePair struct {
	x, y, z []float64
	ends    []int
}

func newHostilePair(r *rand.Rand) hostilePair {
	n := []int{2, 3, 4, 5, 6, 8, 12, 25, 60}[r.IntN(9)]
	h := hostilePair{x: hostileColumn(r, n), y: hostileColumn(r, n), z: hostileColumn(r, n)}
	switch r.IntN(8) {
	case 0:
		copy(h.y, h.x)
	case 1:
		copy(h.z, h.x)
	case 2:
		h.z[r.IntN(n)] = math.Inf(1)
	}
	for i := 1; i < n; i++ {
		if r.IntN(12) == 0 {
			h.ends = append(h.ends, i)
		}
	}
	h.ends = append(h.ends, n)
	return h
}

func hostileColumn(r *rand.Rand, n int) []float64 {
	unit := []float64{1, 1, 1e-300, 1e300, 1e-9, 1e9}[r.IntN(6)]
	offset := []float64{0, 0, 1e12}[r.IntN(3)]
	if unit > 1e200 {
		offset = 0
	}
	kind := r.IntN(9)
	out := make([]float64, n)
	for i := range out {
		v := []float64{r.NormFloat64(), math.Round(r.NormFloat64()), float64(i), float64(i % 2), float64(max(0, 1-i)),
			math.Sin(float64(i)), 0.1, float64(i) * 0.1, 0}[kind]
		out[i] = (v + offset) * unit
	}
	if kind == 0 && r.IntN(10) == 0 {
		out[r.IntN(n)] = math.NaN()
	}
	return out
}

// Whatever the data: a finite answer with p in 0..1, or an error with a reason;
// no panic, and nothing changed.
func TestHostilePairs(t *testing.T) {
	r := rand.New(rand.NewPCG(5, 2))
	for i := 0; i < 2500 && !t.Failed(); i++ {
		h := newHostilePair(r)
		was := hostilePair{slices.Clone(h.x), slices.Clone(h.y), slices.Clone(h.z), slices.Clone(h.ends)}
		check := func(name string, err error, values ...float64) {
			var u *stats.Undefined
			if err != nil && !errors.As(err, &u) {
				t.Errorf("%s: error without a reason: %v", name, err)
			}
			for _, v := range values {
				if err == nil && (math.IsNaN(v) || math.IsInf(v, 0)) {
					t.Errorf("%s: %v of %v", name, values, h)
				}
			}
		}
		h.correlate(check, association.Inference{EffectiveN: r.IntN(2) == 0, Removed: r.IntN(3), Prewhitened: r.IntN(4) == 0})
		h.regress(check, r)
		if !h.same(was) {
			t.Errorf("an input was changed: %v, was %v", h, was)
		}
	}
}

func (h hostilePair) same(o hostilePair) bool {
	equal := func(a, b float64) bool { return a == b || math.IsNaN(a) && math.IsNaN(b) }
	return slices.EqualFunc(h.x, o.x, equal) && slices.EqualFunc(h.y, o.y, equal) &&
		slices.EqualFunc(h.z, o.z, equal) && slices.Equal(h.ends, o.ends)
}

func (h hostilePair) correlate(check checker, inf association.Inference) {
	given := [][]float64{h.z}
	report := func(name string, r association.Result, err error) {
		check(name, err, r.Estimate, r.Statistic, r.DF, r.P, r.Lower, r.Upper, r.EffectiveN)
		if err == nil && !(math.Abs(r.Estimate) <= 1 && r.P >= 0 && r.P <= 1 && r.Lower <= r.Estimate && r.Estimate <= r.Upper) {
			check(name+" out of range", nil, math.NaN())
		}
	}
	r, err := association.Pearson(h.x, h.y, h.ends, inf)
	report("Pearson", r, err)
	r, err = association.Spearman(h.x, h.y, h.ends, inf)
	report("Spearman", r, err)
	r, err = association.Kendall(h.x, h.y, h.ends, inf)
	report("Kendall", r, err)
	for _, coefficient := range []string{"pearson", "spearman", "kendall"} {
		r, err = association.Partial(h.x, h.y, given, h.ends, coefficient, inf)
		report("Partial "+coefficient, r, err)
		r, err = association.Semipartial(h.x, h.y, given, h.ends, "first", coefficient, inf)
		report("Semipartial "+coefficient, r, err)
	}
	n, err := association.EffectiveN(h.x, h.y, h.ends)
	check("EffectiveN", err, n)
}

func (h hostilePair) regress(check checker, r *rand.Rand) {
	d := regression.Design{Y: h.y, X: [][]float64{h.x, h.z}[:1+r.IntN(2)], NoConstant: r.IntN(4) == 0, Runs: h.ends}
	f, err := regression.OLS(d, 0.95)
	report(check, "OLS", f, err)
	if err == nil {
		e, err := f.WithEffectiveN(d, 0.95)
		report(check, "WithEffectiveN", e, err)
		e, err = f.WithCosineHAC(d, 0.95)
		report(check, "WithCosineHAC", e, err)
		e, err = f.WithNeweyWest(d, 2, 0.95)
		report(check, "WithNeweyWest", e, err)
		h.judge(check, d, f)
	}
	g, err := regression.GLS(d, r.IntN(4), r.IntN(2) == 0, 0.95)
	if err != nil {
		check("GLS", err)
		return
	}
	report(check, "GLS", &g.Fit, nil)
	check("GLS", nil, g.AR...)
	check("GLS", nil, g.Normalized...)
	for _, i := range g.Intervals {
		check("GLS", nil, i[:]...)
	}
}

func report(check checker, name string, f *regression.Fit, err error) {
	if err != nil {
		check(name, err)
		return
	}
	for _, v := range [][]float64{f.Coefficients, f.SE, f.T, f.P, f.Lower, f.Upper, f.DF, f.Fitted, f.Residuals} {
		check(name, nil, v...)
	}
	for _, v := range f.Covariance {
		check(name, nil, v...)
	}
	check(name, nil, f.Sigma, f.RSS, f.R2, f.AdjustedR2, f.F, f.FP, f.LogLik, f.AIC, f.BIC)
}

func (h hostilePair) judge(check checker, d regression.Design, f *regression.Fit) {
	w, err := residual.DurbinWatsonP(d, f)
	check("DurbinWatsonP", err, w.Statistic, w.Positive, w.TwoSided, w.PositiveByNormal)
	lm, err := residual.BreuschGodfrey(d, f, 2)
	check("BreuschGodfrey", err, lm.Statistic, lm.P, lm.F, lm.FP)
	lm, err = residual.BreuschPagan(d, f, true)
	check("BreuschPagan", err, lm.Statistic, lm.P, lm.F, lm.FP)
	lm, err = residual.White(d, f)
	check("White", err, lm.Statistic, lm.P, lm.F, lm.FP)
	rs, err := residual.RESET(d, f)
	check("RESET", err, rs.F, rs.P, rs.PartialF2)
	rs, err = residual.RESETOfPredictors(d, f)
	check("RESETOfPredictors", err, rs.F, rs.P)
	in, err := residual.InfluenceOf(f)
	check("InfluenceOf", err, in.Leverage...)
	check("InfluenceOf", err, in.Cooks...)
	for _, row := range in.DFBETAS {
		check("InfluenceOf", err, row...)
	}
	check("VIF", nil, residual.VIF(d, f)...)
	sw, p, err := residual.ShapiroWilk(h.x)
	check("ShapiroWilk", err, sw, p)
}
