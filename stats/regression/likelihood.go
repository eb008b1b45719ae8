package regression

import (
	"math"

	"gonum.org/v1/gonum/floats"
)

// likelihood is the profile likelihood of the parameters of AR(order) errors.
//
// After one pass over the data it needs only sums of products: row t of a run
// is whitened by the filter of min(t, order) lags, and all rows of a run with
// the same filter share one set of sums. The filters work on differences and
// one level,
//
//	a0 z[t] + a1 z[t-1] + … = A0 dz[t] + A1 dz[t-1] + … + Am z[t-m]
//
// with A the running sums of a, because Am is a product of the 1 - r of the
// partial autocorrelations and keeps its digits when one goes to 1.
//
// The columns are the orthonormal basis and the least-squares residuals. The
// variance is in units of the innovations'.
type likelihood struct {
	basis  *basis
	runs   []int
	order  int
	reml   bool
	width  int // columns: K + 1
	counts []float64
	blocks []block
}

// block is the sum over the rows with a filter of t lags of part i of the
// filter times part j, symmetric, lower triangle packed by rows.
type block struct {
	t, i, j int
	sums    []float64
}

func newLikelihood(b *basis, runs []int, order int, reml bool) *likelihood {
	l := &likelihood{basis: b, runs: runs, order: order, reml: reml, width: len(b.q) + 1,
		counts: make([]float64, order+1)}
	columns := append(append([][]float64(nil), b.q...), b.rest)
	steps := make([][]float64, len(columns))
	for c, z := range columns {
		if c == 0 && b.constant || order == 0 {
			continue // the differences of the constant are zero: nil
		}
		steps[c] = make([]float64, len(z))
		for t := 1; t < len(z); t++ {
			steps[c][t] = z[t] - z[t-1]
		}
	}
	for t := 0; t <= order; t++ {
		for i := 0; i <= t; i++ {
			for j := i; j <= t; j++ {
				l.blocks = append(l.blocks, l.newBlock(t, i, j, columns, steps))
			}
		}
		from := 0
		for _, end := range runs {
			l.counts[t] += float64(max(0, l.rows(t, from, end)))
			from = end
		}
	}
	return l
}

// rows is the number of rows of a run that have the filter of t lags.
func (l *likelihood) rows(t, from, end int) int {
	if t == l.order {
		return end - from - t
	}
	return min(1, end-from-t)
}

func (l *likelihood) newBlock(t, i, j int, columns, steps [][]float64) block {
	b := block{t, i, j, make([]float64, l.width*(l.width+1)/2)}
	part := func(i, c, from, rows int) []float64 {
		of := steps[c]
		if i == t {
			of = columns[c]
		}
		if of == nil {
			return nil
		}
		return of[from+t-i : from+t-i+rows]
	}
	from := 0
	for _, end := range l.runs {
		if rows := l.rows(t, from, end); rows > 0 {
			at := 0
			for c := range l.width {
				for e := 0; e <= c; e++ {
					s := product(part(i, c, from, rows), part(j, e, from, rows))
					if i != j {
						s += product(part(j, c, from, rows), part(i, e, from, rows))
					}
					b.sums[at] += s
					at++
				}
			}
		}
		from = end
	}
	return b
}

func product(a, b []float64) float64 {
	if a == nil || b == nil {
		return 0
	}
	return floats.Dot(a, b)
}

// effective is the n of the likelihood.
func (l *likelihood) effective() float64 {
	if l.reml {
		return float64(l.basis.n - len(l.basis.q))
	}
	return float64(l.basis.n)
}

// offset is what the units of response and columns add to minus the value of
// evaluate.
func (l *likelihood) offset() float64 {
	n := l.effective()
	c := n/2*(math.Log(2*math.Pi/n)+1) + n*float64(l.basis.yUnit)*math.Ln2
	if l.reml {
		c += l.basis.logScale
	}
	return c
}

// evaluation is the likelihood at some parameters, without the constants of
// offset.
type evaluation struct {
	value   float64
	shift   []float64 // coefficients on the basis less the least-squares ones
	squares float64   // e'R^-1 e
	factor  []float64 // Cholesky factor of X'R^-1 X, packed
	filters *filters
}

// evaluate computes value and estimates: O(order^2 K^2) after the one pass.
func (l *likelihood) evaluate(u []float64) evaluation {
	f := newFilters(u)
	e := evaluation{filters: f}
	w := make([]float64, l.width*(l.width+1)/2)
	for _, b := range l.blocks {
		floats.AddScaled(w, f.weights[b.t]*f.sums[b.t][b.i]*f.sums[b.t][b.j], b.sums)
	}
	if !e.solve(w, l.width-1) {
		e.value = math.Inf(-1)
		return e
	}
	n := l.effective()
	e.value = -n/2*math.Log(e.squares) + floats.Dot(l.counts, f.logWeights)/2
	if l.reml {
		e.value -= logDet(w, l.width-1)
	}
	e.factor = w
	return e
}

// value is the likelihood alone.
func (l *likelihood) value(u []float64) float64 { return l.evaluate(u).value }

// solve takes the packed sums of the whitened columns apart: a Cholesky
// factor in place, coefficients and residual sum of squares.
func (e *evaluation) solve(w []float64, k int) bool {
	if !cholesky(w, k) {
		return false
	}
	last := w[k*(k+1)/2:]
	whole := last[k]
	e.squares = whole
	e.shift = append([]float64(nil), last[:k]...)
	forward(w, e.shift)
	e.squares -= floats.Dot(e.shift, e.shift)
	backward(w, e.shift)
	return e.squares > 1e-13*whole
}

// inverse is (X'R^-1 X)^-1 on the basis.
func (e *evaluation) inverse() [][]float64 {
	out := make([][]float64, len(e.shift))
	for i := range out {
		column := make([]float64, len(out))
		column[i] = 1
		forward(e.factor, column)
		backward(e.factor, column)
		out[i] = column
	}
	return out
}

// logDet is half the log determinant of the matrix with the given factor.
func logDet(factor []float64, k int) float64 {
	var s float64
	for i := range k {
		s += math.Log(factor[i*(i+1)/2+i])
	}
	return s
}

// gradient is that of the value with respect to u: the derivative of each
// sum's coefficient times the derivative of the value by that sum.
func (l *likelihood) gradient(u []float64, e evaluation) []float64 {
	f := e.filters
	n := l.effective()
	direction := append(append([]float64(nil), e.shift...), -1)
	var inverse [][]float64
	if l.reml {
		inverse = e.inverse()
	}
	out := make([]float64, l.order)
	for v := range out {
		f.differentiate(u, v)
		out[v] = floats.Dot(l.counts, f.logWeightSlopes[v]) / 2
	}
	for _, b := range l.blocks {
		s := -n / 2 / e.squares * quadratic(b.sums, direction)
		if l.reml {
			s -= trace(b.sums, inverse, len(inverse)) / 2
		}
		a, w := f.sums[b.t], f.weights[b.t]
		for v := range out {
			da := f.slopes[v][b.t]
			change := da[b.i]*a[b.j] + a[b.i]*da[b.j] + f.logWeightSlopes[v][b.t]*a[b.i]*a[b.j]
			out[v] += s * w * change
		}
	}
	return out
}

// gradientAt is the gradient, nil where the likelihood has no value.
func (l *likelihood) gradientAt(u []float64) []float64 {
	e := l.evaluate(u)
	if math.IsInf(e.value, -1) {
		return nil
	}
	return l.gradient(u, e)
}

// normalized are the whitened errors over their standard deviation.
func (l *likelihood) normalized(e evaluation, errors []float64, sd float64) []float64 {
	out := make([]float64, len(errors))
	from := 0
	for _, end := range l.runs {
		for row := from; row < end; row++ {
			t := min(row-from, l.order)
			a := e.filters.sums[t]
			v := a[t] * errors[row-t]
			for i := range t {
				v += a[i] * (errors[row-i] - errors[row-i-1])
			}
			out[row] = v * math.Sqrt(e.filters.weights[t]) / sd
		}
		from = end
	}
	return out
}
