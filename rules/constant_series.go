package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed constant_series.md
var constantSeriesPage string

var constantSeries = lint.Rule{
	Name:     "constant-series",
	Title:    "A series without variation",
	Page:     constantSeriesPage,
	Severity: finding.Error,
	Scope:    lint.OfManifest | lint.OfRequest,
	Need:     lint.Data,
	Run:      tellConstantSeries,
}

func tellConstantSeries(q *lint.Inquiry) {
	if q.Case != nil {
		tellConstantHere(q)
		return
	}
	eachSeries(q, func(rec *request.Record, s *evidence.SeriesRead) {
		var message string
		switch {
		case s.N == 0 && s.Unparsed == 0 && s.Censored == 0 && s.DeclaredSeries:
			message = fmt.Sprintf("%s has no value: %s missing.", s.Name, missingRows(s.Missing))
		case s.N == 1:
			message = fmt.Sprintf("%s has one value, %g: there is no variation to relate to anything.", s.Name, s.Value)
		case s.N > 1 && s.Constant:
			message = fmt.Sprintf("All %d values of %s are %g: there is no variation to relate to anything.", s.N, s.Name, s.Value)
		default:
			return
		}
		q.Report(finding.Finding{
			At: seriesPlace(q, rec, s.Name, "column"), Series: []string{s.Name}, Message: message})
	})
}

func missingRows(n int) string {
	if n == 1 {
		return "its only row is"
	}
	return fmt.Sprintf("all its %d rows are", n)
}

// tellConstantHere speaks of a series that does not vary on the rows and
// transforms of a request, whatever it does elsewhere.
func tellConstantHere(q *lint.Inquiry) {
	for i, name := range q.Case.Names() {
		p, err := q.Case.UsedProfile(i)
		if err != nil {
			return
		}
		if p.Verdict == evidence.Constant {
			q.Report(finding.Finding{At: named(q, name), Series: []string{name},
				Message: fmt.Sprintf("All %d values of %s that this request uses are the same: there is no variation to relate to anything.", p.N, name)})
		}
	}
}
