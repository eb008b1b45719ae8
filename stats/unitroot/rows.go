package unitroot

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// dependence is the least part of a lag that the columns before it must leave.
const dependence = 1e-8

// nestedByRows fits all orders on the common sample from one QR decomposition.
func (s *sample) nestedByRows(top int) (nested, error) {
	m := s.terms.Count()
	r := s.triangle(top, func(row []float64, t int) {
		s.fillTerms(row, t)
		row[m] = s.z[t]
		for j := 1; j <= top; j++ {
			row[m+j] = s.e[t-j]
		}
		row[m+top+1] = s.e[t]
	})
	if err := s.independent(r, m, m, m+1, m+top+1); err != nil {
		return nested{}, err
	}
	out := nested{rows: s.count(top), terms: m, lag: make([]float64, top)}
	for j := range out.lag {
		out.lag[j] = r.At(m+1+j, m+top+1)
	}
	rest := r.At(m+top+1, m+top+1)
	out.rss = rest * rest
	return out, nil
}

// finalByRows fits the chosen order on all its rows.
func (s *sample) finalByRows(lags int) (final, error) {
	m := s.terms.Count()
	r := s.triangle(lags, func(row []float64, t int) {
		s.fillTerms(row, t)
		for j := 1; j <= lags; j++ {
			row[m+j-1] = s.e[t-j]
		}
		row[m+lags] = s.z[t]
		row[m+lags+1] = s.e[t]
	})
	if err := s.independent(r, m, m+lags, m, m+lags); err != nil {
		return final{}, err
	}
	level, rest := m+lags, r.At(m+lags+1, m+lags+1)
	along := r.At(level, level+1)
	if r.At(level, level) < 0 {
		along = -along
	}
	return final{rows: s.count(lags), level: along, rss: rest * rest}, nil
}

// fillTerms writes 1, time and time squared, time from -1 to 1 over the series.
func (s *sample) fillTerms(row []float64, t int) {
	half := float64(len(s.z)-1) / 2
	u := (float64(t) - half) / half
	v := 1.0
	for i := 0; i < s.terms.Count(); i++ {
		row[i] = v
		v *= u
	}
}

// triangle is the R of the QR decomposition of the rows that fill writes, each
// with the terms, the level, the lags and the response. The rows are taken in
// blocks, each decomposed together with the R so far, so that the memory does
// not grow with the series.
func (s *sample) triangle(lags int, fill func(row []float64, t int)) *mat.Dense {
	width := s.terms.Count() + lags + 2
	block := max(1024, 8*width)
	m := mat.NewDense(width+block, width, nil)
	used := width // the rows above hold R; zeros at first
	var qr mat.QR
	var r mat.Dense
	reduce := func() {
		qr.Factorize(m.Slice(0, used, 0, width))
		r.Reset()
		qr.RTo(&r)
		m.Slice(0, width, 0, width).(*mat.Dense).Copy(r.Slice(0, width, 0, width))
		used = width
	}
	s.rows(lags, func(t int) {
		fill(m.RawRowView(used), t)
		used++
		if used == width+block {
			reduce()
		}
	})
	if used > width {
		reduce()
	}
	return mat.DenseCopyOf(m.Slice(0, width, 0, width))
}

// independent checks the level and the lags in columns first..end-1 of r, whose
// first m columns are terms: a column of which nothing is left is an exact
// combination of those before it.
func (s *sample) independent(r *mat.Dense, m, level, first, end int) error {
	if left(r, m, level) <= rounding {
		return constant(adfName, len(s.z), "no movement of the level around the terms")
	}
	for j := first; j < end; j++ {
		if math.Abs(r.At(j, j)) <= dependence*left(r, m, j) {
			return dependent(j - first + 1)
		}
	}
	if math.Abs(r.At(level, level)) <= dependence*left(r, m, level) {
		return dependent(max(1, end-first))
	}
	return nil
}

// left is the length of column j once the first m columns are projected out.
func left(r *mat.Dense, m, j int) float64 {
	length := 0.0
	for i := m; i <= j; i++ {
		length = math.Hypot(length, r.At(i, j))
	}
	return length
}
