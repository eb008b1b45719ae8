package association

import "math"

// longestExact is the longest series whose n! orders are counted.
const longestExact = 9

// Spearman is the rank correlation rho: Pearson's r of average ranks, with ties
// restored as in TiedRanks. It is tested by t = rho sqrt(df/(1 - rho^2)) on
// df = m - 2 (package comment; n* from the autocorrelations of the ranks).
// Without ties, for n <= 9 and usual inference, p is exact: twice the smaller
// tail of S = sum d^2 over all n! orders, at most 1. The interval is
// tanh(atanh rho +- z sqrt((1 + rho^2/2)/(m - 3))), -1..1 for m <= 3.
//
// The error is *stats.Undefined as for Pearson.
//
// Sources: Spearman 1904; Best & Roberts 1975; Bonett & Wright 2000.
func Spearman(x, y []float64, runs []int, inf Inference) (Result, error) {
	const what = "Spearman correlation"
	checkShape(runs, x, y)
	if err := enough(what, len(x), 3); err != nil {
		return Result{}, err
	}
	if _, err := units(what, x, y); err != nil {
		return Result{}, err
	}
	rx, ry := TiedRanks(x), TiedRanks(y)
	u, err := units(what, rx, ry)
	if err != nil {
		return Result{}, err
	}
	c := newCorrelation(u[0], u[1])
	r, err := productMoment(what, c, u[0], u[1], runs, 0, inf)
	if err != nil {
		return Result{}, err
	}
	r.Lower, r.Upper = bonettWright(c, r.DF-1, inf.level())
	if inf.exact() && len(x) <= longestExact && !tied(rx) && !tied(ry) {
		exactSpearman(&r, rx, ry)
	}
	return r, nil
}

// bonettWright is the interval of a rank correlation, left = m - 3 - g.
func bonettWright(c correlation, left, level float64) (lower, upper float64) {
	return c.fisher(root(1+c.r*c.r/2)/root(left), level)
}

// exactSpearman replaces the t of r by S = sum d^2 and its exact p.
func exactSpearman(r *Result, rx, ry []float64) {
	var s float64
	for i := range rx {
		d := rx[i] - ry[i]
		s += d * d
	}
	count := spearmanCounts(len(rx))
	var below, above, all float64
	for v, k := range count {
		all += k
		if float64(v) <= s {
			below += k
		}
		if float64(v) >= s {
			above += k
		}
	}
	r.Statistic, r.StatisticName, r.DF, r.Exact = s, "S", 0, true
	r.P = min(1, 2*min(below, above)/all)
}

// spearmanCounts[s] is the number of orders of n ranks with sum d^2 = s. It
// adds the ranks one by one, keeping the set of places that are taken.
func spearmanCounts(n int) []float64 {
	top := n * (n*n - 1) / 3
	sets := make([][]float64, 1<<n)
	sets[0] = make([]float64, top+1)
	sets[0][0] = 1
	for set, count := range sets {
		if count == nil {
			continue
		}
		rank := ones(set)
		for place := range n {
			next := set | 1<<place
			if next == set {
				continue
			}
			if sets[next] == nil {
				sets[next] = make([]float64, top+1)
			}
			d := (rank - place) * (rank - place)
			for s := 0; s+d <= top; s++ {
				sets[next][s+d] += count[s]
			}
		}
	}
	return sets[len(sets)-1]
}

func ones(set int) int {
	n := 0
	for ; set != 0; set &= set - 1 {
		n++
	}
	return n
}

// tied reports whether any two ranks are the same.
func tied(ranks []float64) bool {
	seen := make([]bool, len(ranks)+1)
	for _, r := range ranks {
		if r != math.Trunc(r) || seen[int(r)] {
			return true
		}
		seen[int(r)] = true
	}
	return false
}
