package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed backward_axis.md
var backwardAxisPage string

var backwardAxis = lint.Rule{
	Name:     "backward-axis",
	Title:    "An axis that runs backwards in the file",
	Page:     backwardAxisPage,
	Severity: finding.Information,
	Scope:    lint.OfManifest,
	Need:     lint.Data,
	Run:      tellBackwardAxis,
}

func tellBackwardAxis(q *lint.Inquiry) {
	eachReadable(q, func(rec *request.Record, read *evidence.Read) {
		a := &read.Axis
		if !a.Backward || a.Ambiguous || request.AxisKind(a.Kind) == request.Age {
			return
		}
		q.Report(finding.Finding{
			At:     axisPlace(rec, "column"),
			Series: seriesRead(read),
			Message: fmt.Sprintf("Column %s runs backwards, from %s to %s: it is read from the low end to the high one, and so are differences and lags.",
				a.Column, a.Last, a.First),
			Detail: "Where the column counts an age back from the present, say `kind = \"age\"` in `along`.",
		})
	})
}
