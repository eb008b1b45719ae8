package dataset

import (
	"bytes"
	"math"
	"strconv"
)

// exactPowers holds the powers of ten that float64 represents exactly.
var exactPowers = [...]float64{1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11,
	1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22}

const exactMantissa = 1 << 53

// scanNumber reads the decimal number that fills the cell at b[i] up to a
// delimiter or line end, correctly rounded, and returns where it ends. ok is
// false when the cell is anything else. b must end with a line end.
//
// A mantissa of at most 2^53 and a power of at most 10^22 are both exact, so
// that one multiplication or division rounds once (Clinger 1990); all other
// numbers go through strconv.
func scanNumber(b []byte, i int, delimiter, point byte) (v float64, end int, ok bool) {
	start := i
	negative := b[i] == '-'
	if negative || b[i] == '+' {
		i++
	}
	var mantissa uint64
	first := i
	for b[i]-'0' <= 9 {
		mantissa = mantissa*10 + uint64(b[i]-'0')
		i++
	}
	digits, places := i-first, 0
	if b[i] == point {
		i++
		first = i
		for b[i]-'0' <= 9 {
			mantissa = mantissa*10 + uint64(b[i]-'0')
			i++
		}
		places = i - first
		digits += places
	}
	if digits == 0 {
		return 0, 0, false
	}
	power := -places
	if b[i]|0x20 == 'e' {
		power, i, ok = scanExponent(b, i+1, power)
		if !ok {
			return 0, 0, false
		}
	}
	if c := b[i]; c != delimiter && c != '\n' && c != '\r' {
		return 0, 0, false
	}
	if digits > 19 || mantissa > exactMantissa || power < -22 || power > 22 {
		v, ok = parsePlain(b[start:i], point)
		return v, i, ok
	}
	v = float64(mantissa)
	if power < 0 {
		v /= exactPowers[-power]
	} else if power > 0 {
		v *= exactPowers[power]
	}
	if negative {
		v = -v
	}
	return v, i, true
}

// scanExponent reads the digits after an e and adds them to power.
func scanExponent(b []byte, i, power int) (int, int, bool) {
	negative := b[i] == '-'
	if negative || b[i] == '+' {
		i++
	}
	exponent, first := 0, i
	for b[i]-'0' <= 9 {
		if exponent < 100000 {
			exponent = exponent*10 + int(b[i]-'0')
		}
		i++
	}
	if negative {
		exponent = -exponent
	}
	return power + exponent, i, i > first
}

// parsePlain reads a decimal number of digits, one sign, one point and one
// exponent. Infinity, hexadecimal forms and overflow are not numbers here.
func parsePlain(text []byte, point byte) (float64, bool) {
	if len(text) == 0 {
		return 0, false
	}
	points := 0
	for _, c := range text {
		switch {
		case c == point:
			points++
		case c-'0' <= 9, c == '+', c == '-', c == 'e', c == 'E':
		default:
			return 0, false
		}
	}
	if points > 0 && point != '.' {
		text = bytes.Replace(text, []byte{point}, []byte{'.'}, 1)
	}
	v, err := strconv.ParseFloat(string(text), 64)
	return v, err == nil && !math.IsInf(v, 0)
}

// stripThousands removes a declared separator that stands between groups of
// three digits before the point. It returns nil when it stands elsewhere.
func stripThousands(text, separator []byte, point byte) []byte {
	whole, rest := text, []byte(nil)
	if at := bytes.IndexByte(text, point); at >= 0 {
		whole, rest = text[:at], text[at:]
	}
	groups := bytes.Split(whole, separator)
	head := bytes.TrimLeft(groups[0], "+-")
	if len(head) == 0 || len(head) > 3 && len(groups) > 1 {
		return nil
	}
	for _, g := range groups[1:] {
		if len(g) != 3 {
			return nil
		}
	}
	return append(bytes.Join(groups, nil), rest...)
}

// shortNumber prints a number as a person writes it, without the noise of the
// last bits.
func shortNumber(v float64) string {
	if v == 0 {
		return "0"
	}
	short, err := strconv.ParseFloat(strconv.FormatFloat(v, 'g', 12, 64), 64)
	if err != nil {
		short = v
	}
	if a := math.Abs(short); a >= 1e-4 && a < 1e15 {
		return strconv.FormatFloat(short, 'f', -1, 64)
	}
	return strconv.FormatFloat(short, 'g', -1, 64)
}
