package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed missing_unit.md
var missingUnitPage string

var missingUnit = lint.Rule{
	Name:     "missing-unit",
	Title:    "A series without a unit",
	Page:     missingUnitPage,
	Severity: finding.Information,
	Scope:    lint.OfManifest,
	Need:     lint.Data,
	Run:      tellMissingUnit,
}

func tellMissingUnit(q *lint.Inquiry) {
	asked := asksForSeries(q.Conventions, "unit")
	eachReadable(q, func(rec *request.Record, read *evidence.Read) {
		var unnamed []string
		for i := range read.Series {
			s := &read.Series[i]
			switch {
			case s.Trouble != nil || s.Unit != "":
			case !s.DeclaredSeries:
				unnamed = append(unnamed, s.Name)
			case !asked: // else absent-field says it
				q.Report(finding.Finding{
					At:     seriesPlace(q, rec, s.Name, "unit"),
					Series: []string{s.Name},
					Message: fmt.Sprintf("%s has no unit. Say `unit = \"…\"` in UCUM, \"1\" for a pure number or \"{count}\" for counts.",
						s.Name),
				})
			}
		}
		if len(unnamed) > 0 {
			q.Report(undeclaredWithoutUnit(rec, read, unnamed))
		}
	})
}

// undeclaredWithoutUnit is one finding a record: a manifest that declares no
// series is a fair beginning, not a list of faults.
func undeclaredWithoutUnit(rec *request.Record, read *evidence.Read, names []string) finding.Finding {
	return finding.Finding{
		At:     filePlace(rec),
		Series: names,
		Message: fmt.Sprintf("%s of %s %s no unit: %s. Write it into the header, as in \"nitrate (mg/L)\", or declare the series.",
			count(len(names), "column", "columns"), read.File, agree(len(names), "has", "have"), few(names)),
	}
}
