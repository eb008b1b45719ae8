package present

import (
	"encoding/csv"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"

	"lagwise/lint/result"
)

// ComputeCSV writes one row a term: of each result its three outcomes, and of
// a regression each coefficient of them.
func ComputeCSV(w io.Writer, all []result.Computed) error {
	out := csv.NewWriter(w)
	_ = out.Write([]string{"file", "request", "kind", "first", "second", "which", "on", "method", "of", "estimate", "lower", "upper",
		"statistic", "df", "p", "p-bound", "n", "effective-n", "from", "until", "error"})
	for _, c := range all {
		for _, which := range []struct {
			name string
			o    *result.Outcome
		}{{"on-levels", c.OnLevels}, {"as-written", c.AsWritten}, {"recommended", c.Recommended}} {
			if which.o != nil {
				writeOutcomeRows(out, &c, which.name, which.o)
			}
		}
	}
	out.Flush()
	return out.Error()
}

func writeOutcomeRows(out *csv.Writer, c *result.Computed, which string, o *result.Outcome) {
	first, second := "", ""
	if c.Pair != nil {
		first, second = c.Pair[0], c.Pair[1]
	}
	row := func(of string, estimate, statistic, df, p, n *float64, i *[2]float64) {
		lower, upper := "", ""
		if i != nil {
			lower, upper = cellOf(&i[0]), cellOf(&i[1])
		}
		_ = out.Write([]string{text(c.File), text(c.Request), c.Kind, text(first), text(second), which, strings.Join(o.On, " "), method(o), text(of),
			cellOf(estimate), lower, upper, cellOf(statistic), cellOf(df), cellOf(p), string(o.PBound), strconv.Itoa(o.N), cellOf(n), o.From, o.Until, text(o.Error)})
	}
	if len(o.Coefficients) == 0 {
		row(symbolOf(o), o.Estimate, o.Statistic, o.DF, o.P, o.EffectiveN, o.Interval)
		return
	}
	for _, k := range o.Coefficients {
		row(k.Of, k.Estimate, k.Statistic, k.DF, k.P, k.EffectiveN, k.Interval)
	}
}

func method(o *result.Outcome) string {
	if o.Coefficient != "" {
		return o.Coefficient + " " + o.Inference
	}
	return o.Estimator + " " + o.StandardErrors
}

// text is a cell that a spreadsheet must not take for a formula.
func text(s string) string {
	s = visible(s)
	if s != "" && strings.ContainsRune("=+-@\t", rune(s[0])) {
		return "'" + s
	}
	return s
}

func cellOf(v *float64) string {
	if v == nil || math.IsNaN(*v) || math.IsInf(*v, 0) {
		return ""
	}
	return strconv.FormatFloat(*v, 'g', 12, 64)
}

// ComputeMarkdown writes one table of all results.
func ComputeMarkdown(w io.Writer, all []result.Computed) error {
	var b strings.Builder
	b.WriteString("| request | pair | values | estimate | interval | p | n |\n|---|---|---|---|---|---|---|\n")
	for _, c := range all {
		pair := ""
		if c.Pair != nil {
			pair = escaped(c.Pair[0]) + " and " + escaped(c.Pair[1])
		}
		for _, which := range []struct {
			name string
			o    *result.Outcome
		}{{"on levels", c.OnLevels}, {"as written", c.AsWritten}, {"recommended", c.Recommended}} {
			if o := which.o; o != nil {
				estimate, interval := estimateWords(symbolOf(o), o)
				if o.Error != "" {
					estimate = "not computed: " + escaped(o.Error)
				}
				fmt.Fprintf(&b, "| %s | %s | %s: %s | %s | %s | %s | %s |\n", escaped(safe(c.Request)), pair, which.name, methodWords(o),
					estimate, interval, escaped(pWords(o.P, o.PBound)), nWords(o))
			}
		}
	}
	_, err := io.WriteString(w, b.String())
	return err
}
