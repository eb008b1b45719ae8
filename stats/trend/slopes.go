package trend

import (
	"math"
	"slices"
	"sort"
)

// slopes selects from the sorted slopes of all pairs of points.
type slopes struct {
	t, x  []float64 // by time
	total int64     // pairs at different times
}

// few is the number of slopes that are simply written down.
const few = 20_000

func newSlopes(t, x []float64) *slopes {
	order := make([]int, len(t))
	for i := range order {
		order[i] = i
	}
	sort.SliceStable(order, func(a, b int) bool {
		i, j := order[a], order[b]
		// One time: falling values, so that such a pair never counts as rising.
		return t[i] < t[j] || t[i] == t[j] && x[i] > x[j]
	})
	s := &slopes{}
	for _, i := range order {
		s.t = append(s.t, t[i])
		s.x = append(s.x, x[i])
	}
	n := int64(len(t))
	s.total = n * (n - 1) / 2
	for i := 0; i < len(s.t); {
		j := i + 1
		for j < len(s.t) && s.t[j] == s.t[i] {
			j++
		}
		k := int64(j - i)
		s.total -= k * (k - 1) / 2
		i = j
	}
	return s
}

// at are the slopes of the given ranks (from 1, rising).
func (s *slopes) at(ranks ...int64) []float64 {
	out := make([]float64, len(ranks))
	var p part
	if s.total <= few {
		p.values = s.all()
		slices.Sort(p.values)
	}
	for i, r := range ranks {
		if !p.holds(r) {
			p = s.enclose(r)
		}
		out[i] = p.at(r)
	}
	return out
}

// part is a stretch of the sorted slopes.
type part struct {
	below  int64 // slopes before it
	values []float64
	// one value tied more often than is written down
	tied  int64
	value float64
}

func (p part) holds(rank int64) bool {
	return rank > p.below && rank <= p.below+p.tied+int64(len(p.values))
}

func (p part) at(rank int64) float64 {
	if p.tied > 0 {
		return p.value
	}
	return p.values[rank-p.below-1]
}

func (s *slopes) slope(i, j int) float64 { return (s.x[j] - s.x[i]) / (s.t[j] - s.t[i]) }

func (s *slopes) all() []float64 {
	out := make([]float64, 0, s.total)
	for i := range s.t {
		for j := i + 1; j < len(s.t); j++ {
			if s.t[j] > s.t[i] {
				out = append(out, s.slope(i, j))
			}
		}
	}
	return out
}

// enclose finds the part that holds a rank by halving an interval of slopes:
// the pairs with a slope up to b are those that do not rise once b t is taken
// off, counted by sorting. When few pairs are left they are written down. Halving
// goes by the bits of the numbers, so that it ends whatever their sizes.
func (s *slopes) enclose(rank int64) part {
	negative, upToZero := s.negative(), s.upTo(0)
	if rank > negative && rank <= upToZero {
		return part{below: negative, tied: upToZero - negative}
	}
	low, high := s.bounds()
	below, above := int64(0), s.total // slopes up to low, up to high
	if rank <= negative {
		high, above = 0, negative
	} else {
		low, below = 0, upToZero
	}
	for above-below > int64(4*len(s.t)) {
		middle := halfway(low, high)
		if middle == low || middle == high {
			return part{below: below, tied: above - below, value: high}
		}
		if c := s.upTo(middle); c < rank {
			low, below = middle, c
		} else {
			high, above = middle, c
		}
	}
	p := part{below: below, values: s.between(low, high)}
	slices.Sort(p.values)
	if !p.holds(rank) { // a slope rounded across the end of the interval
		return part{below: below, tied: above - below, value: high}
	}
	return p
}

// halfway is the number in the middle, by bits, of two that differ in no sign.
func halfway(low, high float64) float64 {
	if high <= 0 {
		return -halfway(-high, -low)
	}
	return math.Float64frombits((math.Float64bits(low+0) + math.Float64bits(high)) / 2)
}

// bounds is an interval with every slope inside, its lower end below all.
func (s *slopes) bounds() (low, high float64) {
	low, high = math.Inf(1), math.Inf(-1)
	// The extreme slopes lie between neighbours in time.
	for i, j := 0, 0; i < len(s.t); i = j {
		for j = i + 1; j < len(s.t) && s.t[j] == s.t[i]; j++ {
		}
		if j == len(s.t) {
			break
		}
		k := j + 1
		for k < len(s.t) && s.t[k] == s.t[j] {
			k++
		}
		// At one time the values fall: i is the highest, j-1 the lowest.
		low = math.Min(low, s.slope(i, k-1))
		high = math.Max(high, s.slope(j-1, j))
	}
	wide := (high - low) + math.Abs(low) + math.Abs(high)
	return low - 1e-9*wide, high + 1e-9*wide
}

// upTo is the number of slopes at or under b: the pairs, in time, that do not
// rise once b t is taken off, less those at one time.
func (s *slopes) upTo(b float64) int64 {
	rest := s.less(b)
	slices.Reverse(rest) // rising pairs now fall
	return s.total - sortCounting(keys(rest), make([]uint64, len(rest)))
}

// negative is the number of slopes under zero.
func (s *slopes) negative() int64 {
	down := make([]float64, len(s.x))
	for i, v := range s.x {
		down[len(down)-1-i] = -v
	}
	// At one time the values fell; turned over they must again.
	for i := 0; i < len(s.t); {
		j := i + 1
		for j < len(s.t) && s.t[j] == s.t[i] {
			j++
		}
		slices.Reverse(down[len(down)-j : len(down)-i])
		i = j
	}
	return sortCounting(keys(down), make([]uint64, len(down)))
}

func (s *slopes) less(b float64) []float64 {
	out := make([]float64, len(s.x))
	for i := range out {
		out[i] = s.x[i] - b*s.t[i]
	}
	return out
}

// between are the slopes above low and up to high: the pairs that rise once low
// is taken off and no longer once high is.
func (s *slopes) between(low, high float64) []float64 {
	under, over := s.less(low), s.less(high)
	order := make([]int, len(under)) // by rising x - low t
	for i := range order {
		order[i] = i
	}
	sort.SliceStable(order, func(a, b int) bool { return under[order[a]] < under[order[b]] })
	var out []float64
	collect(order, make([]int, len(order)), over, func(i, j int) {
		if s.t[j] > s.t[i] && under[j] > under[i] {
			out = append(out, s.slope(i, j))
		}
	})
	return out
}

// collect merge-sorts order by falling key and calls use for every pair i before
// j in order, i < j in time, whose keys do not rise.
func collect(order, spare []int, key []float64, use func(i, j int)) {
	if len(order) < 2 {
		return
	}
	half := len(order) / 2
	left, right := order[:half], order[half:]
	collect(left, spare[:half], key, use)
	collect(right, spare[half:], key, use)
	// Both halves now rise by key.
	k := 0
	i, j := 0, 0
	for i < len(left) || j < len(right) {
		if i == len(left) || j < len(right) && key[right[j]] <= key[left[i]] {
			for _, l := range left[i:] {
				if l < right[j] {
					use(l, right[j])
				}
			}
			spare[k] = right[j]
			j++
		} else {
			spare[k] = left[i]
			i++
		}
		k++
	}
	copy(order, spare)
}
