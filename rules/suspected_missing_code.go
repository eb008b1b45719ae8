package rules

import (
	_ "embed"
	"fmt"
	"strings"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed suspected_missing_code.md
var suspectedMissingCodePage string

var suspectedMissingCode = lint.Rule{
	Name:     "suspected-missing-code",
	Title:    "A repeated extreme value that looks like a code for missing",
	Page:     suspectedMissingCodePage,
	Severity: finding.Warning,
	Scope:    lint.OfManifest,
	Need:     lint.Data,
	Run:      tellSuspectedMissingCode,
}

func tellSuspectedMissingCode(q *lint.Inquiry) {
	eachSeries(q, func(rec *request.Record, s *evidence.SeriesRead) {
		if s.SuspectCount == 0 {
			return
		}
		f := finding.Finding{
			At:     seriesPlace(q, rec, s.Name, "column"),
			Series: []string{s.Name},
			Message: fmt.Sprintf("%g stands %s among the %d values of %s, far from the others: it looks like a code for a missing value and is read as a number.",
				s.Suspect, times(s.SuspectCount), s.N, s.Name),
		}
		if table := tableAt(q.Tree, "record", rec.Name); table != nil {
			code, key, known := fmt.Sprintf("%g", s.Suspect), "missing", rec.Missing
			if rec.MissingOnly != nil {
				key, known = "missing-only", rec.MissingOnly
			}
			f.Rewrites = []finding.Rewrite{textRewrite(q.File, "Declare "+code+" as missing", false,
				q.Tree.Set(table, key, codes(append(append([]string{}, known...), code)))...)}
		}
		q.Report(f)
	})
}

// codes writes a list of codes as a TOML array.
func codes(list []string) string {
	var quoted []string
	for _, c := range list {
		quoted = append(quoted, document.Quote(c))
	}
	return "[" + strings.Join(quoted, ", ") + "]"
}

func times(n int) string {
	if n == 1 {
		return "once"
	}
	return fmt.Sprintf("%d times", n)
}
