package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/finding"
)

//go:embed idle_series.md
var idleSeriesPage string

var idleSeries = lint.Rule{
	Name:     "idle-series",
	Title:    "A series that no analysis uses",
	Page:     idleSeriesPage,
	Severity: finding.Hint,
	Scope:    lint.OfManifest,
	Need:     lint.Data,
	Run:      tellIdleSeries,
}

func tellIdleSeries(q *lint.Inquiry) {
	for _, name := range q.Idle {
		for _, s := range q.Manifest.Series {
			if s.Name == name && !s.Implicit {
				q.Report(finding.Finding{At: s.Header, Series: []string{name},
					Message: "No analysis below the root uses " + name + "."})
			}
		}
	}
}
