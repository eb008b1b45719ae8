package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
	"lagwise/lint/result"
)

//go:embed leftover_season.md
var leftoverSeasonPage string

var leftoverSeason = lint.Rule{
	Name:     "leftover-season",
	Title:    "A season that the request leaves in",
	Page:     leftoverSeasonPage,
	Severity: finding.Warning,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Mendable: true,
	Run: func(q *lint.Inquiry) {
		r := q.Case.Req()
		_, tail := evidence.SplitOn(r.On)
		switch {
		case r.Kind == request.Regression && (r.SeasonalTerms || r.Estimator == "gls" && len(tail) > 0):
			reportResidualSeason(q)
		case len(tail) == 0:
			reportLevelSeason(q)
		default:
			reportTransformedSeason(q)
		}
	},
}

// seasonal reports whether a series of the request has a material season: what
// follows from it is not said again.
func seasonal(q *lint.Inquiry) bool {
	for i := range q.Case.Names() {
		if p, err := q.Case.BaseProfile(i); err == nil && p.Season.Material {
			return true
		}
	}
	return false
}

// reportLevelSeason speaks of series that have a material season.
func reportLevelSeason(q *lint.Inquiry) {
	f := place(q, "on")
	strength := 0.0
	steps := 0
	for i, name := range q.Case.Names() {
		p, err := q.Case.BaseProfile(i)
		if err != nil {
			return
		}
		if s := p.Season; s.Material {
			f.Series = append(f.Series, name)
			strength, steps = max(strength, *s.Strength), s.Steps
			f.Evidence = append(f.Evidence, finding.Evidence{About: name, Test: "F test of the season", Null: "no season",
				Statistic: &s.F.F, P: &s.F.P, N: p.N})
		}
	}
	if len(f.Series) == 0 {
		return
	}
	f.Message = fmt.Sprintf("%s %s a season of %d steps (strength %s), which relates series whatever else they do.",
		list(f.Series, "and"), agree(len(f.Series), "has", "have"), steps, result.Coef(strength))
	q.Report(f)
}

// reportTransformedSeason speaks of transformed series in which QS finds a
// season; what still drifts is told by another rule.
func reportTransformedSeason(q *lint.Inquiry) {
	if drifts(q) {
		return
	}
	f := place(q, "on")
	var r float64
	for i, name := range q.Case.Names() {
		s, err := q.Case.UsedSeason(i)
		if err != nil {
			return
		}
		if s.Left(q.Case.Settings) {
			f.Series = append(f.Series, name)
			r = s.R
			f.Evidence = append(f.Evidence, seasonEvidence(name, s))
		}
	}
	if len(f.Series) == 0 {
		return
	}
	f.Message = fmt.Sprintf("The transformed %s still %s a season (autocorrelation %s one season apart).",
		list(f.Series, "and"), agree(len(f.Series), "carries", "carry"), result.Coef(r))
	q.Report(f)
}

// reportResidualSeason speaks of a fit whose residuals carry a season.
func reportResidualSeason(q *lint.Inquiry) {
	s, err := q.Case.ResidualSeason()
	if err != nil || !s.Left(q.Case.Settings) {
		return
	}
	f := place(q, "seasonal-terms")
	f.Series = q.Case.Names()
	f.Evidence = []finding.Evidence{seasonEvidence("residuals", s)}
	f.Message = fmt.Sprintf("The residuals still carry a season (autocorrelation %s one season apart).", result.Coef(s.R))
	q.Report(f)
}

func seasonEvidence(about string, s evidence.SeasonLeft) finding.Evidence {
	return finding.Evidence{About: about, Test: "QS", Null: "no season", Statistic: &s.QS, P: &s.P, N: s.N}
}
