package unitroot

import (
	"math"

	"gonum.org/v1/gonum/floats"
)

// gram is the Gram matrix of the test regression with all lags on the common
// sample, for one run with a constant or a trend. Only the products of the
// response with its lags are summed; every other entry follows from its
// neighbour by taking one row off one end and adding one at the other, so that
// all orders together cost one pass for each lag. It holds, in this order, the
// constant, the centred time (with a trend), the response, its lags, the level.
type gram struct {
	s    *sample
	lags int
	rows int
	time float64 // the time that counts as zero
	g    [][]float64
}

// pivotLimit is the least part of a column that the columns before may leave:
// the error of the statistic is about 5e-15 divided by it.
const pivotLimit = 1e-6

func (s *sample) newGram(lags int) *gram {
	if len(s.ends) != 1 || s.terms != Constant && s.terms != Trend {
		return nil
	}
	g := &gram{s: s, lags: lags, rows: s.count(lags), time: float64(lags+len(s.z)-2) / 2}
	size := s.terms.Count() + lags + 2
	g.g = make([][]float64, size)
	for i := range g.g {
		g.g[i] = make([]float64, size)
	}
	g.sumLags()
	g.sumTerms()
	g.sumLevel()
	for i := range g.g {
		for j := 0; j < i; j++ {
			g.g[i][j] = g.g[j][i]
		}
	}
	return g
}

func (g *gram) lag(i int) int { return g.s.terms.Count() + i } // lag 0 is the response
func (g *gram) level() int    { return len(g.g) - 1 }

// sumLags fills the products of the response and its lags.
func (g *gram) sumLags() {
	e, k := g.s.e, g.lags
	end := len(e) - 1 // the last row is end-1
	const block = 2048
	first := g.g[g.lag(0)]
	for from := k; from < end; from += block {
		to := min(from+block, end)
		for j := 0; j <= k; j++ {
			first[g.lag(j)] += floats.Dot(e[from:to], e[from-j:to-j])
		}
	}
	for i := 0; i < k; i++ {
		for j := i; j < k; j++ {
			g.g[g.lag(i+1)][g.lag(j+1)] = g.g[g.lag(i)][g.lag(j)] +
				e[k-1-i]*e[k-1-j] - e[end-1-i]*e[end-1-j]
		}
	}
}

// sumTerms fills the products of constant and time with everything.
func (g *gram) sumTerms() {
	e, z, k := g.s.e, g.s.z, g.lags
	end := len(e) - 1
	m := float64(g.rows)
	one := g.g[0]
	one[0] = m
	one[g.lag(0)] = floats.Sum(e[k:end])
	for i := 0; i < k; i++ {
		one[g.lag(i+1)] = one[g.lag(i)] + e[k-1-i] - e[end-1-i]
	}
	one[g.level()] = floats.Sum(z[k:end])
	if g.s.terms != Trend {
		return
	}
	time := g.g[1]
	time[1] = m * (m*m - 1) / 12
	for t := k; t < end; t++ {
		d := float64(t) - g.time
		time[g.lag(0)] += d * e[t]
		time[g.level()] += d * z[t]
	}
	for i := 0; i < k; i++ {
		time[g.lag(i+1)] = time[g.lag(i)] + one[g.lag(i+1)] +
			(float64(k-1)-g.time)*e[k-1-i] - (float64(end-1)-g.time)*e[end-1-i]
	}
}

// sumLevel fills the products of the level with the lags: z[t+1] = z[t] + e[t] +
// drift carries the product at one lag to the next.
func (g *gram) sumLevel() {
	e, z, k := g.s.e, g.s.z, g.lags
	end := len(e) - 1
	level := g.level()
	g.g[level][level] = floats.Dot(z[k:end], z[k:end])
	g.g[g.lag(0)][level] = floats.Dot(z[k:end], e[k:end])
	for i := 0; i < k; i++ {
		// The sums one row earlier: of z e, of e e, of e.
		before, after := e[k-1-i], e[end-1-i]
		ze := g.g[g.lag(i)][level] + z[k-1]*before - z[end-1]*after
		ee := g.g[g.lag(0)][g.lag(i)] + e[k-1]*before - e[end-1]*after
		g.g[g.lag(i+1)][level] = ze + ee + g.s.drift*g.g[0][g.lag(i+1)]
	}
}

// nested are the fits of all orders; false when the Gram matrix would cost too
// many digits.
func (g *gram) nested() (nested, bool) {
	if !g.balanced() {
		return nested{}, false
	}
	order := []int{g.level()}
	for i := 1; i <= g.lags; i++ {
		order = append(order, g.lag(i))
	}
	l, ok := g.factor(g.g, append(order, g.lag(0)))
	if !ok {
		return nested{}, false
	}
	response := l[len(l)-1]
	rss := response[g.lags+1]
	return nested{rows: g.rows, terms: g.s.terms.Count(), lag: response[1 : g.lags+1], rss: rss * rss}, true
}

// final fits the first p lags on all rows that they leave: the rows that only
// more lags cost are added to the sums.
func (g *gram) final(p int) (final, bool) {
	if !g.balanced() {
		return final{}, false
	}
	var order []int
	for i := 0; i < g.s.terms.Count(); i++ {
		order = append(order, i)
	}
	for i := 1; i <= p; i++ {
		order = append(order, g.lag(i))
	}
	order = append(order, g.level(), g.lag(0))
	whole := make([][]float64, len(g.g))
	for i := range whole {
		whole[i] = append([]float64(nil), g.g[i]...)
	}
	row := make([]float64, len(g.g))
	for t := p; t < g.lags; t++ {
		row[0] = 1
		if g.s.terms == Trend {
			row[1] = float64(t) - g.time
		}
		for i := 0; i <= p; i++ {
			row[g.lag(i)] = g.s.e[t-i]
		}
		row[g.level()] = g.s.z[t]
		for _, i := range order {
			for _, j := range order {
				whole[i][j] += row[i] * row[j]
			}
		}
	}
	l, ok := g.factor(whole, order[g.s.terms.Count():])
	if !ok {
		return final{}, false
	}
	response := l[len(l)-1]
	rss := response[p+1]
	return final{rows: g.rows + g.lags - p, level: response[p], rss: rss * rss}, true
}

// balanced says that no single difference at an end of the sample dominates:
// taking it off again would leave its rounding in the sums.
func (g *gram) balanced() bool {
	least, most := math.Inf(1), 0.0
	for i := 0; i <= g.lags; i++ {
		d := g.g[g.lag(i)][g.lag(i)]
		least, most = math.Min(least, d), math.Max(most, d)
	}
	return most <= 100*least
}

// factor is the Cholesky factor of the columns in the given order, the terms
// projected out; false when a column leaves less than pivotLimit.
func (g *gram) factor(whole [][]float64, order []int) ([][]float64, bool) {
	n := len(order)
	a := make([][]float64, n)
	for i, r := range order {
		a[i] = make([]float64, n)
		for j, c := range order[:i+1] {
			a[i][j] = whole[r][c]
		}
	}
	// The constant first; the time is orthogonal to it but for the added rows.
	one := whole[0]
	for i, r := range order {
		for j, c := range order[:i+1] {
			a[i][j] -= one[r] * one[c] / one[0]
		}
	}
	if g.s.terms == Trend {
		time := whole[1]
		square := time[1] - one[1]*one[1]/one[0]
		product := func(i int) float64 { return time[i] - one[1]*one[i]/one[0] }
		for i, r := range order {
			for j, c := range order[:i+1] {
				a[i][j] -= product(r) * product(c) / square
			}
		}
	}
	for j := range a {
		whole := a[j][j]
		rest := whole - floats.Dot(a[j][:j], a[j][:j])
		if !(rest > pivotLimit*whole) {
			return nil, false
		}
		pivot := math.Sqrt(rest)
		a[j][j] = pivot
		for i := j + 1; i < n; i++ {
			a[i][j] = (a[i][j] - floats.Dot(a[i][:j], a[j][:j])) / pivot
		}
	}
	return a, true
}
