package rules

import (
	"fmt"
	"strings"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

// fromProblems is the run of a rule that tells what reading the document
// found in its name.
func fromProblems(rule string) func(*lint.Inquiry) {
	return func(q *lint.Inquiry) {
		for _, p := range q.Problems {
			if p.Rule == rule {
				q.Report(problemFinding(q.File, p))
			}
		}
	}
}

// problemFinding words a problem as a finding; the nearest right word becomes
// its rewrite.
func problemFinding(file string, p request.Problem) finding.Finding {
	f := finding.Finding{At: p.At, Message: p.Message, Detail: p.Detail, Request: p.Request}
	for _, r := range p.Related {
		place := finding.Related{File: r.File, At: r.At, Message: r.Message}
		if place.File == "" {
			place.File = file
		}
		f.Related = append(f.Related, place)
	}
	if p.Nearest != nil {
		f.Rewrites = []finding.Rewrite{writeNearest(file, *p.Nearest)}
	}
	return f
}

// writeNearest is the rewrite that puts the nearest right word in the place
// of a wrong one.
func writeNearest(file string, edit document.Edit) finding.Rewrite {
	word := strings.Trim(edit.Text, `"'`)
	return textRewrite(file, fmt.Sprintf(`Write "%s"`, word), true, edit)
}

// textRewrite is a rewrite of a document that bears on no request's result.
func textRewrite(file, title string, preferred bool, edits ...document.Edit) finding.Rewrite {
	r := finding.Rewrite{Title: title, Preferred: preferred}
	for _, e := range edits {
		r.Edits = append(r.Edits, finding.Edit{File: file, At: e.At, Text: e.Text})
	}
	return r
}
