package present

import (
	"fmt"
	"strings"

	"lagwise/lint/finding"
	"lagwise/lint/result"
)

// Hover writes what is known of one request for an editor, in Markdown or in
// plain text: what was found, the evidence with its nulls, small pictures, the
// results side by side, and what to do.
func Hover(e *result.Explanation, findings []finding.Finding, markdown bool) string {
	h := &page{markdown: markdown}
	h.title(safe(e.Request), heading(e.Request, e))
	for _, f := range findings {
		h.found(f)
	}
	h.seriesTable(e)
	h.sidesTable(e)
	h.advice(e, findings)
	return h.String()
}

// page gathers paragraphs in one of both forms.
type page struct {
	strings.Builder
	markdown bool
}

func (h *page) paragraph(s string) {
	if h.Len() > 0 {
		h.WriteString("\n\n")
	}
	h.WriteString(s)
}

func (h *page) text(s string) string {
	if h.markdown {
		return escaped(s)
	}
	return visible(s)
}

func (h *page) title(name, full string) {
	if h.markdown {
		h.paragraph("**" + escaped(name) + "**" + escaped(strings.TrimPrefix(full, name)))
		return
	}
	h.paragraph(visible(full))
}

func (h *page) found(f finding.Finding) {
	words := h.text(f.Message)
	if f.Detail != "" {
		words += " " + h.text(f.Detail)
	}
	h.paragraph(words + " (" + sign(f) + ")")
}

// table writes rows, the first of them the head.
func (h *page) table(rows [][]string) {
	if len(rows) < 2 {
		return
	}
	if !h.markdown {
		h.paragraph(strings.Join(aligned(rows), "\n"))
		return
	}
	var b strings.Builder
	for i, row := range rows {
		b.WriteString("| " + strings.Join(row, " | ") + " |\n")
		if i == 0 {
			b.WriteString(strings.Repeat("|---", len(row)) + "|\n")
		}
	}
	h.paragraph(strings.TrimSuffix(b.String(), "\n"))
}

func (h *page) seriesTable(e *result.Explanation) {
	pictures := [][]string{{"series", "levels", "differences", "verdict"}}
	tests := [][]string{{"test", "of", "null", "statistic", "p", "n"}}
	for _, s := range e.Series {
		verdict := s.Verdict
		if len(s.Notes) > 0 {
			verdict += " (" + strings.Join(s.Notes, "; ") + ")"
		}
		pictures = append(pictures, []string{h.text(safe(s.Name)), Spark(s.Levels, 24), Spark(s.Differences, 24), verdict})
		for _, t := range s.Tests {
			tests = append(tests, h.testRow(s.Name, t))
		}
	}
	h.table(pictures)
	h.table(tests)
}

func (h *page) testRow(of string, t result.Test) []string {
	name := t.Test
	if t.Terms != "" {
		name += ", " + t.Terms
	}
	switch {
	case t.Lags != nil:
		name += ", " + counted(*t.Lags, "lag")
	case t.Bandwidth != nil:
		name += fmt.Sprintf(", bandwidth %d", *t.Bandwidth)
	}
	if t.Statistic == nil {
		return []string{name, h.text(safe(of)), t.Null, "not computed", h.text(t.Error), fmt.Sprint(t.N)}
	}
	return []string{name, h.text(safe(of)), t.Null, statistic(*t.Statistic), h.text(strings.TrimPrefix(pWords(t.P, t.PBound), "p ")), fmt.Sprint(t.N)}
}

func (h *page) sidesTable(e *result.Explanation) {
	rows := [][]string{{"values", "estimate", "interval", "p", "n", "speaks of"}}
	for _, s := range e.Side {
		row := sideRow(s)
		row[0] = strings.TrimSpace(row[0])
		for i := range row {
			row[i] = h.text(row[i])
		}
		for len(row) < len(rows[0]) {
			row = append(row, "")
		}
		rows = append(rows, row)
	}
	h.table(rows)
}

func (h *page) advice(e *result.Explanation, findings []finding.Finding) {
	switch {
	case e.Preferred != "":
		h.paragraph("What to do: " + h.text(e.Preferred) + ".")
	case e.NoPreferred != "":
		h.paragraph(h.text(e.NoPreferred))
	case len(findings) == 0:
		h.paragraph("Nothing to object to on these data.")
	}
}

// HoverSeries writes what is known of one series of a manifest.
func HoverSeries(s *result.Screened, markdown bool) string {
	h := &page{markdown: markdown}
	if s.Error != "" {
		h.title(safe(s.Name), safe(s.Name))
		h.paragraph("Not screened: " + h.text(s.Error))
		return h.String()
	}
	h.title(safe(s.Name), fmt.Sprintf("%s   %s   %s   n %d   %s", safe(s.Name), period(s.First, s.Last), s.Step, s.N, s.Verdict))
	h.table([][]string{{"", "picture", "verdict"}, {"levels", Spark(s.Levels, 40), s.Verdict}, {"differences", Spark(s.Differences, 40), s.VerdictOnDifferences}})
	lines := screenLines(s)
	for i, line := range lines {
		lines[i] = h.text(line)
		if markdown {
			lines[i] = "- " + lines[i]
		}
	}
	h.paragraph(strings.Join(lines, "\n"))
	return h.String()
}
