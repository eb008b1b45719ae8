package rules

import (
	"fmt"
	"strings"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/result"
)

// reportDependence speaks of the pairs of a correlation under the usual
// inference in which either series carries autocorrelation. lead is how the
// message begins; the numbers are those of the first pair.
func reportDependence(q *lint.Inquiry, lead string) {
	profiles := make([]*evidence.Profile, len(q.Case.Names()))
	for i := range profiles {
		p, err := q.Case.UsedProfile(i)
		if err != nil {
			return
		}
		profiles[i] = p
	}
	pairs, columns := pairsWith(q, func(i, j int) bool { return profiles[i].Autocorrelated || profiles[j].Autocorrelated })
	if len(pairs) == 0 {
		return
	}
	f := place(q, "inference")
	f.Pairs = pairs
	for i, name := range q.Case.Names() {
		if lb := profiles[i].LjungBox; lb != nil {
			lags := lb.Lags
			f.Evidence = append(f.Evidence, finding.Evidence{About: name, Test: "Ljung-Box", Null: "no autocorrelation",
				Lags: &lags, Statistic: &lb.Statistic, P: &lb.P, N: lb.N})
		}
	}
	i, j := columns[0][0], columns[0][1]
	f.Message = fmt.Sprintf("%s (lag 1: %s and %s)%s", lead, lagOne(profiles[i]), lagOne(profiles[j]), countsAs(q, i, j))
	if len(pairs) > 1 {
		f.Detail = "The numbers are those of " + pairWords(pairs[:1]) + "; concerned are " + pairWords(pairs) + "."
	}
	q.Report(f)
}

func lagOne(p *evidence.Profile) string {
	if len(p.R) == 0 {
		return "undefined"
	}
	return result.Coef(p.R[0])
}

// countsAs says how many independent values a pair has, and what becomes of
// its p-value.
func countsAs(q *lint.Inquiry, i, j int) string {
	usual, err := q.Case.Pair(i, j)
	if err != nil {
		return "."
	}
	n, err := q.Case.EffectiveN(i, j)
	if err != nil {
		return ": the usual p-value does not hold, and too few independent values are left to say more."
	}
	r := *q.Case.Req()
	r.Inference = "effective-n"
	better, err := q.Case.With(r).Pair(i, j)
	if err != nil {
		return fmt.Sprintf(": %d values count as %s, too few to say more.", usual.N, result.Count(n))
	}
	words := fmt.Sprintf(": %d values count as %s, and %s as %s.", usual.N, result.Count(n),
		result.P(usual.P, ""), bare(result.P(better.P, "")))
	if n > float64(usual.N) {
		words += " They count as more than there are because the autocorrelations have opposite signs."
	}
	return words
}

// bare takes "p" and an equals sign off a p-value.
func bare(p string) string { return strings.TrimPrefix(strings.TrimPrefix(p, "p "), "= ") }
