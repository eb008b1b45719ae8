package result

import (
	"math"
	"strconv"

	"lagwise/lint/evidence"
)

// P writes a p-value as the field rounds it: p = 0.03, p = 0.004, p < 0.001;
// a bound with its sign.
func P(p float64, bound Bound) string {
	switch {
	case bound == evidence.AtMost:
		return "p <= " + decimals(p)
	case bound == evidence.AtLeast:
		return "p >= " + decimals(p)
	case p < 0.001:
		return "p < 0.001"
	}
	return "p = " + decimals(p)
}

func decimals(p float64) string {
	if p < 0.0095 {
		return strconv.FormatFloat(p, 'f', 3, 64)
	}
	return strconv.FormatFloat(p, 'f', 2, 64)
}

// Coef writes a correlation coefficient with two decimals, never -0.00.
func Coef(r float64) string {
	s := strconv.FormatFloat(r, 'f', 2, 64)
	if s == "-0.00" {
		return "0.00"
	}
	return s
}

// Number writes any other number with three significant digits, and whole
// numbers up to six digits as they are.
func Number(v float64) string {
	if v == math.Trunc(v) && math.Abs(v) < 1e6 {
		return strconv.FormatFloat(v, 'f', 0, 64)
	}
	digits := 3
	if a := math.Abs(v); a >= 1000 && a < 1e6 {
		return strconv.FormatFloat(v, 'f', 0, 64)
	}
	return strconv.FormatFloat(v, 'g', digits, 64)
}

// Count writes an effective n: whole from ten on, else one decimal.
func Count(n float64) string {
	if n >= 10 {
		return strconv.FormatFloat(n, 'f', 0, 64)
	}
	return strconv.FormatFloat(n, 'f', 1, 64)
}
