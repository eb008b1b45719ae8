package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed unknown_column.md
var unknownColumnPage string

var unknownColumn = lint.Rule{
	Name:        "unknown-column",
	Title:       "A column that the data file does not have",
	Page:        unknownColumnPage,
	Severity:    finding.Error,
	Scope:       lint.OfManifest,
	Need:        lint.Data,
	NoDeviation: true,
	Run:         tellUnknownColumn,
}

func tellUnknownColumn(q *lint.Inquiry) {
	eachTroubled(q, func(rec *request.Record, read *evidence.Read) {
		if read.Trouble.Kind == evidence.UnknownColumn {
			q.Report(unknownAxisColumn(q, rec, read))
		}
	})
	eachReadable(q, func(rec *request.Record, read *evidence.Read) {
		if read.SplitBy != "" && anyTroubled(read) {
			q.Report(splitOtherwise(q, rec, read))
			return
		}
		for i := range read.Series {
			if s := &read.Series[i]; s.Trouble != nil {
				q.Report(unknownSeriesColumn(q, rec, s))
			}
		}
	})
}

func unknownAxisColumn(q *lint.Inquiry, rec *request.Record, read *evidence.Read) finding.Finding {
	if read.SplitBy != "" {
		return splitOtherwise(q, rec, read)
	}
	f := unread(q, rec, read)
	f.At = axisPlace(rec, "column")
	if rec.Along == nil {
		return f
	}
	if p, written := rec.Along.Keys["column"]; written && read.Trouble.Nearest != "" {
		f.Rewrites = []finding.Rewrite{writeNearest(q.File, document.Edit{
			At: p.Value, Text: document.Quote(read.Trouble.Nearest)})}
	}
	return f
}

func unknownSeriesColumn(q *lint.Inquiry, rec *request.Record, s *evidence.SeriesRead) finding.Finding {
	f := finding.Finding{
		At:      seriesPlace(q, rec, s.Name, "column"),
		Series:  []string{s.Name},
		Message: s.Trouble.Message,
	}
	nearest := s.Trouble.Nearest
	table := tableAt(q.Tree, "series", s.Name)
	if nearest == "" || table == nil {
		return f
	}
	edits := q.Tree.Set(table, "column", document.Quote(nearest))
	f.Rewrites = []finding.Rewrite{textRewrite(q.File, fmt.Sprintf("Read column %q", nearest), true, edits...)}
	return f
}

// splitOtherwise answers all missing columns of one record at once: with the
// wrong delimiter none of them can be there.
func splitOtherwise(q *lint.Inquiry, rec *request.Record, read *evidence.Read) finding.Finding {
	at := filePlace(rec)
	if p, ok := rec.Keys["delimiter"]; ok {
		at = p.Value
	}
	value := document.Quote(read.SplitBy)
	f := finding.Finding{
		At:     at,
		Series: seriesOf(q.Manifest, rec),
		Message: fmt.Sprintf("%s looks split by %s, so the columns named here are not found. Say `delimiter = %s`.",
			read.File, delimiterWord(read.SplitBy), value),
	}
	if table := tableAt(q.Tree, "record", rec.Name); table != nil {
		f.Rewrites = []finding.Rewrite{textRewrite(q.File, "Split the file by "+delimiterWord(read.SplitBy),
			true, q.Tree.Set(table, "delimiter", value)...)}
	}
	return f
}

func anyTroubled(read *evidence.Read) bool {
	for i := range read.Series {
		if read.Series[i].Trouble != nil {
			return true
		}
	}
	return false
}

func delimiterWord(delimiter string) string {
	switch delimiter {
	case ";":
		return "semicolons"
	case ",":
		return "commas"
	case "\t":
		return "tabs"
	case " ":
		return "spaces"
	case "|":
		return "bars"
	}
	return fmt.Sprintf("%q", delimiter)
}
