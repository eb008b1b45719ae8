package residual

import (
	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
	"lagwise/stats/distribution"
	"lagwise/stats/regression"
)

// BreuschPagan tests that the variance of the errors does not depend on the
// predictors: the regression of e^2 on a constant and the predictors.
//
//	studentised  n R2 (Koenker 1981): holds for errors that are not normal
//	otherwise    half the explained squares of e^2/mean(e^2) (Breusch & Pagan 1979)
//
// Both are chi-square with as many degrees of freedom as predictors. F is that
// of the regression, studentised only. The error is *stats.Undefined: TooShort,
// Constant when e^2 does not vary, or Singular without predictors.
func BreuschPagan(d regression.Design, f *regression.Fit, studentised bool) (LM, error) {
	const what = "Breusch-Pagan test"
	t, w, err := varianceOn(what, d, f, d.X)
	if err != nil || studentised {
		return t, err
	}
	squares := floats.Dot(w, w)
	t.Statistic = t.Statistic / float64(f.N) * squares / 2
	t.P = distribution.ChiSquareUpper(t.Statistic, float64(t.DF))
	t.F, t.FP = 0, 1
	return t, nil
}

// White is n R2 of the regression of e^2 on a constant, the predictors, their
// squares and their products (White 1980); DF counts those that are not
// combinations of others. Errors as BreuschPagan.
func White(d regression.Design, f *regression.Fit) (LM, error) {
	var z [][]float64
	for _, x := range d.X {
		z = append(z, standardised(x))
	}
	t, _, err := varianceOn("White test", d, f, append(crosses(z), z...))
	return t, err
}

// varianceOn regresses w = e^2/mean(e^2) - 1 on a constant and the columns.
func varianceOn(what string, d regression.Design, f *regression.Fit, columns [][]float64) (LM, []float64, error) {
	if len(columns) == 0 {
		return LM{}, nil, &stats.Undefined{What: what, Reason: stats.Singular, N: f.N, Detail: "there are no predictors"}
	}
	top := max(floats.Max(f.Errors()), -floats.Min(f.Errors()))
	if !(top > 0) {
		return LM{}, nil, &stats.Undefined{What: what, Reason: stats.Constant, N: f.N, Detail: "there are no residuals"}
	}
	w := make([]float64, f.N)
	for i, e := range f.Errors() {
		w[i] = e / top * (e / top)
	}
	floats.Scale(float64(f.N)/floats.Sum(w), w)
	floats.AddConst(-1, w)
	if floats.Norm(w, 2) < 1e-12 {
		return LM{}, nil, &stats.Undefined{What: what, Reason: stats.Constant, N: f.N, Detail: "the squared residuals are all the same"}
	}
	one := make([]float64, f.N)
	floats.AddConst(1, one)
	q, _ := part(one, nil)
	a, err := add(what, [][]float64{q}, w, centredAll(columns))
	if err != nil {
		return LM{}, nil, err
	}
	t, err := a.test(what, f.N, 1+d.Removed)
	return t, w, err
}

func centredAll(columns [][]float64) [][]float64 {
	out := make([][]float64, len(columns))
	for i, c := range columns {
		out[i] = standardised(c)
	}
	return out
}
