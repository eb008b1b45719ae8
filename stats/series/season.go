package series

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"

	"lagwise/stats/distribution"
)

// FTest is an F test. Null hypothesis: the terms tested are all zero.
type FTest struct {
	F, P     float64
	DF1, DF2 float64
}

// phase is the place of step position at in a season of s steps: 0..s-1.
func phase(at, s int) int {
	p := at % s
	if p < 0 {
		p += s
	}
	return p
}

func checkPositions(x []float64, at []int, s int) {
	if len(x) != len(at) {
		panic(fmt.Sprintf("series: %d values at %d positions", len(x), len(at)))
	}
	if s < 2 {
		panic(fmt.Sprintf("series: a season of %d steps", s))
	}
}

// fullSeasons is the number of whole seasons between the first and last position.
func fullSeasons(at []int, s int) int {
	if len(at) == 0 {
		return 0
	}
	return (at[len(at)-1] - at[0] + 1) / s
}

// SeasonalF tests seasonal dummies against a constant: the one-way analysis of
// variance of x by phase,
//
//	F = [SS between / (g - 1)] / [SS within / (n - g)]
//
// with g the phases that occur. at holds the step position of each value,
// strictly increasing, s the steps in a season; gaps need no care. The test
// supposes independent errors: give it a series made stationary. When the
// season explains the values exactly, SS within is taken at the rounding of
// the values, so that F is large and finite.
//
// The error is *stats.Undefined: NotFinite, Constant, or TooShort when not more
// values than phases are there, or only one phase. Source: Fisher 1925.
func SeasonalF(x []float64, at []int, s int) (FTest, error) {
	const what = "F test of the season"
	checkPositions(x, at, s)
	c, _, err := Scaled(what, x)
	if err != nil {
		return FTest{}, err
	}
	if len(c) < 3 {
		return FTest{}, tooShort(what, len(c), 3, "")
	}
	if same(c) {
		return FTest{}, constant(what, len(c))
	}
	Centre(c)
	total := floats.Dot(c, c)
	season := newPhases(at, s)
	season.demean(c)
	groups := len(season.count)
	n := float64(len(c))
	f := FTest{DF1: float64(groups - 1), DF2: n - float64(groups)}
	if groups < 2 || f.DF2 < 1 {
		return FTest{}, tooShort(what, len(c), groups+1, fmt.Sprintf("%d phases of the season occur", groups))
	}
	const rounding = 0x1p-52
	within := math.Max(floats.Dot(c, c), n*rounding*rounding)
	f.F = math.Max(0, total-within) / f.DF1 / (within / f.DF2)
	f.P = distribution.FUpper(f.F, f.DF1, f.DF2)
	return f, nil
}

// phases numbers the phases of a season that occur, from 0.
type phases struct {
	of    []int // of each value
	count []float64
}

func newPhases(at []int, s int) phases {
	number := make(map[int]int)
	p := phases{of: make([]int, len(at))}
	last, group := -1, 0
	for i, t := range at {
		if f := phase(t, s); f != last {
			g, ok := number[f]
			if !ok {
				g = len(number)
				number[f] = g
				p.count = append(p.count, 0)
			}
			last, group = f, g
		}
		p.of[i] = group
		p.count[group]++
	}
	return p
}

// demean takes the mean of each phase off its values, in place.
func (p phases) demean(x []float64) {
	mean := make([]float64, len(p.count))
	for i, v := range x {
		mean[p.of[i]] += v
	}
	for g := range mean {
		mean[g] /= p.count[g]
	}
	for i := range x {
		x[i] -= mean[p.of[i]]
	}
}

// QS measures what season is left in a series:
//
//	QS = n (n + 2) sum over j = 1, 2 of max(0, r(js))^2 / (n - js)
//
// from the autocorrelations at one and two seasons, a negative one counting as
// zero, and returns it with rs = r(s). Without a season it is compared with the
// upper tail of chi-squared with 2 degrees of freedom (5.99 at 5 %). Gaps: as in
// Autocorrelations and LjungBox; a lag without pairs adds nothing.
//
// The error is *stats.Undefined: NotFinite, Constant, or TooShort below 2s + 1
// values. It panics when s < 2. Common practice in seasonal adjustment; from
// memory, after the statistic used with programs of official statistics.
func QS(r Runs, s int) (qs, rs float64, err error) {
	if s < 2 {
		panic(fmt.Sprintf("series: a season of %d steps", s))
	}
	const what = "QS statistic"
	if n := r.N(); n < 2*s+1 {
		return 0, 0, tooShort(what, n, 2*s+1, "")
	}
	c, total, err := centred(what, r)
	if err != nil {
		return 0, 0, err
	}
	n := float64(r.N())
	for _, lag := range []int{s, 2 * s} {
		sum := 0.0
		for _, run := range c {
			if len(run) > lag {
				sum += floats.Dot(run[lag:], run[:len(run)-lag])
			}
		}
		rho := sum / total
		if lag == s {
			rs = rho
		}
		if rho > 0 {
			qs += n * (n + 2) * rho * rho / float64(r.Pairs(lag))
		}
	}
	return qs, rs, nil
}
