package rules

import (
	"errors"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
	"lagwise/lint/result"
)

// tellUncomputable says at a request why nothing is computed for it: a person
// who reads the analysis need not open the manifest to learn that. The trouble
// is told in the name of the rule that tells it in the manifest.
func tellUncomputable(q *lint.Inquiry) {
	if _, err := q.Case.Levels(); err != nil {
		var u *evidence.Unavailable
		if errors.As(err, &u) {
			q.Report(finding.Finding{Rule: string(u.Trouble.Kind), At: named(q, u.Series), Series: []string{u.Series}, Message: u.Trouble.Message})
		}
		return
	}
	if _, err := q.Case.Used(); err != nil {
		if !evidence.IsTooShort(err) && !evidence.IsConstant(err) && q.Case.Failure() == nil {
			tellWrongFor(q, "on", err)
		}
		return
	}
	var unserved *evidence.Unserved
	if err := attempt(q); errors.As(err, &unserved) {
		tellWrongFor(q, unserved.Key, err)
	}
}

// attempt computes the request and returns what kept it from being computed.
func attempt(q *lint.Inquiry) error {
	if q.Case.Req().Kind == request.Regression {
		_, err := q.Case.Fit()
		return err
	}
	for _, pair := range q.Case.Pairs() {
		if _, err := q.Case.Pair(pair[0], pair[1]); err != nil {
			return err
		}
	}
	return nil
}

// tellWrongFor says that the value of a key is wrong for these data.
func tellWrongFor(q *lint.Inquiry, key string, err error) {
	f := place(q, key)
	f.Rule, f.Message = wrongValueName, result.Words(err)
	q.Report(f)
}

// wrongValueName is spelled out because the rule's own variable would refer
// to itself through this file.
const wrongValueName = "wrong-value"

// named is the place where a request names a series.
func named(q *lint.Inquiry, series string) document.Span {
	if places := q.Request.Names[series]; len(places) > 0 {
		return places[0]
	}
	return subject(q.Request)
}
