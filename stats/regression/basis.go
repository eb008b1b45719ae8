package regression

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats"
	"lagwise/stats/series"
)

// basis is an orthonormal basis of the columns of a design, the constant
// first. Coefficients g on the basis are coefficients map*g on the columns, in
// the scaled units; unit holds the binary exponents that lead back.
type basis struct {
	n        int
	constant bool
	q        [][]float64 // orthonormal columns
	back     [][]float64 // map: K x K, upper triangular
	logScale float64     // log |det| of the columns in the basis, original units
	unit     []int       // exponent of each column; 0 for the constant
	y        []float64   // response, scaled (and centred with a constant)
	yUnit    int
	onto     []float64 // coefficients of the least-squares fit on the basis
	rest     []float64 // residuals, scaled
	total    float64   // sum of squares of y
}

// finest is the smallest part of a column, next to its own length, that must be
// left by the columns before it. Rounding of the column itself leaves about
// 1e-16 times its offset.
const finest = 1e-13

func newBasis(what string, d Design) (*basis, error) {
	b := &basis{n: len(d.Y), constant: !d.NoConstant}
	var upper [][]float64 // column j: its coefficients on the basis
	if b.constant {
		q := make([]float64, b.n)
		floats.AddConst(1/math.Sqrt(float64(b.n)), q)
		b.q, b.unit = append(b.q, q), append(b.unit, 0)
		upper = append(upper, []float64{math.Sqrt(float64(b.n))})
		b.logScale = math.Log(float64(b.n)) / 2
	}
	for j, x := range d.X {
		column, err := b.add(what, j, x)
		if err != nil {
			return nil, err
		}
		upper = append(upper, column)
	}
	b.back = invert(upper)
	return b, b.respond(what, d.Y)
}

// add extends the basis by column j of the design.
func (b *basis) add(what string, j int, x []float64) ([]float64, error) {
	v, unit, err := series.Scaled(fmt.Sprintf("%s: predictor %d", what, j+1), x)
	if err != nil {
		return nil, err
	}
	column := make([]float64, len(b.q)+1)
	offset := 1.0
	if b.constant {
		column[0] = series.Centre(v) * math.Sqrt(float64(b.n))
	}
	length := floats.Norm(v, 2)
	if length > 0 {
		offset = max(1, math.Sqrt(float64(b.n))/length) // the scaled values reach 1
	}
	first := 0
	if b.constant {
		first = 1
	}
	b.project(v, column, first)
	left := floats.Norm(v, 2)
	if !(left > finest*length*offset) || left < 0x1p-49*math.Sqrt(float64(b.n)) {
		return nil, &stats.Undefined{What: fmt.Sprintf("%s: predictor %d", what, j+1), Reason: stats.Singular,
			N: b.n, Detail: b.collinear(length, j)}
	}
	floats.Scale(1/left, v)
	column[len(b.q)] = left
	b.q, b.unit = append(b.q, v), append(b.unit, unit)
	b.logScale += math.Log(left) + float64(unit)*math.Ln2
	return column, nil
}

func (b *basis) collinear(length float64, j int) string {
	if b.constant && length < 0x1p-49*math.Sqrt(float64(b.n)) {
		return "its values are constant"
	}
	if length == 0 {
		return "its values are all zero"
	}
	return fmt.Sprintf("it is a combination of the constant and predictors 1 to %d", j)
}

// project takes the basis from column first on out of v, adding the
// coefficients to onto. It goes round twice: once leaves rounding behind. The
// constant is left out when v is centred already.
func (b *basis) project(v, onto []float64, first int) {
	for range 2 {
		for i := first; i < len(b.q); i++ {
			c := floats.Dot(b.q[i], v)
			floats.AddScaled(v, -c, b.q[i])
			onto[i] += c
		}
		if b.constant {
			series.Centre(v)
		}
	}
}

func (b *basis) respond(what string, y []float64) error {
	v, unit, err := series.Scaled(what+": response", y)
	if err != nil {
		return err
	}
	b.onto = make([]float64, len(b.q))
	first := 0
	spread := floats.Norm(v, 2)
	if b.constant {
		b.onto[0] = series.Centre(v) * math.Sqrt(float64(b.n))
		first, spread = 1, floats.Norm(v, 2)
	}
	if spread < 0x1p-50*math.Sqrt(float64(b.n)) {
		return &stats.Undefined{What: what + ": response", Reason: stats.Constant, N: b.n}
	}
	b.y = append([]float64(nil), v...)
	b.total = spread * spread
	b.project(v, b.onto, first)
	b.rest, b.yUnit = v, unit
	return nil
}

// invert inverts the upper triangular matrix with the given columns.
func invert(columns [][]float64) [][]float64 {
	k := len(columns)
	out := make([][]float64, k)
	for i := range out {
		out[i] = make([]float64, k)
		out[i][i] = 1 / columns[i][i]
	}
	for j := range k {
		for i := j - 1; i >= 0; i-- {
			var s float64
			for m := i + 1; m <= j; m++ {
				s += columns[m][i] * out[m][j]
			}
			out[i][j] = -s / columns[i][i]
		}
	}
	return out
}

// coefficients are those on the columns, scaled units, of g on the basis.
func (b *basis) coefficients(g []float64) []float64 {
	out := make([]float64, len(g))
	for i, row := range b.back {
		out[i] = floats.Dot(row, g)
	}
	return out
}

// unscaled turns values in the scaled units of the coefficients into original
// ones, saturated at the largest binary number.
func (b *basis) unscaled(c []float64) []float64 {
	out := make([]float64, len(c))
	for i, v := range c {
		out[i] = saturate(math.Ldexp(v, b.yUnit-b.unit[i]))
	}
	return out
}

// covariance turns that of coefficients on the basis into that of the
// coefficients on the columns, scaled units.
func (b *basis) covariance(omega [][]float64) [][]float64 {
	k := len(b.back)
	out := make([][]float64, k)
	for i := range out {
		out[i] = make([]float64, k)
		for l, v := range b.back[i] {
			for j, row := range b.back {
				out[i][j] += v * floats.Dot(omega[l], row)
			}
		}
	}
	return out
}

// spherical is variance times the unit matrix.
func (b *basis) spherical(variance float64) [][]float64 {
	out := make([][]float64, len(b.q))
	for i := range out {
		out[i] = make([]float64, len(b.q))
		out[i][i] = variance
	}
	return out
}

// errors are the residuals of coefficients on the basis that differ by shift
// from the least-squares ones, scaled.
func (b *basis) errors(shift []float64) []float64 {
	e := append([]float64(nil), b.rest...)
	for i, s := range shift {
		floats.AddScaled(e, -s, b.q[i])
	}
	return e
}

// original is v in the unit of the response.
func (b *basis) original(v []float64) []float64 {
	out := make([]float64, len(v))
	for i := range v {
		out[i] = math.Ldexp(v[i], b.yUnit)
	}
	return out
}

// Basis is an orthonormal basis of the columns of the design, the constant
// first: n values each. It is shared: never modify it.
func (f *Fit) Basis() [][]float64 { return f.basis.q }

// Errors are the residuals times a power of two that keeps their squares
// inside the binary numbers. They are shared: never modify them.
func (f *Fit) Errors() []float64 { return f.errors }

// HasConstant reports whether the first coefficient is the constant.
func (f *Fit) HasConstant() bool { return f.basis.constant }

// Directions are, for each coefficient, the residuals of its column on all the
// others, at length one: the coefficient is proportional to their product with
// the response.
func (f *Fit) Directions() [][]float64 {
	out := make([][]float64, f.K)
	for i, row := range f.basis.back {
		out[i] = make([]float64, f.N)
		for l, v := range row {
			floats.AddScaled(out[i], v/floats.Norm(row, 2), f.basis.q[l])
		}
	}
	return out
}
