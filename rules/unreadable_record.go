package rules

import (
	_ "embed"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed unreadable_record.md
var unreadableRecordPage string

var unreadableRecord = lint.Rule{
	Name:        "unreadable-record",
	Title:       "A data file that cannot be read",
	Page:        unreadableRecordPage,
	Severity:    finding.Error,
	Scope:       lint.OfManifest | lint.OfRequest,
	Need:        lint.Data,
	NoDeviation: true,
	Run:         tellUnreadableRecord,
}

// tellUnreadableRecord also speaks for records beyond a limit, in the name of
// reached-limit: that rule itself is asked about documents.
func tellUnreadableRecord(q *lint.Inquiry) {
	if q.Case != nil {
		tellUncomputable(q)
		return
	}
	eachTroubled(q, func(rec *request.Record, read *evidence.Read) {
		f := unread(q, rec, read)
		switch read.Trouble.Kind {
		case evidence.UnreadableRecord:
		case evidence.ReachedLimit:
			f.Rule = string(evidence.ReachedLimit)
		default:
			return
		}
		q.Report(f)
	})
}
