package result

import (
	"context"

	"lagwise/lint/dataset"
	"lagwise/lint/evidence"
	"lagwise/lint/request"
	"lagwise/stats/series"
	"lagwise/stats/trend"
)

// Screen says what is known of every series of a manifest, in its order.
func Screen(ctx context.Context, store *evidence.Store, m *request.Manifest, roots *dataset.Roots, set evidence.Settings) ([]Screened, error) {
	alone, err := store.Alone(ctx, m, roots, set)
	if err != nil {
		return nil, err
	}
	var all []Screened
	for _, one := range alone {
		s := screened(one)
		s.Manifest = m.File
		all = append(all, s)
		if err := ctx.Err(); err != nil {
			return nil, err
		}
	}
	return all, nil
}

func screened(one evidence.Alone) Screened {
	s := Screened{Name: one.Series.Name, Record: one.Record.Name, Column: one.Column, Unit: one.Unit, Title: one.Series.Title}
	if one.Err != nil {
		s.Error = Words(one.Err)
		s.Verdict = ""
		return s
	}
	f := one.Frame
	s.N, s.Missing = len(f.Positions), one.Missing
	s.First, s.Last, s.Step, s.Even, s.Gaps = f.From, f.Until, one.Step, f.Even, len(f.Runs)-1
	values := f.Columns[0]
	if m, err := series.Describe(values); err == nil {
		s.Mean, s.SD = &m.Mean, &m.SD
	}
	runs := f.SeriesRuns(0)
	s.Autocorrelation, _ = series.Autocorrelations(runs, min(10, max(0, s.N-2)))
	if n, err := one.EffectiveN(); err == nil {
		s.EffectiveN = &n
	}
	s.Tests = tests(one)
	s.Trend = robustTrend(values, f.Positions, one.Per)
	s.Verdict = string(one.Profile.Verdict)
	if one.Differences != nil {
		s.VerdictOnDifferences = string(one.Differences.Verdict)
	}
	s.Cautions = append(s.Cautions, one.Profile.Notes...)
	s.Season = seasonOf(one.Profile.Season)
	s.Levels = Thin(values)
	s.Differences = Thin(series.Differences(runs, 1).Concat())
	return s
}

func tests(one evidence.Alone) []Test {
	all := append([]Test(nil), one.Profile.Tests...)
	if one.Differences != nil {
		for _, t := range one.Differences.Tests {
			t.Of = "first differences"
			all = append(all, t)
		}
	}
	return all
}

func seasonOf(s evidence.Season) Season {
	var out Season
	if s.Steps == 0 {
		return out
	}
	out.Steps, out.Strength = &s.Steps, s.Strength
	if s.F != nil {
		out.F, out.P = &s.F.F, &s.F.P
	}
	switch {
	case s.Stochastic:
		out.Kind = "stochastic"
	case s.Material:
		out.Kind = "fixed"
	default:
		out.Kind = "none"
	}
	return out
}

// mostSlopes is the longest series whose pairwise slopes are taken.
const mostSlopes = 3000

func robustTrend(x, at []float64, per string) *Trend {
	if len(x) < 4 {
		return nil
	}
	t := &Trend{Per: per}
	if len(x) <= mostSlopes {
		if sen, err := trend.TheilSen(at, x, level); err == nil {
			t.SenSlope, t.Interval = &sen.Slope, &[2]float64{sen.Lower, sen.Upper}
		}
	}
	mk, err := trend.MannKendallHamedRao(x, len(x)-1, true)
	corrected := err == nil
	if err != nil {
		mk, err = trend.MannKendall(x)
	}
	if err == nil {
		t.MannKendall = MannKendall{S: &mk.S, Z: &mk.Z, P: &mk.P, Corrected: corrected}
	}
	return t
}

// mostPoints is how many points a small picture can show.
const mostPoints = 240

// Thin returns at most mostPoints of the values, the first and the last
// among them.
func Thin(x []float64) []float64 {
	if len(x) <= mostPoints {
		return append([]float64(nil), x...)
	}
	out := make([]float64, mostPoints)
	for i := range out {
		out[i] = x[i*(len(x)-1)/(mostPoints-1)]
	}
	return out
}
