package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed censored_values.md
var censoredValuesPage string

var censoredValues = lint.Rule{
	Name:     "censored-values",
	Title:    "Values below a detection limit",
	Page:     censoredValuesPage,
	Severity: finding.Warning,
	Scope:    lint.OfManifest,
	Need:     lint.Data,
	Run:      tellCensoredValues,
}

func tellCensoredValues(q *lint.Inquiry) {
	eachSeries(q, func(rec *request.Record, s *evidence.SeriesRead) {
		if s.Censored == 0 {
			return
		}
		share := 100 * float64(s.Censored) / float64(s.Measured)
		q.Report(finding.Finding{
			At:     seriesPlace(q, rec, s.Name, "detection-limit"),
			Series: []string{s.Name},
			Message: fmt.Sprintf("%d of %s of %s (%.0f %%) %s censored: known only to lie at or below a detection limit. %s",
				s.Censored, count(s.Measured, "value", "values"), s.Name, share, agree(s.Censored, "is", "are"), censoredAdvice(s)),
		})
	})
}

// censoredAdvice follows the shares of common practice; the page names them.
func censoredAdvice(s *evidence.SeriesRead) string {
	switch {
	case 2*s.Censored > s.Measured:
		return "Most of the series is not measured: a rank coefficient can say little, any other nothing."
	case 100*s.Censored > 15*s.Measured:
		return "A rank coefficient (spearman, kendall) is the fair choice, and differences of censored values are fiction."
	}
	return "A rank coefficient (spearman, kendall) shows whether they matter."
}
