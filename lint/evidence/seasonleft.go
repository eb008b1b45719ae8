package evidence

import (
	"context"

	"gonum.org/v1/gonum/stat/distuv"

	"lagwise/stats/series"
)

// SeasonLeft is the QS test of a season left in transformed values or in
// residuals: QS = n(n+2) sum over j = 1, 2 of max(0, r(js))^2/(n - js).
type SeasonLeft struct {
	QS, P float64
	R     float64 // autocorrelation one season apart
	N     int
	Steps int
}

// Left reports whether a season is left: QS and the autocorrelation are both
// above their limits, on at least four full seasons.
func (s SeasonLeft) Left(set Settings) bool {
	return s.Steps > 1 && s.N >= leastSeasons*s.Steps && s.QS > set.Limit("seasonal-qs", 5.99) && s.R >= set.Limit("seasonal-autocorrelation", 0.2)
}

// UsedSeason looks for a season in one series as it is used.
func (c *Case) UsedSeason(i int) (SeasonLeft, error) {
	r, err := c.used()
	if err != nil {
		return SeasonLeft{}, err
	}
	return c.seasonLeft(r.column(i))
}

// ResidualSeason looks for a season in the residuals of the fit.
func (c *Case) ResidualSeason() (SeasonLeft, error) {
	r, err := c.used()
	if err != nil {
		return SeasonLeft{}, err
	}
	fit, err := c.Fit()
	if err != nil {
		return SeasonLeft{}, err
	}
	col := r.column(0)
	col.values = fit.Residuals
	col.digest = keyOf(col.digest, fit.Residuals)
	return c.seasonLeft(col)
}

func (c *Case) seasonLeft(col column) (SeasonLeft, error) {
	s := SeasonLeft{N: len(col.values), Steps: col.season, P: 1}
	if col.season < 2 || s.N < leastSeasons*col.season {
		return s, nil
	}
	got, err := remember(c.ctx, c.store.derived, keyOf("season-left", col.digest),
		func(context.Context) (SeasonLeft, int64, error) {
			qs, r, err := series.QS(col.stretches(), col.season)
			s.QS, s.R = qs, r
			s.P = distuv.ChiSquared{K: 2}.Survival(qs)
			return s, 64, err
		})
	return got, c.note(err)
}
