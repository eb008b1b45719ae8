package association

import "math"

// digit is the number of bits that one pass of the radix sort looks at.
const digit = 11

// sorted is the order of x as indices, equal values in their own order. It is
// a radix sort of the binary numbers, least significant digit first.
func sorted(x []float64) []int32 {
	n := len(x)
	keys, other := make([]uint64, n), make([]uint64, n)
	order, swap := make([]int32, n), make([]int32, n)
	for i, v := range x {
		keys[i], order[i] = ascending(v), int32(i)
	}
	for shift := 0; shift < 64; shift += digit {
		var count [1 << digit]int32
		for _, k := range keys {
			count[k>>shift&(1<<digit-1)]++
		}
		if n > 0 && int(count[keys[0]>>shift&(1<<digit-1)]) == n {
			continue
		}
		var at int32
		for d, c := range count {
			count[d] = at
			at += c
		}
		for i, k := range keys {
			d := k >> shift & (1<<digit - 1)
			other[count[d]], swap[count[d]] = k, order[i]
			count[d]++
		}
		keys, other, order, swap = other, keys, swap, order
	}
	return order
}

// ascending maps a number to bits that sort as the number does.
func ascending(v float64) uint64 {
	b := math.Float64bits(v)
	if b>>63 != 0 {
		return ^b
	}
	return b | 1<<63
}
