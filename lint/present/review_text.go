package present

import (
	"fmt"
	"io"
	"slices"
	"strings"
	"unicode/utf8"

	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/result"
)

// Reviewed is one document and what is said of it.
type Reviewed struct {
	File      string // relative to the root
	Shown     string // relative to the current folder
	Findings  []finding.Finding
	Explained map[string]*result.Explanation // by request; of those with findings
	Known     map[string]bool                // fingerprints of an earlier review
	Requests  int
	Series    int
}

// textWidth is the width that lines are laid out for.
const textWidth = 100

// ReviewText writes the findings of documents, grouped by request.
func ReviewText(w io.Writer, all []Reviewed) error {
	var b strings.Builder
	for _, doc := range all {
		for _, group := range grouped(doc.Findings) {
			if b.Len() > 0 {
				b.WriteByte('\n')
			}
			writeGroup(&b, &doc, group)
		}
	}
	if b.Len() > 0 {
		b.WriteByte('\n')
	}
	b.WriteString(Summarize(all).Words())
	b.WriteByte('\n')
	_, err := io.WriteString(w, b.String())
	return err
}

// group is the findings of one request; those of the document itself have no
// request and come first.
type group struct {
	request  string
	findings []finding.Finding
}

func grouped(all []finding.Finding) []group {
	var groups []group
	for _, f := range all {
		i := slices.IndexFunc(groups, func(g group) bool { return g.request == f.Request })
		if i < 0 {
			groups = append(groups, group{request: f.Request})
			i = len(groups) - 1
		}
		groups[i].findings = append(groups[i].findings, f)
	}
	slices.SortStableFunc(groups, func(a, b group) int {
		if (a.request == "") != (b.request == "") {
			return map[bool]int{true: -1, false: 1}[a.request == ""]
		}
		return 0
	})
	for _, g := range groups {
		if g.request != "" {
			slices.SortStableFunc(g.findings, func(a, b finding.Finding) int { return int(a.Severity) - int(b.Severity) })
		}
	}
	return groups
}

func writeGroup(b *strings.Builder, doc *Reviewed, g group) {
	lead := g.findings[0]
	at := fmt.Sprintf("%s:%d:%d", visible(doc.Shown), lead.Range.Start.Line+1, lead.Range.Start.Character+1)
	if g.request == "" {
		fmt.Fprintln(b, visible(doc.Shown))
		for _, f := range g.findings {
			place := fmt.Sprintf("  %-7s ", fmt.Sprintf("%d:%d", f.Range.Start.Line+1, f.Range.Start.Character+1))
			writeMessage(b, place, f)
			writeRepair(b, f)
		}
		return
	}
	e := doc.Explained[g.request]
	fmt.Fprintln(b, apart(heading(g.request, e), at, textWidth))
	writeMessage(b, "  ", lead)
	if e != nil {
		writeSeries(b, e)
	}
	for _, f := range g.findings[1:] {
		writeMessage(b, "  ", f)
	}
	if e != nil {
		writeSides(b, e)
	}
	writeApply(b, doc, g, e)
}

// writeMessage writes what a finding says behind its place; what does not fit
// goes on below the message.
func writeMessage(b *strings.Builder, place string, f finding.Finding) {
	indent := strings.Repeat(" ", utf8.RuneCountInString(place))
	for i, line := range told(indent, visible(f.Message), sign(f)) {
		if i == 0 {
			line = place + strings.TrimPrefix(line, indent)
		}
		fmt.Fprintln(b, line)
	}
}

// writeRepair says which word would be right, where the finding knows.
func writeRepair(b *strings.Builder, f finding.Finding) {
	for _, r := range f.Rewrites {
		if r.Preferred {
			fmt.Fprintf(b, "          to apply: %s\n", visible(r.Title))
		}
	}
}

func heading(name string, e *result.Explanation) string {
	words := safe(name)
	if e == nil {
		return words
	}
	if e.Title != "" {
		words += "   " + e.Title
	}
	if e.From != "" {
		words += "   " + period(e.From, e.Until) + fmt.Sprintf("   n %d", e.N)
	}
	return words
}

func period(from, until string) string {
	if len(from) > 4 || len(until) > 4 {
		return from + " to " + until
	}
	return from + "-" + until
}

// sign is the rule and the severity, in words.
func sign(f finding.Finding) string {
	words := f.Rule + ", " + f.Severity.String()
	if f.Deviation != nil {
		words += ", under a deviation"
		if f.Deviation.Until != "" {
			words += " until " + safe(f.Deviation.Until)
		}
	}
	return words
}

func writeSeries(b *strings.Builder, e *result.Explanation) {
	var rows [][]string
	for _, s := range e.Series {
		row := []string{"    " + safe(s.Name), Spark(s.Levels, 11), s.Verdict}
		for _, t := range s.Tests {
			if (t.Test == evidence.ADFName || t.Test == evidence.KPSSName) && t.Terms == "constant" {
				row = append(row, testWords(t))
			}
		}
		rows = append(rows, row)
	}
	for _, line := range aligned(rows) {
		fmt.Fprintln(b, line)
	}
}

func writeSides(b *strings.Builder, e *result.Explanation) {
	var rows [][]string
	for _, s := range e.Side {
		rows = append(rows, sideRow(s))
	}
	for _, line := range aligned(rows) {
		fmt.Fprintln(b, line)
	}
}

func sideRow(s result.Side) []string {
	o := s.Outcome
	if o.Error != "" {
		return []string{"  " + safe(s.Label), "not computed: " + visible(o.Error)}
	}
	estimate, interval := estimateWords(s.Symbol, o)
	return []string{"  " + safe(s.Label), estimate, interval, pWords(o.P, o.PBound), nWords(o), s.Remark}
}

func writeApply(b *strings.Builder, doc *Reviewed, g group, e *result.Explanation) {
	for _, f := range g.findings {
		if slices.ContainsFunc(f.Rewrites, func(r finding.Rewrite) bool { return r.Preferred }) && f.Deviation == nil {
			fmt.Fprintf(b, "  to apply: lagwise amend %s --request %s\n", quoted(doc.Shown), quoted(g.request))
			return
		}
	}
	said := func(f finding.Finding) bool { return f.Message == e.NoPreferred }
	if e != nil && e.NoPreferred != "" && !slices.ContainsFunc(g.findings, said) {
		fmt.Fprintf(b, "  %s\n", visible(e.NoPreferred))
	}
}

// quoted writes a word for a shell, in quotes where it needs them.
func quoted(word string) string {
	word = visible(word)
	if strings.ContainsAny(word, " '\"\\$`&|;<>()*?[]#~!") || word == "" {
		return "'" + strings.ReplaceAll(word, "'", `'\''`) + "'"
	}
	return word
}
