package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed unparsed_values.md
var unparsedValuesPage string

var unparsedValues = lint.Rule{
	Name:     "unparsed-values",
	Title:    "Cells that are not read as numbers or positions",
	Page:     unparsedValuesPage,
	Severity: finding.Warning,
	Scope:    lint.OfManifest,
	Need:     lint.Data,
	Run:      tellUnparsedValues,
}

func tellUnparsedValues(q *lint.Inquiry) {
	eachReadable(q, func(rec *request.Record, read *evidence.Read) {
		if a := &read.Axis; a.Ambiguous || a.Unparsed > 0 {
			q.Report(unparsedPositions(rec, read))
		}
	})
	eachSeries(q, func(rec *request.Record, s *evidence.SeriesRead) {
		if s.Unparsed > 0 {
			q.Report(finding.Finding{
				At:     seriesPlace(q, rec, s.Name, "column"),
				Series: []string{s.Name},
				Message: fmt.Sprintf("%s of %s %s no number; the first is %q on line %d. Correct it, or name it in `missing`.",
					count(s.Unparsed, "value", "values"), s.Name, agree(s.Unparsed, "is", "are"), s.UnparsedText, s.UnparsedLine),
				Detail: "What is not read counts as missing until then.",
			})
		}
	})
}

func unparsedPositions(rec *request.Record, read *evidence.Read) finding.Finding {
	a := &read.Axis
	f := finding.Finding{At: axisPlace(rec, "format"), Series: seriesRead(read)}
	if a.Ambiguous {
		f.Message = fmt.Sprintf("Column %s holds dates like %q that can be read as day or month first. "+
			"Say `format = \"%%d/%%m/%%Y\"` or `format = \"%%m/%%d/%%Y\"` in `along`.", a.Column, a.UnparsedText)
		return f
	}
	f.Message = fmt.Sprintf("%s in column %s %s not read; the first is %q on line %d. Correct it, or give its `format` in `along`.",
		count(a.Unparsed, "position", "positions"), a.Column, agree(a.Unparsed, "was", "were"), a.UnparsedText, a.UnparsedLine)
	f.Detail = "Rows without a position are left out until then."
	return f
}
