package present

import (
	"math"
	"strings"
)

// levels of a small picture, lowest first.
var bars = []rune("▁▂▃▄▅▆▇█")

// Spark draws a series as one line of at most width characters: the mean of
// each equal part of it, between the lowest and the highest of these.
func Spark(values []float64, width int) string {
	if len(values) == 0 || width < 1 {
		return ""
	}
	width = min(width, len(values))
	means := make([]float64, width)
	low, high := math.Inf(1), math.Inf(-1)
	for i := range means {
		part := values[i*len(values)/width : (i+1)*len(values)/width]
		for _, v := range part {
			means[i] += v / float64(len(part))
		}
		low, high = min(low, means[i]), max(high, means[i])
	}
	var b strings.Builder
	for _, m := range means {
		b.WriteRune(bars[barOf(m, low, high)])
	}
	return b.String()
}

// roundOff is the relative error of a mean: what varies by no more is flat.
const roundOff = 1e-13

func barOf(m, low, high float64) int {
	span := high - low
	if !(span > roundOff*max(math.Abs(low), math.Abs(high))) || math.IsInf(span, 0) {
		return len(bars) / 2
	}
	return min(len(bars)-1, int(float64(len(bars))*(m-low)/span))
}
