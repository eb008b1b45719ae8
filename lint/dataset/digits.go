package dataset

import (
	"encoding/binary"
	"math"
	"math/bits"
)

// tens holds the powers of ten by which eight digits are moved.
var tens = [...]uint64{1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8}

// leadingDigits returns how many of eight characters, the first in the lowest
// byte, are digits before the first that is not. A carry or borrow of the
// additions only reaches characters behind that one.
func leadingDigits(chars uint64) int {
	other := (chars + 0x4646464646464646) | (chars - 0x3030303030303030)
	return bits.TrailingZeros64(other&0x8080808080808080) / 8
}

// valueOf returns the number that the first n of eight characters spell: pairs,
// then fours, then all eight digits are joined by multiplications (Lemire
// 2018).
func valueOf(chars uint64, n int) uint64 {
	digits := (chars - 0x3030303030303030) << (64 - 8*n)
	digits = digits*10 + digits>>8
	return ((digits&0x000000FF000000FF)*0x000F424000000064 + (digits>>16&0x000000FF000000FF)*0x0000271000000001) >> 32
}

// scanShort reads what most cells are: at most seven digits, a point and at
// most eight digits, without branching on how many. Anything else is left to
// scanNumber.
func scanShort(b []byte, i int, delimiter, point byte) (v float64, end int, ok bool) {
	if i+24 > len(b) {
		return scanNumber(b, i, delimiter, point)
	}
	start := i
	sign := int((uint32(b[i]^'-') - 1) >> 31) // 1 for a minus; signs are too random for a branch
	i += sign
	chars := binary.LittleEndian.Uint64(b[i:])
	n := leadingDigits(chars)
	mantissa, places := valueOf(chars, n), 0
	if n == 8 {
		return scanNumber(b, start, delimiter, point)
	}
	i += n
	if b[i] == point {
		chars = binary.LittleEndian.Uint64(b[i+1:])
		places = leadingDigits(chars)
		mantissa = mantissa*tens[places] + valueOf(chars, places)
		i += 1 + places
	}
	if c := b[i]; n+places == 0 || c != delimiter && c != '\n' && c != '\r' {
		return scanNumber(b, start, delimiter, point)
	}
	v = float64(mantissa) / exactPowers[places]
	return math.Float64frombits(math.Float64bits(v) | uint64(sign)<<63), i, true
}
