package trend

import (
	"fmt"
	"math"

	"lagwise/stats"
)

// SeasonalResult is a test of a trend common to the phases of a season.
type SeasonalResult struct {
	S, VarS, Z, P float64
	BySeason      []float64 // S of each phase
	Slope         float64   // median slope within the phases, per season (s steps)
	N             int
}

// SeasonalMannKendall is the test of Hirsch, Slack & Smith 1982: the S of each
// phase of the season, and their variances, added up. Null hypothesis: no
// monotone trend in any phase. at holds integer step positions, one for each
// value, strictly increasing, s the steps in a season. Missing values need no
// care; ties as in MannKendall; Z has the continuity correction.
//
// With covariance the phases may depend on each other (Hirsch & Slack 1984, after
// Dietz & Killeen 1981): added to the variance are
//
//	cov(S_g, S_h) = [K + 4 sum R_g R_h - n (n_g + 1)(n_h + 1)] / 3
//	K = sum over i < j of sign((x_jg - x_ig)(x_jh - x_ih))
//
// over the n seasons, a missing value having the middle rank. It is meant for ten
// seasons and more.
//
// The error is *stats.Undefined: NotFinite; TooShort when no phase has two
// values; Constant when each phase is constant; TooFewIndependent when the
// variance is not positive. It panics on wrong lengths and s < 2.
func SeasonalMannKendall(x []float64, at []int, s int, covariance bool) (SeasonalResult, error) {
	const what = "seasonal Mann-Kendall test"
	if len(x) != len(at) || s < 2 {
		panic(fmt.Sprintf("trend: %s of %d values at %d positions with a season of %d", what, len(x), len(at), s))
	}
	if err := finite(what, x); err != nil {
		return SeasonalResult{}, err
	}
	phases := byPhase(x, at, s)
	out := SeasonalResult{N: len(x)}
	var slopes []float64
	for _, p := range phases {
		c := countPairs(p.values)
		out.BySeason = append(out.BySeason, float64(c.s()))
		out.S += float64(c.s())
		out.VarS += c.variance()
		slopes = append(slopes, newSlopes(p.seasons, p.values).all()...)
	}
	if len(slopes) == 0 {
		return SeasonalResult{}, tooShort(what, len(x), s+1, "no phase has two values")
	}
	if out.VarS == 0 {
		return SeasonalResult{}, &stats.Undefined{What: what, Reason: stats.Constant, N: len(x)}
	}
	if covariance {
		out.VarS += covariances(phases)
		if out.VarS <= 0 {
			return SeasonalResult{}, &stats.Undefined{What: what, Reason: stats.TooFewIndependent, N: len(x), Detail: "the variance is not positive"}
		}
	}
	out.Slope = median(slopes)
	out.Z, out.P = normal(out.S, out.VarS)
	return out, nil
}

// phaseSeries is the values of one phase and the seasons they are of.
type phaseSeries struct{ seasons, values []float64 }

func byPhase(x []float64, at []int, s int) []phaseSeries {
	number := make(map[int]int)
	var out []phaseSeries
	for i, t := range at {
		p := ((t % s) + s) % s
		g, ok := number[p]
		if !ok {
			g = len(out)
			number[p] = g
			out = append(out, phaseSeries{})
		}
		out[g].seasons = append(out[g].seasons, float64((t-p)/s))
		out[g].values = append(out[g].values, x[i])
	}
	return out
}

// covariances is the sum of the covariances of all ordered pairs of phases.
func covariances(phases []phaseSeries) float64 {
	row := make(map[float64]int)
	for _, p := range phases {
		for _, season := range p.seasons {
			if _, ok := row[season]; !ok {
				row[season] = len(row)
			}
		}
	}
	n := len(row)
	values := make([][]float64, len(phases))
	ranks := make([][]float64, len(phases))
	for g, p := range phases {
		values[g], ranks[g] = make([]float64, n), make([]float64, n)
		for i := range values[g] {
			values[g][i] = math.NaN() // missing: sign 0 with everything
			ranks[g][i] = float64(len(p.values)+1) / 2
		}
		r, _ := rank(p.values, 0)
		for i, season := range p.seasons {
			values[g][row[season]] = p.values[i]
			ranks[g][row[season]] = r[i]
		}
	}
	total := 0.0
	for g := range phases {
		for h := 0; h < g; h++ {
			k := 0
			for i := 0; i < n; i++ {
				for j := i + 1; j < n; j++ {
					k += sign(values[g][j]-values[g][i]) * sign(values[h][j]-values[h][i])
				}
			}
			product := 0.0
			for i := range ranks[g] {
				product += ranks[g][i] * ranks[h][i]
			}
			ng, nh := float64(len(phases[g].values)), float64(len(phases[h].values))
			total += 2 * (float64(k) + 4*product - float64(n)*(ng+1)*(nh+1)) / 3
		}
	}
	return total
}

func sign(v float64) int {
	switch {
	case v > 0:
		return 1
	case v < 0:
		return -1
	}
	return 0
}
