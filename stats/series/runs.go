// Package series describes one series: its moments, its autocorrelation, its
// season, and the autoregression that whitens it.
//
// A series with gaps is given as Runs, its stretches without a gap: no lag, no
// difference and no product of two values crosses a gap. Where the season
// matters, each value has its step position (an integer) instead.
package series

import (
	"fmt"

	"lagwise/stats"
)

// Runs is a series as its maximal stretches without a gap, in order.
type Runs [][]float64

// N is the number of values.
func (r Runs) N() int {
	n := 0
	for _, run := range r {
		n += len(run)
	}
	return n
}

// Longest is the length of the longest run.
func (r Runs) Longest() int {
	longest := 0
	for _, run := range r {
		longest = max(longest, len(run))
	}
	return longest
}

// Concat is a new slice of all values, run after run.
func (r Runs) Concat() []float64 {
	all := make([]float64, 0, r.N())
	for _, run := range r {
		all = append(all, run...)
	}
	return all
}

// Pairs is the number of pairs of values that are lag steps apart inside a run.
func (r Runs) Pairs(lag int) int {
	n := 0
	for _, run := range r {
		n += max(0, len(run)-lag)
	}
	return n
}

// like cuts values, one for each value of r in order, into the runs of r. The
// runs share the memory of values.
func (r Runs) like(values []float64) Runs {
	out := make(Runs, 0, len(r))
	at := 0
	for _, run := range r {
		out = append(out, values[at:at+len(run):at+len(run)])
		at += len(run)
	}
	return out
}

// Differences are x[t] - x[t-lag] inside each run: lag 1 gives first
// differences, lag s seasonal ones. A run that is not longer than lag
// vanishes. It panics when lag < 1.
func Differences(r Runs, lag int) Runs {
	if lag < 1 {
		panic(fmt.Sprintf("series: differences at lag %d", lag))
	}
	out := make(Runs, 0, len(r))
	for _, run := range r {
		if len(run) <= lag {
			continue
		}
		d := make([]float64, len(run)-lag)
		for t := range d {
			d[t] = run[t+lag] - run[t]
		}
		out = append(out, d)
	}
	return out
}

func tooShort(what string, n, need int, detail string) error {
	return &stats.Undefined{What: what, Reason: stats.TooShort, N: n, Need: need, Detail: detail}
}

func constant(what string, n int) error {
	return &stats.Undefined{What: what, Reason: stats.Constant, N: n}
}
