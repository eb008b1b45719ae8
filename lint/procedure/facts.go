package procedure

import (
	"lagwise/lint/evidence"
	"lagwise/lint/request"
)

// Facts is all that the procedure knows: no estimate and no p-value of the
// relation that is asked about.
type Facts struct {
	Request  request.Request
	Verdicts []evidence.Verdict // of the levels, one a series
	// Autocorrelated is whether any series carries autocorrelation.
	Autocorrelated bool
	Even           bool
	Season         Season
	// Walking is whether the first differences of any series still are
	// difference-stationary.
	Walking bool
	// AlwaysDifference is the lab's word that levels are never accepted.
	AlwaysDifference bool
	// Unsuited is whether Pearson's coefficient does not suit the scatter of
	// a pair under the transforms on.
	Unsuited func(on []request.Transform) bool
	// Whitens is the smallest autoregressive order that whitens a GLS of the
	// request as given, or the order 1 when none does.
	Whitens func(request.Request) int
	// Positive is whether all values are above zero.
	Positive bool
}

// Season is the kind of season that a request has to answer.
type Season uint8

// The kinds.
const (
	NoSeason Season = iota
	FixedSeason
	StochasticSeason
)

func (f Facts) any(match func(evidence.Verdict) bool) bool {
	for _, v := range f.Verdicts {
		if match(v) {
			return true
		}
	}
	return false
}

// drifts reports whether any series drifts.
func (f Facts) drifts() bool { return f.any(evidence.Verdict.Drifts) }

// walks reports whether any series may be related only in differences.
func (f Facts) walks() bool { return f.any(evidence.Verdict.Walks) }

// trends reports whether any series holds a line.
func (f Facts) trends() bool {
	return f.any(func(v evidence.Verdict) bool { return v == evidence.TrendStationary })
}

// GatherFacts asks the case for what the procedure needs.
func GatherFacts(c *evidence.Case) (Facts, error) {
	f := Facts{Request: *c.Req(), AlwaysDifference: c.Settings.AlwaysDifference, Positive: true}
	frame, err := c.Base()
	if err != nil {
		return f, err
	}
	f.Even = frame.Even
	for i := range frame.Columns {
		p, err := c.BaseProfile(i)
		if err != nil {
			return f, err
		}
		f.Verdicts = append(f.Verdicts, p.Verdict)
		f.Autocorrelated = f.Autocorrelated || p.Autocorrelated
		f.Season = max(f.Season, kindOf(p.Season))
		for _, v := range frame.Columns[i] {
			f.Positive = f.Positive && v > 0
		}
	}
	f.Unsuited = func(on []request.Transform) bool { return unsuited(c, on) }
	f.Whitens = func(r request.Request) int { return whitens(c, r) }
	f.Walking, err = walking(c, f)
	return f, err
}

func kindOf(s evidence.Season) Season {
	switch {
	case !s.Material:
		return NoSeason
	case s.Stochastic:
		return StochasticSeason
	}
	return FixedSeason
}

// walking asks whether the usual differences are enough.
func walking(c *evidence.Case, f Facts) (bool, error) {
	if !f.walks() {
		return false, nil
	}
	r := f.Request
	r.On = f.differenced()
	d := c.With(r)
	for i := range f.Verdicts {
		p, err := d.UsedProfile(i)
		if err != nil {
			return false, c.Failure()
		}
		if p.Verdict == evidence.DifferenceStationary {
			return true, nil
		}
	}
	return false, nil
}

func unsuited(c *evidence.Case, on []request.Transform) bool {
	r := *c.Req()
	r.On = on
	d := c.With(r)
	for _, pair := range d.Pairs() {
		s, err := d.Scatter(pair[0], pair[1])
		if err == nil && s.Reason(c.Settings) != "" {
			return true
		}
	}
	return false
}

// mostOrder is the largest autoregressive order that is proposed.
const mostOrder = 4

func whitens(c *evidence.Case, r request.Request) int {
	for order := 1; order <= mostOrder; order++ {
		r.Errors = autoregressive(order)
		fit, err := c.With(r).Fit()
		if err == nil && !fit.Autocorrelated {
			return order
		}
	}
	return 1
}
