package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed repeated_positions.md
var repeatedPositionsPage string

var repeatedPositions = lint.Rule{
	Name:     "repeated-positions",
	Title:    "Positions that stand more than once",
	Page:     repeatedPositionsPage,
	Severity: finding.Error,
	Scope:    lint.OfManifest,
	Need:     lint.Data,
	Run:      tellRepeatedPositions,
}

func tellRepeatedPositions(q *lint.Inquiry) {
	eachReadable(q, func(rec *request.Record, read *evidence.Read) {
		a := &read.Axis
		if a.Repeated == 0 || a.Ambiguous {
			return
		}
		q.Report(finding.Finding{
			At:     axisPlace(rec, "column"),
			Series: seriesRead(read),
			Message: fmt.Sprintf("%s of column %s %s more than once; the first is %s, again on line %d.",
				count(a.Repeated, "position", "positions"), a.Column, agree(a.Repeated, "stands", "stand"), a.FirstRepeated, a.RepeatedLine),
			Detail: "Correct the file; where the rows belong to several runs, name the column that tells them apart as `group`.",
		})
	})
}
