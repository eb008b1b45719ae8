package present

import (
	"io"

	"lagwise/lint/document"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

type reviewJSON struct {
	Head
	Findings []findingJSON `json:"findings"`
	Summary  Summary       `json:"summary"`
}

type findingJSON struct {
	Rule        string         `json:"rule"`
	Severity    string         `json:"severity"`
	File        string         `json:"file"`
	Range       document.Range `json:"range"`
	Request     string         `json:"request"`
	Pairs       [][2]string    `json:"pairs"`
	Series      []string       `json:"series"`
	Fingerprint string         `json:"fingerprint"`
	Message     string         `json:"message"`
	Detail      string         `json:"detail"`
	Evidence    []evidenceJSON `json:"evidence"`
	Rewrites    []rewriteJSON  `json:"rewrites"`
	Related     []relatedJSON  `json:"related"`
	Deviation   *deviationJSON `json:"deviation"`
	Known       bool           `json:"known,omitempty"`
}

type evidenceJSON struct {
	About     string  `json:"about"`
	Test      string  `json:"test"`
	Null      string  `json:"null"`
	Terms     *string `json:"terms"`
	Lags      *int    `json:"lags"`
	Bandwidth *int    `json:"bandwidth"`
	Statistic number  `json:"statistic"`
	P         number  `json:"p"`
	PBound    *string `json:"p-bound"`
	N         int     `json:"n"`
}

type rewriteJSON struct {
	Title     string    `json:"title"`
	Preferred bool      `json:"preferred"`
	Question  bool      `json:"question"`
	Leaves    []string  `json:"leaves"`
	Gives     givesJSON `json:"gives"`
	Edits     []editRow `json:"edits"`
}

type givesJSON struct {
	Estimate number `json:"estimate"`
	P        number `json:"p"`
	N        int    `json:"n"`
}

type editRow struct {
	File  string         `json:"file"`
	Range document.Range `json:"range"`
	Text  string         `json:"text"`
}

type relatedJSON struct {
	File    string         `json:"file"`
	Range   document.Range `json:"range"`
	Message string         `json:"message"`
}

type deviationJSON struct {
	From       string `json:"from"`
	Reason     string `json:"reason"`
	By         string `json:"by"`
	AcceptedBy string `json:"accepted-by"`
	Until      string `json:"until"`
}

// ReviewJSON writes the findings of documents.
func ReviewJSON(w io.Writer, head Head, all []Reviewed) error {
	out := reviewJSON{Head: head, Findings: []findingJSON{}, Summary: Summarize(all)}
	for _, doc := range all {
		for _, f := range doc.Findings {
			row := findingRow(f)
			row.Known = doc.Known[f.Fingerprint]
			out.Findings = append(out.Findings, row)
		}
	}
	return writeJSON(w, out)
}

// FindingsJSON writes findings alone, as they stand in a review.
func FindingsJSON(w io.Writer, all []finding.Finding) error {
	rows := []findingJSON{}
	for _, f := range all {
		rows = append(rows, findingRow(f))
	}
	return writeJSON(w, rows)
}

func findingRow(f finding.Finding) findingJSON {
	row := findingJSON{Rule: f.Rule, Severity: f.Severity.String(), File: f.File, Range: f.Range, Request: f.Request,
		Pairs: orEmpty(f.Pairs), Series: orEmpty(f.Series), Fingerprint: f.Fingerprint, Message: f.Message, Detail: f.Detail,
		Evidence: []evidenceJSON{}, Rewrites: []rewriteJSON{}, Related: []relatedJSON{}, Deviation: deviationRow(f.Deviation)}
	for _, e := range f.Evidence {
		row.Evidence = append(row.Evidence, evidenceJSON{About: e.About, Test: e.Test, Null: e.Null, Terms: orNull(e.Terms),
			Lags: e.Lags, Bandwidth: e.Bandwidth, Statistic: number{e.Statistic}, P: number{e.P}, PBound: e.PBound, N: e.N})
	}
	for _, r := range f.Rewrites {
		row.Rewrites = append(row.Rewrites, rewriteRow(r))
	}
	for _, r := range f.Related {
		row.Related = append(row.Related, relatedJSON{r.File, r.Range, r.Message})
	}
	return row
}

func rewriteRow(r finding.Rewrite) rewriteJSON {
	row := rewriteJSON{Title: r.Title, Preferred: r.Preferred, Question: r.Question, Leaves: orEmpty(r.Leaves), Edits: []editRow{},
		Gives: givesJSON{number{r.Gives.Estimate}, number{r.Gives.P}, r.Gives.N}}
	for _, e := range r.Edits {
		row.Edits = append(row.Edits, editRow{e.File, e.Range, e.Text})
	}
	return row
}

func deviationRow(d *request.Deviation) *deviationJSON {
	if d == nil {
		return nil
	}
	return &deviationJSON{d.From, d.Reason, d.By, d.AcceptedBy, d.Until}
}

func orEmpty[T any](all []T) []T {
	if all == nil {
		return []T{}
	}
	return all
}

func orNull(s string) *string {
	if s == "" {
		return nil
	}
	return &s
}
