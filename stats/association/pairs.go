package association

import "math"

// pairCount counts the pairs of rows of two ranked columns.
type pairCount struct {
	n, all       float64
	s            float64 // concordant less discordant
	tiedX, tiedY float64 // pairs tied in a column
	x, y         tieSums
}

// tieSums are sums over the groups of t tied values.
type tieSums struct{ two, three, variance float64 } // t(t-1), t(t-1)(t-2), t(t-1)(2t+5)

func (s *tieSums) add(t float64) {
	s.two += t * (t - 1)
	s.three += t * (t - 1) * (t - 2)
	s.variance += t * (t - 1) * (2*t + 5)
}

func (p pairCount) tau() float64 {
	return max(-1, min(1, p.s/(math.Sqrt(p.all-p.tiedX)*math.Sqrt(p.all-p.tiedY))))
}

// variance is that of S under no association, corrected for ties (Kendall
// 1975, chapter 4).
func (p pairCount) variance() float64 {
	n := p.n
	v := (n*(n-1)*(2*n+5) - p.x.variance - p.y.variance) / 18
	v += p.x.two * p.y.two / (2 * n * (n - 1))
	if n > 2 {
		v += p.x.three * p.y.three / (9 * n * (n - 1) * (n - 2))
	}
	return v
}

// countPairs counts in O(n log n) (Knight 1966): order the rows by x and within
// ties of x by y; the discordant pairs are the inversions of y in that order.
func countPairs(rx, ry []float64) pairCount {
	p := pairCount{n: float64(len(rx))}
	p.all = p.n * (p.n - 1) / 2
	kx, ky := keysOf(rx), keysOf(ry)
	order := arrange(kx, arrange(ky, nil))
	var both float64
	y := make([]int32, len(order))
	inX, inBoth := 0, 0
	for i, row := range order {
		y[i] = ky[row]
		sameX := i > 0 && kx[row] == kx[order[i-1]]
		sameBoth := sameX && ky[row] == ky[order[i-1]]
		if !sameX {
			p.x.add(float64(inX))
			inX = 0
		}
		if !sameBoth {
			both += float64(inBoth) * float64(inBoth-1) / 2
			inBoth = 0
		}
		inX++
		inBoth++
	}
	p.x.add(float64(inX))
	both += float64(inBoth) * float64(inBoth-1) / 2
	discordant := float64(inversions(y, make([]int32, len(y))))
	for from := 0; from < len(y); { // now in order
		to := from
		for to < len(y) && y[to] == y[from] {
			to++
		}
		p.y.add(float64(to - from))
		from = to
	}
	p.tiedX, p.tiedY = p.x.two/2, p.y.two/2
	p.s = p.all - p.tiedX - p.tiedY + both - 2*discordant
	return p
}

// keysOf are twice the ranks, which are whole.
func keysOf(ranks []float64) []int32 {
	keys := make([]int32, len(ranks))
	for i, r := range ranks {
		keys[i] = int32(2 * r)
	}
	return keys
}

// arrange orders the rows by key, rows of one key as in before (nil: as they
// are): a counting sort.
func arrange(keys []int32, before []int32) []int32 {
	at := make([]int32, 2*len(keys)+2)
	for _, k := range keys {
		at[k+1]++
	}
	for k := 1; k < len(at); k++ {
		at[k] += at[k-1]
	}
	out := make([]int32, len(keys))
	for i := range keys {
		row := int32(i)
		if before != nil {
			row = before[i]
		}
		k := keys[row]
		out[at[k]] = row
		at[k]++
	}
	return out
}

// inversions sorts y and counts the pairs that were in the wrong order.
func inversions(y, spare []int32) int64 {
	n := len(y)
	if n <= 12 {
		return insertion(y)
	}
	half := n / 2
	count := inversions(y[:half], spare[:half]) + inversions(y[half:], spare[half:])
	copy(spare, y)
	left, right := spare[:half], spare[half:n]
	for k := range y {
		if len(left) > 0 && (len(right) == 0 || left[0] <= right[0]) {
			y[k], left = left[0], left[1:]
		} else {
			y[k], right = right[0], right[1:]
			count += int64(len(left))
		}
	}
	return count
}

func insertion(y []int32) int64 {
	var count int64
	for i := 1; i < len(y); i++ {
		v := y[i]
		j := i
		for ; j > 0 && y[j-1] > v; j-- {
			y[j] = y[j-1]
		}
		y[j] = v
		count += int64(i - j)
	}
	return count
}
