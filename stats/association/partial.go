package association

import (
	"errors"
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
	"lagwise/stats/distribution"
)

// Partial is the correlation of x and y with the g given series taken out of
// both.
//
//	pearson   r of the residuals of x and y on a constant and the given series
//	spearman  ranks first (TiedRanks), then the same
//	kendall   from the inverse of the matrix of tau-b
//
// Pearson and Spearman: t = r sqrt(df/(1 - r^2)) on df = m - 2 - g; Kendall:
// z = tau/sqrt(2(2(m-g) + 5)/(9(m-g)(m-g-1))). n* comes from the residuals (for
// Kendall: of the ranks), never from the series themselves. Intervals as of the
// plain coefficients with m - g for m. A given series that is constant, as a
// clock is after differencing, takes nothing out and still counts in g.
//
// The error is *stats.Undefined: TooShort below g + 3 rows, NotFinite, Constant
// (also when the given series explain x or y completely), Singular naming the
// given series that is collinear with those before it, or TooFewIndependent.
// It panics on another coefficient.
//
// Sources: Fisher 1924; Conover 1980; Kim 2015.
func Partial(x, y []float64, given [][]float64, runs []int, coefficient string, inf Inference) (Result, error) {
	return removed(x, y, given, runs, "both", coefficient, inf)
}

// Semipartial is the correlation of x and y with the given series taken out of
// one of them, removeFrom "first" (x) or "second" (y). Its estimate is its own;
// its test is the partial correlation's, which is exact for the same
// hypothesis (with inf.OwnTest, t of the semipartial itself). n* comes from the
// residuals of both. Errors as Partial.
//
// Sources: Cohen & Cohen 1983; Kim 2015.
func Semipartial(x, y []float64, given [][]float64, runs []int, removeFrom, coefficient string, inf Inference) (Result, error) {
	if removeFrom != "first" && removeFrom != "second" {
		panic(fmt.Sprintf("association: remove from %q", removeFrom))
	}
	return removed(x, y, given, runs, removeFrom, coefficient, inf)
}

func removed(x, y []float64, given [][]float64, runs []int, from, coefficient string, inf Inference) (Result, error) {
	what := map[string]string{"both": "partial correlation"}[from]
	if what == "" {
		what = "semipartial correlation"
	}
	columns := append([][]float64{x, y}, given...)
	checkShape(runs, columns...)
	if err := enough(what, len(x), len(given)+3); err != nil {
		return Result{}, err
	}
	switch coefficient {
	case "pearson":
	case "spearman", "kendall":
		ranked, err := allRanks(what, columns)
		if err != nil {
			return Result{}, err
		}
		columns = ranked
	default:
		panic(fmt.Sprintf("association: coefficient %q", coefficient))
	}
	rest, err := newResiduals(what, columns)
	if err != nil {
		return Result{}, err
	}
	if coefficient == "kendall" {
		return rest.kendall(what, columns, runs, from, inf)
	}
	r, err := rest.linear(what, runs, from, inf)
	if err == nil && coefficient == "spearman" {
		r.Lower, r.Upper = bonettWright(newCorrelation(rest.pair(from)), r.DF-1, inf.level())
	}
	return r, err
}

// residuals are x and y as unit vectors, before and after the given series are
// taken out.
type residuals struct {
	x, y   []float64
	ex, ey []float64
	g      int
}

func newResiduals(what string, columns [][]float64) (residuals, error) {
	u, err := units(what, columns[:2]...)
	if err != nil {
		return residuals{}, err
	}
	r := residuals{x: u[0], y: u[1], g: len(columns) - 2}
	var basis [][]float64
	for i, c := range columns[2:] {
		z, err := unit(what, c)
		if isConstant(err) {
			continue
		}
		if err != nil {
			return residuals{}, err
		}
		q, left := without(z, basis)
		if left < 1e-9 {
			return residuals{}, &stats.Undefined{What: what, Reason: stats.Singular, N: len(c),
				Detail: fmt.Sprintf("given series %d is a combination of those before it", i+1)}
		}
		basis = append(basis, q)
	}
	var left float64
	for i, e := range []*[]float64{&r.ex, &r.ey} {
		if *e, left = without(u[i], basis); left < 1e-12 {
			return residuals{}, &stats.Undefined{What: what, Reason: stats.Constant, N: len(u[i]),
				Detail: fmt.Sprintf("the given series explain the %s series completely", []string{"first", "second"}[i])}
		}
	}
	return r, nil
}

// allRanks ranks every column.
func allRanks(what string, columns [][]float64) ([][]float64, error) {
	ranks := make([][]float64, len(columns))
	for i, c := range columns {
		if _, err := unit(what, c); err != nil && (i < 2 || !isConstant(err)) {
			return nil, err
		}
		ranks[i] = TiedRanks(c)
	}
	return ranks, nil
}

// isConstant reports whether err says that a column does not vary.
func isConstant(err error) bool {
	var u *stats.Undefined
	return errors.As(err, &u) && u.Reason == stats.Constant
}

// without takes an orthonormal basis out of v, twice because once leaves
// rounding behind, and returns the rest at length one and its length before.
func without(v []float64, basis [][]float64) ([]float64, float64) {
	e := append([]float64(nil), v...)
	for range 2 {
		for _, q := range basis {
			floats.AddScaled(e, -floats.Dot(q, e), q)
		}
	}
	length := floats.Norm(e, 2)
	if length > 0 {
		floats.Scale(1/length, e)
	}
	return e, length
}

// pair is what is correlated.
func (r residuals) pair(from string) (u, v []float64) {
	switch from {
	case "first":
		return r.ex, r.y
	case "second":
		return r.x, r.ey
	}
	return r.ex, r.ey
}

func (r residuals) linear(what string, runs []int, from string, inf Inference) (Result, error) {
	tested := newCorrelation(r.ex, r.ey)
	own := newCorrelation(r.pair(from))
	out, err := productMoment(what, tested, r.ex, r.ey, runs, r.g, inf)
	if err != nil {
		return Result{}, err
	}
	if from == "both" {
		return out, nil
	}
	out.Estimate = own.r
	if inf.OwnTest {
		out.Statistic = own.t(out.DF)
		out.P = distribution.TTwoSided(out.Statistic, out.DF)
	}
	out.Lower, out.Upper = own.fisher(1/root(out.DF-1), inf.level())
	return out, nil
}

func (r residuals) kendall(what string, columns [][]float64, runs []int, from string, inf Inference) (Result, error) {
	nStar, m, err := inf.counted(what, r.ex, r.ey, runs)
	if err != nil {
		return Result{}, err
	}
	if _, err := degrees(what, len(r.x), m, r.g); err != nil {
		return Result{}, err
	}
	matrix := taus(columns)
	tested, own, err := partialFrom(what, matrix, from, len(r.x))
	if err != nil {
		return Result{}, err
	}
	left := m - float64(r.g)
	out := Result{Estimate: own, N: len(r.x), EffectiveN: nStar}
	if inf.OwnTest {
		tested = own
	}
	out.normal(tested / math.Sqrt(tauVariance(left)))
	out.Lower, out.Upper = fieller(own, left, inf.level())
	return out, nil
}
