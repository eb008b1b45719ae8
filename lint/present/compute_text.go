package present

import (
	"fmt"
	"io"
	"strings"

	"lagwise/lint/result"
)

// ComputeText writes what requests give: on levels, as written, as
// recommended, side by side.
func ComputeText(w io.Writer, all []result.Computed) error {
	var b strings.Builder
	for i, c := range all {
		if i > 0 {
			b.WriteByte('\n')
		}
		writeComputed(&b, &c)
	}
	if len(all) == 0 {
		b.WriteString("No request was found.\n")
	}
	_, err := io.WriteString(w, b.String())
	return err
}

func writeComputed(b *strings.Builder, c *result.Computed) {
	name := safe(c.Request)
	if c.Pair != nil {
		name += "   " + safe(c.Pair[0]) + " and " + safe(c.Pair[1])
	}
	fmt.Fprintln(b, apart(name+"   "+c.Kind, visible(c.File), textWidth))
	var rows [][]string
	add := func(label string, o *result.Outcome) {
		if o != nil {
			rows = append(rows, outcomeCells("  "+label, o))
		}
	}
	add("on levels", c.OnLevels)
	add("as written", c.AsWritten)
	if c.Recommended != nil && len(c.Changed) > 0 {
		add("recommended", c.Recommended)
	}
	for _, line := range aligned(rows) {
		fmt.Fprintln(b, line)
	}
	best := c.Recommended
	if best == nil {
		best = c.AsWritten
	}
	if best == nil {
		return
	}
	writeCoefficients(b, best)
	fmt.Fprintln(b, "  "+Sentence(c))
	for _, caution := range best.Cautions {
		fmt.Fprintln(b, "  "+visible(caution))
	}
}

func outcomeCells(label string, o *result.Outcome) []string {
	if o.Error != "" {
		return []string{label, methodWords(o), "not computed: " + visible(o.Error)}
	}
	estimate, interval := estimateWords(symbolOf(o), o)
	return []string{label, methodWords(o), estimate, interval, pWords(o.P, o.PBound), nWords(o)}
}

func symbolOf(o *result.Outcome) string {
	switch o.Coefficient {
	case "pearson":
		return "r"
	case "spearman":
		return "rho"
	case "kendall":
		return "tau"
	}
	return "slope"
}

// methodWords says on which values and by which method.
func methodWords(o *result.Outcome) string {
	of := "levels"
	if len(o.On) > 0 {
		of = strings.Join(o.On, ", ")
	}
	switch {
	case o.ErrorProcess != nil:
		return of + "; GLS " + o.ErrorProcess.Process
	case o.Inference != "usual" && o.Inference != "":
		return of + "; " + o.Inference
	}
	return of
}

// writeCoefficients writes the table of a regression with more to tell than
// its first slope.
func writeCoefficients(b *strings.Builder, o *result.Outcome) {
	if len(o.Coefficients) == 0 || o.Error != "" {
		return
	}
	rows := [][]string{{"    coefficient", "estimate", "std. error", "t", "df", "p"}}
	for _, c := range o.Coefficients {
		if c.Role == "season" || c.Estimate == nil {
			continue
		}
		name := safe(c.Of)
		if c.Lag > 0 {
			name += fmt.Sprintf(" (lag %d)", c.Lag)
		}
		rows = append(rows, []string{"    " + name, result.Number(*c.Estimate), result.Number(*c.StandardError),
			fmt.Sprintf("%.2f", *c.Statistic), result.Count(*c.DF), strings.TrimPrefix(pWords(c.P, ""), "p ")})
	}
	for _, line := range aligned(rows) {
		fmt.Fprintln(b, line)
	}
}

// Sentence says in plain words what a request gives under the method that is
// recommended, or as it is written.
func Sentence(c *result.Computed) string {
	o := c.Recommended
	if o == nil {
		o = c.AsWritten
	}
	if o == nil || o.Error != "" || o.P == nil {
		return "Nothing can be said on these data."
	}
	what := safe(c.Response) + " and " + firstPredictor(o)
	if c.Pair != nil {
		what = safe(c.Pair[0]) + " and " + safe(c.Pair[1])
	}
	by := " (" + methodWords(o) + ")"
	if *o.P < o.Alpha {
		words := fmt.Sprintf("%s are associated%s: %s, %s.", what, by, result.P(*o.P, o.PBound), nWords(o))
		if c.Recommended == nil {
			words = "As written, which the findings object to: " + words
		}
		return words
	}
	words := fmt.Sprintf("No evidence of an association between %s%s: %s, %s.", what, by, result.P(*o.P, o.PBound), nWords(o))
	if o.Detectable != nil {
		words += fmt.Sprintf(" A correlation of %s would have been found with 80 %% power.", result.Coef(*o.Detectable))
	}
	return words
}

// firstPredictor names the first predictor of a regression.
func firstPredictor(o *result.Outcome) string {
	for _, c := range o.Coefficients {
		if c.Role == "predictor" {
			return safe(c.Of)
		}
	}
	return "its predictor"
}
