package residual

import (
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
	"lagwise/stats/regression"
)

// Influence says what each row does to a least-squares fit.
type Influence struct {
	Leverage []float64   // h: diagonal of X (X'X)^-1 X'
	Cooks    []float64   // Cook's distance
	DFBETAS  [][]float64 // by coefficient, then row
}

// InfluenceOf is, with s2 the residual variance and s(i) the standard deviation
// without row i,
//
//	Cook's distance  e^2 h/(K s2 (1 - h)^2)
//	DFBETAS          (b - b(i))/(s(i) sqrt diag (X'X)^-1)
//
// A row of leverage 1 fixes a coefficient alone and has no fit without it: its
// distance and DFBETAS are given as 0, and Leverage tells. The error is
// *stats.Undefined, TooShort, when there are not two degrees of freedom.
//
// Sources: Cook 1977; Belsley, Kuh & Welsch 1980.
func InfluenceOf(f *regression.Fit) (Influence, error) {
	df := float64(f.N - f.K)
	if df < 2 {
		return Influence{}, &stats.Undefined{What: "influence", Reason: stats.TooShort, N: f.N, Need: f.K + 2}
	}
	e := make([]float64, f.N)
	length := floats.Norm(f.Errors(), 2)
	if length > 0 {
		floats.ScaleTo(e, math.Sqrt(df)/length, f.Errors()) // in units of s
	}
	out := Influence{Leverage: make([]float64, f.N), Cooks: make([]float64, f.N)}
	for _, q := range f.Basis() {
		for i, v := range q {
			out.Leverage[i] += v * v
		}
	}
	pull := make([]float64, f.N) // e/(1 - h) in units of s(i)
	for i, h := range out.Leverage {
		if 1-h < 1e-10 {
			continue
		}
		ratio := e[i] / (1 - h)
		out.Cooks[i] = ratio * ratio * h / float64(f.K)
		without := (df - ratio*e[i]) / (df - 1)
		pull[i] = ratio / math.Sqrt(max(without, 0x1p-52))
	}
	for _, direction := range f.Directions() {
		row := make([]float64, f.N)
		floats.MulTo(row, direction, pull)
		out.DFBETAS = append(out.DFBETAS, row)
	}
	return out, nil
}

// VIF is the variance-inflation factor of each predictor, 1/(1 - R2) of its
// regression on the constant and the other predictors (Marquardt 1970): 1 when it
// is uncorrelated with them.
func VIF(d regression.Design, f *regression.Fit) []float64 {
	directions := f.Directions()
	if f.HasConstant() {
		directions = directions[1:]
	}
	out := make([]float64, len(d.X))
	for j, x := range d.X {
		z := unitless(x)
		if f.HasConstant() {
			z = standardised(z)
		}
		own := floats.Dot(directions[j], z)
		out[j] = max(1, floats.Dot(z, z)/(own*own))
	}
	return out
}
