package residual

import (
	"gonum.org/v1/gonum/floats"

	"lagwise/stats/regression"
)

// RESETResult is a test for curvature. PartialF2 is Cohen's f2 of what the
// powers add, (R1 - R0)/(1 - R1).
type RESETResult struct {
	F, P      float64
	DF1, DF2  int
	PartialF2 float64
}

// RESET tests that the response is linear in the predictors: the F test of the
// second and third powers of the fitted values, added to the regression. Null:
// linear, with independent errors of equal variance. The powers are of centred
// and scaled values, which leaves F as it is; one that is a combination of the
// predictors is left out.
//
// The error is *stats.Undefined: TooShort, Singular when nothing is left to add
// (predictors with two values only), or Constant without residuals.
//
// Sources: Ramsey 1969; Cohen 1988 (f2).
func RESET(d regression.Design, f *regression.Fit) (RESETResult, error) {
	return reset(d, f, powers(standardised(f.Fitted)))
}

// RESETOfPredictors is the same with the powers of every predictor.
func RESETOfPredictors(d regression.Design, f *regression.Fit) (RESETResult, error) {
	var columns [][]float64
	for _, x := range d.X {
		columns = append(columns, powers(standardised(x))...)
	}
	return reset(d, f, columns)
}

func reset(d regression.Design, f *regression.Fit, columns [][]float64) (RESETResult, error) {
	const what = "RESET"
	a, err := add(what, f.Basis(), f.Errors(), columns)
	if err != nil {
		return RESETResult{}, err
	}
	t, err := a.test(what, f.N, f.K+d.Removed)
	if err != nil {
		return RESETResult{}, err
	}
	return RESETResult{F: t.F, P: t.FP, DF1: t.DF, DF2: t.DF2, PartialF2: a.share / max(1-a.share, 0x1p-52)}, nil
}

// crosses are all squares and products of the columns.
func crosses(columns [][]float64) [][]float64 {
	var out [][]float64
	for i, a := range columns {
		for _, b := range columns[i:] {
			c := make([]float64, len(a))
			floats.MulTo(c, a, b)
			out = append(out, c)
		}
	}
	return out
}
