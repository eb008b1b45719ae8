package trend

import "math"

// keys are whole numbers in the order of x, equal where x is equal. Whole numbers
// because the merge below can then choose without a branch, which on unordered
// values would be mispredicted every other time.
func keys(x []float64) []uint64 {
	out := make([]uint64, len(x))
	for i, v := range x {
		b := math.Float64bits(v + 0) // -0 becomes 0
		// Negative values: all bits flipped; others: the sign bit set.
		out[i] = b ^ (uint64(int64(b)>>63) | 1<<63)
	}
	return out
}

// sortCounting sorts x by merging and returns the number of pairs i < j with
// x[i] > x[j] (Knight 1966).
func sortCounting(x, spare []uint64) int64 {
	const run = 8
	var falling int64
	for from := 0; from < len(x); from += run {
		falling += insertionCount(x[from:min(from+run, len(x))])
	}
	a, b := x, spare
	for width := run; width < len(x); width *= 2 {
		for from := 0; from < len(x); from += 2 * width {
			middle, to := min(from+width, len(x)), min(from+2*width, len(x))
			falling += mergeCount(b[from:to], a[from:middle], a[middle:to])
		}
		a, b = b, a
	}
	if len(x) > 0 && &a[0] != &x[0] {
		copy(x, a)
	}
	return falling
}

func insertionCount(x []uint64) int64 {
	var falling int64
	for i := 1; i < len(x); i++ {
		v := x[i]
		j := i
		for j > 0 && x[j-1] > v {
			x[j] = x[j-1]
			j--
		}
		x[j] = v
		falling += int64(i - j)
	}
	return falling
}

func mergeCount(out, left, right []uint64) int64 {
	var falling, i, j int
	for i < len(left) && j < len(right) {
		v, fall := left[i], 0
		if r := right[j]; r < v {
			v, fall = r, 1
		}
		out[i+j] = v
		falling += (len(left) - i) & -fall
		j += fall
		i += 1 - fall
	}
	copy(out[i+j:], left[i:])
	copy(out[i+j:], right[j:])
	return int64(falling)
}
