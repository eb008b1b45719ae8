package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed absent_field.md
var absentFieldPage string

var absentField = lint.Rule{
	Name:     "absent-field",
	Title:    "A field that the schema or the lab asks for",
	Page:     absentFieldPage,
	Severity: finding.Warning,
	Scope:    lint.OfDocument,
	Need:     lint.Text,
	Run:      tellAbsentField,
}

// tellAbsentField tells what the schema asks for as an error, for nothing can
// be computed without it, and what the lab asks for at the rule's own weight.
func tellAbsentField(q *lint.Inquiry) {
	for _, p := range q.Problems {
		if p.Rule == "absent-field" {
			f := problemFinding(q.File, p)
			f.Severity = finding.Error
			q.Report(f)
		}
	}
	if q.Conventions == nil {
		return
	}
	switch request.DocumentKind(q.File) {
	case request.ManifestDoc:
		seriesLack(q, q.Conventions.AskedFor.Series)
	case request.ConventionsDoc:
	default: // an analysis, or a script that holds one
		requestsLack(q, q.Conventions.AskedFor.Request)
	}
}

func seriesLack(q *lint.Inquiry, fields []string) {
	if len(fields) == 0 {
		return
	}
	m, _ := request.BindManifest(q.File, q.Tree)
	for _, s := range m.Series {
		absent := lacking(withoutDefaults(fields, recordOf(m, s)), s.Keys, q.Tree)
		if len(absent) > 0 {
			q.Report(finding.Finding{At: s.Header, Series: []string{s.Name}, Message: asked(s.Name, absent)})
		}
	}
}

func requestsLack(q *lint.Inquiry, fields []string) {
	if len(fields) == 0 {
		return
	}
	a, _ := request.BindAnalysis(q.File, q.Tree)
	for _, r := range a.Requests {
		absent := lacking(fieldsOf(r.Kind, fields), r.Keys, q.Tree)
		if len(absent) > 0 {
			q.Report(finding.Finding{At: r.Header, Request: r.Name, Message: asked(r.Name, absent)})
		}
	}
}

func asked(name string, absent []string) string {
	return fmt.Sprintf("%s lacks %s, which the lab's conventions ask for.", name, list(absent, "and"))
}

// withoutDefaults leaves out what the record gives all of its series.
func withoutDefaults(fields []string, rec *request.Record) []string {
	if rec == nil {
		return fields
	}
	var kept []string
	for _, field := range fields {
		if rec.Defaults[field] == "" && !(field == "unit" && rec.DefaultUnit != "") {
			kept = append(kept, field)
		}
	}
	return kept
}

func recordOf(m *request.Manifest, s *request.Series) *request.Record {
	if s.Record == "" && len(m.Records) == 1 {
		return m.Records[0]
	}
	return recordNamed(m, s.Record)
}

// fieldsOf leaves out the fields that the kind of request does not have.
func fieldsOf(kind request.Kind, fields []string) []string {
	other := request.Regression
	if kind == other {
		other = request.Correlation
	}
	var kept []string
	for _, field := range fields {
		if !holds(fieldsOnlyOf[other], field) {
			kept = append(kept, field)
		}
	}
	return kept
}

var fieldsOnlyOf = map[request.Kind][]string{
	request.Correlation: {"between", "given", "remove-from", "coefficient", "inference", "replicates"},
	request.Regression: {"response", "predictors", "estimator", "errors", "likelihood", "standard-errors",
		"trend", "seasonal-terms", "form"},
}
