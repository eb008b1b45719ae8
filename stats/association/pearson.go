package association

import (
	"lagwise/stats"
	"lagwise/stats/distribution"
)

// Pearson is the product-moment correlation
//
//	r = sum (x - mean x)(y - mean y) / sqrt(sum (x - mean x)^2 sum (y - mean y)^2)
//
// tested by t = r sqrt(df/(1 - r^2)) on df = m - 2 degrees of freedom, with m
// the values that count (package comment), and Fisher's interval
// tanh(atanh r +- z/sqrt(m - 3)), which is -1..1 for m <= 3 and approximate
// under effective n. A perfect correlation is resolved to binary rounding:
// 1 - r^2 is taken as at least 2^-52. Offsets and units cost no digits.
//
// The error is *stats.Undefined: TooShort below 3 rows, NotFinite, Constant, or
// TooFewIndependent when n* <= 3 or no degree of freedom is left.
//
// Sources: Pearson 1896; Fisher 1921; Pyper & Peterman 1998.
func Pearson(x, y []float64, runs []int, inf Inference) (Result, error) {
	const what = "Pearson correlation"
	checkShape(runs, x, y)
	if err := enough(what, len(x), 3); err != nil {
		return Result{}, err
	}
	u, err := units(what, x, y)
	if err != nil {
		return Result{}, err
	}
	return productMoment(what, newCorrelation(u[0], u[1]), u[0], u[1], runs, 0, inf)
}

// productMoment tests a correlation of two series, or of the residuals that g
// controls have left, by t and Fisher's interval.
func productMoment(what string, c correlation, u, v []float64, runs []int, g int, inf Inference) (Result, error) {
	nStar, m, err := inf.counted(what, u, v, runs)
	if err != nil {
		return Result{}, err
	}
	df, err := degrees(what, len(u), m, g)
	if err != nil {
		return Result{}, err
	}
	r := Result{Estimate: c.r, Statistic: c.t(df), StatisticName: "t", DF: df, N: len(u), EffectiveN: nStar}
	r.P = distribution.TTwoSided(r.Statistic, df)
	r.Lower, r.Upper = c.fisher(1/root(m-3-float64(g)), inf.level())
	return r, nil
}

func enough(what string, n, need int) error {
	if n < need {
		return &stats.Undefined{What: what, Reason: stats.TooShort, N: n, Need: need}
	}
	return nil
}
