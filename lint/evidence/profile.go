package evidence

import (
	"context"

	"lagwise/stats/series"
	"lagwise/stats/trend"
	"lagwise/stats/unitroot"
)

// Profile is what is known of one series on the rows that a request uses. It
// is shared by everybody who asks about the same values: never modify it.
type Profile struct {
	N       int // values
	Longest int // in the longest stretch without a gap
	Verdict Verdict
	Notes   []string
	Season  Season
	// R holds the autocorrelations of lags 1 and 2; nil when undefined.
	R []float64
	// Autocorrelated is whether Ljung-Box rejects at the lab's alpha.
	Autocorrelated bool
	LjungBox       *series.Portmanteau
	// Differenced is the lag-1 autocorrelation of the first differences (of
	// the anomalies where the series has a fixed season) and their number.
	Differenced *LagOne
	Tests       []Test
}

// LagOne is a lag-1 autocorrelation and the number of values behind it.
type LagOne struct {
	R float64
	N int
}

// Overdifferenced reports whether first differences of the series would be, or
// are, differenced once too often: it holds a level or a line, and the lag-1
// autocorrelation of its differences is near -0.5, the value of differenced
// white noise (design: r <= -0.5 + 1.645 sqrt(0.5/n)).
func (p *Profile) Overdifferenced() bool {
	held := p.Verdict == Stationary || p.Verdict == TrendStationary
	return held && p.Differenced != nil && p.Differenced.R <= -0.5+1.645*sqrt(0.5/float64(p.Differenced.N))
}

// column is the values of one series as a profile is asked about them.
type column struct {
	values []float64
	at     []int // whole-step positions
	runs   []int // end of each stretch without a gap
	season int   // steps, 0 none
	fitted int   // order of the autoregression that was taken off
	around bool  // the fitted line was taken off
	digest key   // of all of the above but around
}

func (c column) stretches() series.Runs {
	out := make(series.Runs, 0, len(c.runs))
	start := 0
	for _, end := range c.runs {
		out = append(out, c.values[start:end])
		start = end
	}
	return out
}

func (c column) key(what string, s Settings) key {
	return keyOf(what, c.digest, c.around, s.Alpha, s.ADFLags, s.KPSSBandwidth, s.LeastNVerdict, s.Limit("seasonal-strength", 0))
}

// profile returns the profile of a column, remembered.
func (s *Store) profile(ctx context.Context, c column, set Settings) (*Profile, error) {
	return remember(ctx, s.derived, c.key("profile", set), func(ctx context.Context) (*Profile, int64, error) {
		p := newProfile(ctx, c, set)
		return p, 2048, ctx.Err()
	})
}

func newProfile(ctx context.Context, c column, set Settings) *Profile {
	runs := c.stretches()
	p := &Profile{N: len(c.values), Longest: runs.Longest()}
	if _, err := series.Describe(c.values); IsConstant(err) {
		p.Verdict = Constant
		return p
	}
	p.R, _ = series.Autocorrelations(runs, min(2, max(0, p.N-1)))
	if lags := max(min(10, p.N/5), c.fitted+1); lags >= 1 && lags < p.N {
		if lb, err := series.LjungBox(runs, lags, c.fitted); err == nil {
			p.LjungBox = &lb
			p.Autocorrelated = lb.P < set.Alpha
		}
	}
	if p.Longest < set.LeastNVerdict {
		p.Verdict = TooShort
		return p
	}
	p.Season = findSeason(c, set)
	judged := c
	if p.Season.Material {
		judged.values = anomalies(c)
		p.Notes = append(p.Notes, OnAnomalies)
	}
	p.Differenced = differenced(judged)
	if ctx.Err() == nil {
		p.judge(judged, set)
	}
	if p.Longest < 50 {
		p.Notes = append(p.Notes, LowPower)
	}
	return p
}

func differenced(c column) *LagOne {
	d := series.Differences(c.stretches(), 1)
	r, err := series.Autocorrelations(d, 1)
	if err != nil || len(r) == 0 {
		return nil
	}
	return &LagOne{R: r[0], N: d.N()}
}

// judge takes the tests that the verdict's table asks for, and no more.
func (p *Profile) judge(c column, set Settings) {
	runs := c.stretches()
	if c.around {
		p.Notes = append(p.Notes, AroundLine)
		s := signs{}
		p.trendTests(runs, set, &s)
		p.Verdict = verdictAroundLine(s)
		return
	}
	s := signs{trendP: 1}
	p.levelTests(runs, set, &s)
	if !s.adf || s.kpss {
		p.trendTests(runs, set, &s)
		at := make([]float64, len(c.at))
		for i, step := range c.at {
			at[i] = float64(step)
		}
		if slope, err := trend.LinearCosine(c.values, at); err == nil {
			s.trendP = slope.P
			p.Tests = append(p.Tests, Test{Test: "linear trend, cosine HAC", Null: "no trend", Of: "levels",
				Statistic: &slope.T, P: &slope.P, N: p.N})
		}
	}
	var disagrees bool
	if p.Verdict, disagrees = verdict(s); disagrees {
		p.Notes = append(p.Notes, KPSSDisagrees)
	}
}

func (p *Profile) levelTests(runs series.Runs, set Settings, s *signs) {
	if adf, ok := p.adf(runs, unitroot.Constant, set); ok {
		s.adf = adf.Statistic < adfCritical(adf, set.Alpha)
		s.adfOne = adf.Statistic < adf.Critical[0]
	}
	if kpss, ok := p.kpss(runs, unitroot.Constant, set); ok {
		s.kpss = kpss.Statistic > kpssCritical(kpss, set.Alpha)
		s.kpssOne = kpss.Statistic > kpss.Critical[3]
	}
}

func (p *Profile) trendTests(runs series.Runs, set Settings, s *signs) {
	if adf, ok := p.adf(runs, unitroot.Trend, set); ok {
		s.adfTrend = adf.Statistic < adfCritical(adf, set.Alpha)
	}
	if kpss, ok := p.kpss(runs, unitroot.Trend, set); ok {
		s.kpssTrend = kpss.Statistic > kpssCritical(kpss, set.Alpha)
	}
}
