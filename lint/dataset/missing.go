package dataset

import (
	"bytes"
	"math"
	"strings"

	"lagwise/lint/request"
)

// builtinMissing are the codes that every record knows, lower case.
var builtinMissing = []string{"", "na", "nan", "null", "n.d.", "-"}

// codes are the texts and numbers that stand for a missing value.
type codes struct {
	texts   map[string]bool // lower case
	numbers []float64
}

// missingCodes returns the codes of a record: the built-in and the declared
// ones, or only those that replace them. An empty cell is always missing.
func missingCodes(rec *request.Record, point byte) codes {
	all := append(append([]string{}, builtinMissing...), rec.Missing...)
	if rec.MissingOnly != nil {
		all = append([]string{""}, rec.MissingOnly...)
	}
	c := codes{texts: map[string]bool{}}
	for _, code := range all {
		code = strings.TrimSpace(code)
		c.texts[strings.ToLower(code)] = true
		for _, p := range []byte{point, '.'} {
			if v, ok := parsePlain([]byte(code), p); ok {
				c.numbers = append(c.numbers, v)
				break
			}
		}
	}
	return c
}

func (c codes) number(v float64) bool {
	for _, code := range c.numbers {
		if v == code {
			return true
		}
	}
	return false
}

func (c codes) text(cell []byte) bool {
	if len(cell) == 0 {
		return true
	}
	return len(cell) <= 64 && c.texts[string(bytes.ToLower(cell))]
}

// suspect looks for an undeclared missing code: a repeated extreme made of
// nines (-999, -99.9, 9999) that lies apart from every other value. low and
// high are the least and greatest value. The count is 0 when there is none.
func suspect(values []float64, low, high float64) (code float64, count int) {
	for _, extreme := range []float64{low, high} {
		if !madeOfNines(extreme) {
			continue
		}
		n := 0
		for _, v := range values {
			if v == extreme {
				n++
			}
		}
		if n < 2 {
			continue
		}
		if otherLow, otherHigh, some := boundsWithout(values, extreme); some {
			apart := max(otherLow-extreme, extreme-otherHigh)
			if apart > otherHigh-otherLow || extreme < 0 && otherLow >= 0 {
				return extreme, n
			}
		}
	}
	return 0, 0
}

// bounds returns the least and greatest value that is not missing.
func bounds(values []float64) (low, high float64, any bool) {
	return boundsWithout(values, math.NaN())
}

// boundsWithout is bounds of the values that differ from one.
func boundsWithout(values []float64, one float64) (low, high float64, any bool) {
	low, high = math.Inf(1), math.Inf(-1)
	for _, v := range values { // a NaN fails both comparisons
		if v < low && v != one {
			low = v
		}
		if v > high && v != one {
			high = v
		}
	}
	return low, high, low <= high
}

// madeOfNines reports whether a number is written with nines only, at least
// two of them.
func madeOfNines(v float64) bool {
	digits := strings.Replace(strings.TrimPrefix(shortNumber(v), "-"), ".", "", 1)
	return len(digits) >= 2 && strings.Trim(digits, "9") == ""
}
