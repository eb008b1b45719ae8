package regression

import "math"

// The functions here work on symmetric matrices packed by rows of the lower
// triangle: they are a few columns wide and made afresh thousands of times.

// cholesky replaces the leading k x k part of w by its factor; false when it
// is not positive definite.
func cholesky(w []float64, k int) bool {
	for i := range k {
		row := w[i*(i+1)/2:]
		whole := row[i]
		for j := 0; j <= i; j++ {
			other := w[j*(j+1)/2:]
			s := row[j]
			for m := range j {
				s -= row[m] * other[m]
			}
			if i > j {
				row[j] = s / other[j]
				continue
			}
			if !(s > 1e-14*whole) {
				return false
			}
			row[j] = math.Sqrt(s)
		}
	}
	return true
}

// forward solves L x = v in place, backward L' x = v.
func forward(l, v []float64) {
	for i := range v {
		row := l[i*(i+1)/2:]
		for j := range i {
			v[i] -= row[j] * v[j]
		}
		v[i] /= row[i]
	}
}

func backward(l, v []float64) {
	for i := len(v) - 1; i >= 0; i-- {
		for j := i + 1; j < len(v); j++ {
			v[i] -= l[j*(j+1)/2+i] * v[j]
		}
		v[i] /= l[i*(i+1)/2+i]
	}
}

// quadratic is v'Wv.
func quadratic(w, v []float64) float64 {
	var s float64
	at := 0
	for i, a := range v {
		var row float64
		for _, b := range v[:i] {
			row += w[at] * b
			at++
		}
		s += a * (2*row + w[at]*a)
		at++
	}
	return s
}

// trace is that of the product of the leading k x k part of w with m,
// symmetric.
func trace(w []float64, m [][]float64, k int) float64 {
	var s float64
	at := 0
	for i := range k {
		for j := range i {
			s += 2 * w[at] * m[i][j]
			at++
		}
		s += w[at] * m[i][i]
		at++
	}
	return s
}
