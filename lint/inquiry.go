package lint

import (
	"errors"

	"lagwise/lint/document"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

// Inquiry is what a rule is given: one document, one manifest or one request,
// with evidence on demand and a way to report. Fields that do not belong to
// the scope of the rule are zero.
type Inquiry struct {
	Rule        *Rule
	File        string // relative to the root, with /
	Tree        *document.Tree
	Conventions *request.Conventions // in force for the document

	// Problems is what parsing, the schema and binding found (OfDocument).
	Problems []request.Problem

	// Of a manifest.
	Manifest *request.Manifest
	Reads    []evidence.Read // one a record, in order
	Idle     []string        // series that no analysis below the root uses

	// Of a request.
	Request *request.Asked
	Case    *evidence.Case

	findings []finding.Finding
	failure  error
}

// Report says a finding. Rule, severity, file and request are filled in where
// the rule left them empty.
func (q *Inquiry) Report(f finding.Finding) {
	if f.Rule == "" {
		f.Rule = q.Rule.Name
	}
	if f.Severity == finding.Unset {
		f.Severity = q.Rule.Severity
	}
	if f.File == "" {
		f.File = q.File
	}
	if f.Request == "" && q.Request != nil {
		f.Request = q.Request.Name
	}
	q.findings = append(q.findings, f)
}

// Failed records that evidence could not be had for another reason than the
// data: the computation was cancelled or broke down. What the data do not
// allow is no failure; rules handle that themselves.
func (q *Inquiry) Failed(err error) {
	if err != nil && q.failure == nil {
		q.failure = err
	}
}

// Findings returns what was reported.
func (q *Inquiry) Findings() []finding.Finding { return q.findings }

// Failure returns the first failure, joined with what the case recorded.
func (q *Inquiry) Failure() error {
	if q.Case != nil {
		return errors.Join(q.failure, q.Case.Failure())
	}
	return q.failure
}
