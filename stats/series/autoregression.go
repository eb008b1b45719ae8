package series

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/mat"

	"lagwise/stats"
)

// ARFit is an autoregression of a series on its own past.
type ARFit struct {
	Order        int
	Coefficients []float64 // of x[t-1] .. x[t-Order]
	Residuals    []float64
	Rows         []int // index of each residual into the values
	Terms        int   // trend and seasonal terms fitted, the constant not counted
}

// FitAR whitens a series by its own autoregression
//
//	x[t] = a + b at[t] + season + phi1 x[t-1] + .. + phip x[t-p] + e[t]
//
// by least squares. The trend is there when trend is true, the seasonal dummies
// (one for each phase that occurs, less one) when s > 0. p minimises AICc over
// 0..max(2, floor(4 (n/100)^(1/4))) on the rows that all orders have, and is then
// refitted on all rows with p predecessors inside their run. x holds the values
// of all runs, at their step positions, runs the end index of each run. Shorter
// series try fewer orders.
//
// The error is *stats.Undefined: NotFinite; Constant; TooShort when the rows do
// not outnumber the coefficients; Singular when the terms fit the values exactly.
// Source: Haugh 1976 (prewhitening both series); Hurvich & Tsai 1989 (AICc).
func FitAR(x []float64, at []int, runs []int, trend bool, s int) (ARFit, error) {
	const what = "autoregression"
	if len(x) != len(at) {
		panic(fmt.Sprintf("series: %d values at %d positions", len(x), len(at)))
	}
	if s == 1 || s < 0 {
		panic(fmt.Sprintf("series: a season of %d steps", s))
	}
	c, exponent, err := Scaled(what, x)
	if err != nil {
		return ARFit{}, err
	}
	if len(c) < 4 {
		return ARFit{}, tooShort(what, len(c), 4, "")
	}
	if same(c) {
		return ARFit{}, constant(what, len(c))
	}
	Centre(c)
	a := autoregression{x: c, at: at, before: predecessors(len(x), runs), trend: trend, s: s}
	order, err := a.order()
	if err != nil {
		return ARFit{}, err
	}
	fit, err := a.fit(order)
	if err != nil {
		return ARFit{}, err
	}
	floats.Scale(math.Ldexp(1, exponent), fit.Residuals)
	return fit, nil
}

// predecessors is, for each value, how many values stand before it in its run.
func predecessors(n int, runs []int) []int {
	if len(runs) == 0 || runs[len(runs)-1] != n {
		panic(fmt.Sprintf("series: runs %v do not end at %d", runs, n))
	}
	out := make([]int, 0, n)
	start := 0
	for _, end := range runs {
		for i := start; i < end; i++ {
			out = append(out, i-start)
		}
		start = end
	}
	return out
}

type autoregression struct {
	x      []float64
	at     []int
	before []int
	trend  bool
	s      int
}

// equation is the least-squares problem of one order, the deterministic terms
// projected out: lags and response are columns, all of equal length.
type equation struct {
	rows    []int
	columns [][]float64 // lags 1..p, then the response
	removed int         // coefficients projected out, the constant counted
}

func (a *autoregression) equation(p int) equation {
	var e equation
	for i, b := range a.before {
		if b >= p {
			e.rows = append(e.rows, i)
		}
	}
	for j := 1; j <= p+1; j++ {
		column := make([]float64, len(e.rows))
		for r, i := range e.rows {
			column[r] = a.x[i-j%(p+1)] // the response, lag 0, comes last
		}
		e.columns = append(e.columns, column)
	}
	e.removed = a.project(e)
	return e
}

// project takes constant, season and trend off every column (Frisch & Waugh
// 1933) and returns how many coefficients that are.
func (a *autoregression) project(e equation) int {
	at := make([]int, len(e.rows))
	line := make([]float64, len(e.rows))
	for r, i := range e.rows {
		at[r] = a.at[i]
		line[r] = float64(a.at[i] - a.at[0])
	}
	season := newPhases(at, max(1, a.s))
	removed := len(season.count)
	season.demean(line)
	square := floats.Dot(line, line)
	for _, column := range e.columns {
		season.demean(column)
		if a.trend && square > 0 {
			floats.AddScaled(column, -floats.Dot(line, column)/square, line)
		}
	}
	if a.trend && square > 0 {
		removed++
	}
	return removed
}

func (a *autoregression) order() (int, error) {
	n := float64(len(a.x))
	top := max(2, int(math.Floor(4*math.Pow(n/100, 0.25))))
	for ; top > 0; top-- {
		if r := a.gramTriangle(top); r != nil {
			return bestOrder(r, len(a.x)-top, 1), nil
		}
		e := a.equation(top)
		// Two rows beside the coefficients and AICc's own n - k - 1.
		if len(e.rows)-e.removed-top-2 >= 2 {
			return bestOrder(triangle(e.columns), len(e.rows), e.removed), nil
		}
	}
	return 0, nil
}

// manyRows is from where cross products pay: below, the decomposition of the
// rows themselves is as fast and keeps more digits.
const manyRows = 2000

// gramTriangle is the triangle by cross products, nil where these do not
// serve: short series, gaps, a trend or a season, lags that are nearly
// dependent.
func (a *autoregression) gramTriangle(p int) *mat.Dense {
	n := len(a.x)
	if n < manyRows || a.trend || a.s > 1 || a.before[n-1] != n-1 {
		return nil
	}
	r := factor(lagGram(a.x, p))
	if r == nil {
		return nil
	}
	out := mat.NewDense(p+1, p+1, nil)
	for i, row := range r {
		out.SetRow(i, row)
	}
	return out
}

// bestOrder is the order of least AICc: the last column of the triangle holds
// the residual sums of squares of all orders at once.
func bestOrder(r *mat.Dense, rows, removed int) int {
	_, width := r.Dims()
	top := width - 1
	n := float64(rows)
	rss := r.At(top, top) * r.At(top, top)
	best, least := top, math.Inf(1)
	for p := top; p >= 0; p-- {
		k := float64(removed + p + 1)
		aicc := n*math.Log(rss/n) + 2*k + 2*k*(k+1)/(n-k-1)
		if aicc <= least {
			best, least = p, aicc
		}
		if p > 0 {
			rss += r.At(p-1, top) * r.At(p-1, top)
		}
	}
	return best
}

func (a *autoregression) fit(p int) (ARFit, error) {
	const what = "autoregression"
	e := a.equation(p)
	n := len(e.rows)
	if n <= e.removed+p {
		return ARFit{}, tooShort(what, n, e.removed+p+1, "")
	}
	y := e.columns[p]
	beta := make([]float64, p)
	if p > 0 {
		var err error
		r := a.gramTriangle(p)
		if r == nil {
			r = triangle(e.columns)
		}
		if beta, err = backSubstitute(r, p); err != nil {
			return ARFit{}, err
		}
	}
	for j, b := range beta {
		floats.AddScaled(y, -b, e.columns[j])
	}
	if floats.Norm(y, math.Inf(1)) <= 0x1p-50 {
		return ARFit{}, &stats.Undefined{What: what, Reason: stats.Singular, N: n, Detail: "the terms and the values before fit every value exactly"}
	}
	return ARFit{Order: p, Coefficients: beta, Residuals: y, Rows: e.rows, Terms: e.removed - 1}, nil
}

// triangle is the R of the QR decomposition of the columns.
func triangle(columns [][]float64) *mat.Dense {
	rows, width := len(columns[0]), len(columns)
	m := mat.NewDense(rows, width, nil)
	for j, column := range columns {
		m.SetCol(j, column)
	}
	var qr mat.QR
	qr.Factorize(m)
	var r mat.Dense
	qr.RTo(&r)
	return &r
}

func backSubstitute(r *mat.Dense, p int) ([]float64, error) {
	beta := make([]float64, p)
	for i := p - 1; i >= 0; i-- {
		length := 0.0
		for k := 0; k <= i; k++ {
			length = math.Hypot(length, r.At(k, i))
		}
		if math.Abs(r.At(i, i)) <= 1e-10*length {
			return nil, &stats.Undefined{What: "autoregression", Reason: stats.Singular, N: p,
				Detail: fmt.Sprintf("lag %d follows exactly from the lags before it", i+1)}
		}
		v := r.At(i, p)
		for j := i + 1; j < p; j++ {
			v -= r.At(i, j) * beta[j]
		}
		beta[i] = v / r.At(i, i)
	}
	return beta, nil
}
