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
const few = 2_000_000

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

// at are the slopes of the given ranks (from 1).
func (s *slopes) at(ranks ...int64) []float64 {
	out := make([]float64, len(ranks))
	if s.total <= few {
		all := s.all()
		slices.Sort(all)
		for i, r := range ranks {
			out[i] = all[r-1]
		}
		return out
	}
	for i, r := range ranks {
		if i > 0 && r == ranks[i-1] {
			out[i] = out[i-1]
			continue
		}
		out[i] = s.enclose(r)
	}
	return out
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

// enclose finds the slope of a rank by halving an interval of slopes: the pairs
// with a slope up to b are those that x - b t does not bring up, counted by
// sorting. When few pairs are left in the interval they are written down.
func (s *slopes) enclose(rank int64) float64 {
	low, high := s.bounds()
	var below int64 // slopes at or under low
	above := s.total
	for above-below > int64(8*len(s.t)) {
		middle := low + (high-low)/2
		if middle <= low || middle >= high {
			return middle // one value, tied more often than can be written down
		}
		if c := s.upTo(middle); c < rank {
			low, below = middle, c
		} else {
			high, above = middle, c
		}
		if high-low <= 0x1p-50*math.Max(math.Abs(low), math.Abs(high)) {
			break
		}
	}
	inside := s.between(low, high, above-below)
	if k := rank - below; k >= 1 && k <= int64(len(inside)) {
		slices.Sort(inside)
		return inside[k-1]
	}
	return low + (high-low)/2
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
	rising := sortCounting(rest, make([]float64, len(rest)))
	return s.total - rising
}

func (s *slopes) less(b float64) []float64 {
	out := make([]float64, len(s.x))
	for i := range out {
		out[i] = s.x[i] - b*s.t[i]
	}
	return out
}

// between are the slopes above low and up to high: the pairs that rise once low
// is taken off and no longer once high is. about is their number.
func (s *slopes) between(low, high float64, about int64) []float64 {
	if about > int64(64*len(s.t)) {
		return nil // ties of one slope
	}
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
