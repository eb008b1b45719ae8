package evidence

import (
	"lagwise/stats/series"
	"lagwise/stats/unitroot"
)

// Season is what is known of the season of a series.
type Season struct {
	Steps    int // length, 0 when the series has none to look for
	Strength *float64
	F        *series.FTest
	// Material: strong enough to be taken off before anything is judged.
	Material bool
	// Stochastic: its shape changes over time (Canova and Hansen reject its
	// stability), so that fixed monthly means would not remove it.
	Stochastic bool
	Stability  *unitroot.CanovaHansenResult
}

// leastSeasons is how many full seasons it takes to speak of one.
const leastSeasons = 4

// findSeason measures the season. Strength is that of Wang, Smith and Hyndman
// (2006); the F test is taken on first differences, on which a drift does not
// look like a season.
func findSeason(c column, set Settings) Season {
	if c.season < 2 || len(c.values) < leastSeasons*c.season {
		return Season{}
	}
	s := Season{Steps: c.season}
	strength, err := series.SeasonalStrength(c.values, c.at, c.season)
	if err != nil {
		return s
	}
	s.Strength = &strength
	steady, at := steadied(c)
	if f, err := series.SeasonalF(steady, at, c.season); err == nil {
		s.F = &f
	}
	s.Material = strength >= set.Limit("seasonal-strength", 0.64) && s.F != nil && s.F.P < set.Alpha
	if s.Material {
		if got, err := unitroot.CanovaHansen(steady, at, c.season); err == nil {
			s.Stability, s.Stochastic = &got, got.Rejects
		}
	}
	return s
}

// steadied returns the first differences of a column with their positions.
func steadied(c column) (values []float64, at []int) {
	start := 0
	for _, end := range c.runs {
		for i := start + 1; i < end; i++ {
			values = append(values, c.values[i]-c.values[i-1])
			at = append(at, c.at[i])
		}
		start = end
	}
	return values, at
}

// anomalies returns the values less the mean of their place in the season.
func anomalies(c column) []float64 {
	sums, counts := make([]float64, c.season), make([]int, c.season)
	for i, v := range c.values {
		place := placeIn(c.at[i], c.season)
		sums[place] += v
		counts[place]++
	}
	out := make([]float64, len(c.values))
	for i, v := range c.values {
		place := placeIn(c.at[i], c.season)
		out[i] = v - sums[place]/float64(counts[place])
	}
	return out
}

func placeIn(step, season int) int { return ((step % season) + season) % season }
