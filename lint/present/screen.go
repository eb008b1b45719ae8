package present

import (
	"encoding/csv"
	"fmt"
	"io"
	"strconv"
	"strings"

	"lagwise/lint/result"
)

// ScreenText writes each series: its picture, its verdict, and the evidence.
func ScreenText(w io.Writer, all []result.Screened) error {
	var b strings.Builder
	for i, s := range all {
		if i > 0 {
			b.WriteByte('\n')
		}
		writeScreened(&b, &s)
	}
	if len(all) == 0 {
		b.WriteString("No series was found.\n")
	}
	_, err := io.WriteString(w, b.String())
	return err
}

func writeScreened(b *strings.Builder, s *result.Screened) {
	head := safe(s.Name)
	if s.Unit != "" {
		head += " (" + safe(s.Unit) + ")"
	}
	if s.Error != "" {
		fmt.Fprintln(b, apart(head, visible(s.Manifest), textWidth))
		fmt.Fprintln(b, "  not screened: "+visible(s.Error))
		return
	}
	head += fmt.Sprintf("   %s   %s   n %d", period(s.First, s.Last), s.Step, s.N)
	fmt.Fprintln(b, apart(head, visible(s.Manifest), textWidth))
	rows := [][]string{
		{"  levels", Spark(s.Levels, 40), s.Verdict},
		{"  differences", Spark(s.Differences, 40), s.VerdictOnDifferences},
	}
	for _, line := range aligned(rows) {
		fmt.Fprintln(b, line)
	}
	for _, line := range screenLines(s) {
		fmt.Fprintln(b, "  "+line)
	}
}

func screenLines(s *result.Screened) []string {
	var lines []string
	if s.Mean != nil && s.SD != nil {
		lines = append(lines, fmt.Sprintf("mean %s, sd %s, %s missing, %s%s", result.Number(*s.Mean), result.Number(*s.SD),
			strconv.Itoa(s.Missing), counted(s.Gaps, "gap"), evenWords(s.Even)))
	}
	if len(s.Autocorrelation) > 0 {
		line := "autocorrelation, lag 1: " + result.Coef(s.Autocorrelation[0])
		if s.EffectiveN != nil {
			line += fmt.Sprintf("; %d values count as %s", s.N, result.Count(*s.EffectiveN))
		}
		lines = append(lines, line)
	}
	for _, t := range s.Tests {
		lines = append(lines, testLine(t))
	}
	if t := s.Trend; t != nil && t.SenSlope != nil {
		line := fmt.Sprintf("Theil-Sen slope %s per %s", result.Number(*t.SenSlope), t.Per)
		if t.MannKendall.P != nil {
			line += "; Mann-Kendall, corrected for autocorrelation: " + pWords(t.MannKendall.P, "")
		}
		lines = append(lines, line)
	}
	if s.Season.Strength != nil {
		lines = append(lines, fmt.Sprintf("season of %d steps: strength %s, %s", *s.Season.Steps, result.Coef(*s.Season.Strength), s.Season.Kind))
	}
	return append(lines, s.Cautions...)
}

func evenWords(even bool) string {
	if even {
		return ""
	}
	return ", uneven steps"
}

// testLine writes a test with its null and how it was taken.
func testLine(t result.Test) string {
	line := fmt.Sprintf("%s of %s", t.Test, t.Of)
	if t.Terms != "" {
		line += ", " + t.Terms
	}
	switch {
	case t.Lags != nil:
		line += fmt.Sprintf(", %s", counted(*t.Lags, "lag"))
	case t.Bandwidth != nil:
		line += fmt.Sprintf(", bandwidth %d", *t.Bandwidth)
	}
	if t.Statistic == nil {
		return line + ": not computed: " + t.Error
	}
	return fmt.Sprintf("%s: %s, %s (null: %s)", line, statistic(*t.Statistic), pWords(t.P, t.PBound), t.Null)
}

// ScreenCSV writes one row a series.
func ScreenCSV(w io.Writer, all []result.Screened) error {
	out := csv.NewWriter(w)
	_ = out.Write([]string{"manifest", "series", "record", "column", "unit", "n", "missing", "first", "last", "step", "gaps", "mean", "sd",
		"lag-1", "effective-n", "verdict", "verdict-on-differences", "error"})
	for _, s := range all {
		lagOne := ""
		if len(s.Autocorrelation) > 0 {
			lagOne = cellOf(&s.Autocorrelation[0])
		}
		_ = out.Write([]string{text(s.Manifest), text(s.Name), text(s.Record), text(s.Column), text(s.Unit), strconv.Itoa(s.N), strconv.Itoa(s.Missing),
			s.First, s.Last, s.Step, strconv.Itoa(s.Gaps), cellOf(s.Mean), cellOf(s.SD), lagOne, cellOf(s.EffectiveN), s.Verdict, s.VerdictOnDifferences, text(s.Error)})
	}
	out.Flush()
	return out.Error()
}

// ScreenMarkdown writes one table of all series.
func ScreenMarkdown(w io.Writer, all []result.Screened) error {
	var b strings.Builder
	b.WriteString("| series | n | span | lag 1 | verdict | on differences |\n|---|---|---|---|---|---|\n")
	for _, s := range all {
		lagOne := ""
		if len(s.Autocorrelation) > 0 {
			lagOne = result.Coef(s.Autocorrelation[0])
		}
		verdict := s.Verdict
		if s.Error != "" {
			verdict = "not screened: " + escaped(s.Error)
		}
		fmt.Fprintf(&b, "| %s | %d | %s | %s | %s | %s |\n", escaped(safe(s.Name)), s.N, escaped(period(s.First, s.Last)), lagOne, verdict, s.VerdictOnDifferences)
	}
	_, err := io.WriteString(w, b.String())
	return err
}
