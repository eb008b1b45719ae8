package rules

import (
	"fmt"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
	"lagwise/lint/result"
)

// driftSeen is which series of a request drift as they are used.
type driftSeen struct {
	names    []string // of those that drift
	columns  map[int]bool
	tooShort bool // none of them is known to drift: they are too short to tell
	trends   bool // all of them hold a line
	tests    []finding.Evidence
}

// drifting says which series drift under the transforms of the request; ok is
// false when the data do not allow an answer.
func drifting(q *lint.Inquiry) (seen driftSeen, ok bool) {
	seen = driftSeen{columns: map[int]bool{}, tooShort: true, trends: true}
	for i, name := range q.Case.Names() {
		p, err := q.Case.UsedProfile(i)
		if err != nil {
			return seen, false
		}
		if !p.Verdict.Drifts() {
			continue
		}
		seen.names = append(seen.names, name)
		seen.columns[i] = true
		seen.tooShort = seen.tooShort && p.Verdict == evidence.TooShort
		seen.trends = seen.trends && p.Verdict == evidence.TrendStationary
		seen.tests = append(seen.tests, shown(name, p.Tests)...)
	}
	return seen, true
}

// differenced reports whether the request takes drift off by differencing.
func differenced(q *lint.Inquiry) bool { return evidence.Differences(q.Case.Req().On) }

// drifts reports whether drift already speaks of the request: what follows
// from it is not said again.
func drifts(q *lint.Inquiry) bool {
	if differenced(q) {
		return false
	}
	seen, ok := drifting(q)
	return !ok || len(seen.names) > 0
}

// shown turns tests into the evidence of a finding.
func shown(about string, tests []evidence.Test) []finding.Evidence {
	var all []finding.Evidence
	for _, t := range tests {
		if t.Error != "" {
			continue
		}
		e := finding.Evidence{About: about, Test: t.Test, Null: t.Null, Terms: t.Terms, Lags: t.Lags, Bandwidth: t.Bandwidth,
			Statistic: t.Statistic, P: t.P, N: t.N}
		if t.PBound != "" {
			bound := string(t.PBound)
			e.PBound = &bound
		}
		all = append(all, e)
	}
	return all
}

// pairsWith lists the pairs of a correlation for which keep holds.
func pairsWith(q *lint.Inquiry, keep func(i, j int) bool) (pairs [][2]string, columns [][2]int) {
	names := q.Case.Names()
	for _, p := range q.Case.Pairs() {
		if keep(p[0], p[1]) {
			pairs = append(pairs, [2]string{names[p[0]], names[p[1]]})
			columns = append(columns, p)
		}
	}
	return pairs, columns
}

// pairWords names at most three pairs and counts the rest.
func pairWords(pairs [][2]string) string {
	var words []string
	for i, p := range pairs {
		if i == 3 {
			words = append(words, fmt.Sprintf("%d more pairs", len(pairs)-3))
			break
		}
		words = append(words, p[0]+" and "+p[1])
	}
	return list(words, "and")
}

// coefficient writes the coefficient of a pair as the request has it: r =
// -0.93; in words when it cannot be computed.
func coefficient(q *lint.Inquiry, pair [2]int) string {
	r, err := q.Case.Pair(pair[0], pair[1])
	if err != nil {
		return "the coefficient"
	}
	return symbolOf(q.Case.Req()) + " = " + result.Coef(r.Estimate)
}

func symbolOf(r *request.Request) string {
	switch r.Coefficient {
	case "spearman":
		return "rho"
	case "kendall":
		return "tau"
	}
	return "r"
}

// place is the tight place for a finding about a key of the request: the word
// itself when it is written, else the names of the series it is about.
func place(q *lint.Inquiry, key string) finding.Finding {
	f := finding.Finding{At: q.Request.Key(key)}
	if f.At == q.Request.Header {
		f.At = subject(q.Request)
	}
	return f
}

// subjectKeys are the keys that name what a request relates.
var subjectKeys = []string{"between", "response", "predictors"}
