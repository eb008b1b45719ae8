package present

import (
	"fmt"
	"strings"

	"lagwise/lint/evidence"
	"lagwise/lint/result"
)

// pWords writes a p-value for a table: "p 0.67", "p < 0.001", "p <= 0.01".
func pWords(p *float64, bound result.Bound) string {
	if p == nil {
		return ""
	}
	return strings.Replace(result.P(*p, bound), "p = ", "p ", 1)
}

// estimateWords writes an estimate with its interval: "r -0.93  (-0.96 to -0.88)".
func estimateWords(symbol string, o *result.Outcome) (estimate, interval string) {
	if o.Estimate == nil {
		return "", ""
	}
	write := result.Coef
	if o.Coefficient == "" {
		write = result.Number
	}
	estimate = symbol + " " + write(*o.Estimate)
	if o.Interval != nil {
		interval = fmt.Sprintf("(%s to %s)", write(o.Interval[0]), write(o.Interval[1]))
	}
	return estimate, interval
}

// nWords writes n, and the effective n where it is used.
func nWords(o *result.Outcome) string {
	n := fmt.Sprintf("n %d", o.N)
	if o.EffectiveN != nil {
		n += " counting as " + result.Count(*o.EffectiveN)
	}
	return n
}

// testWords writes a test for the line of a series: "ADF -1.2, p 0.66".
func testWords(t result.Test) string {
	name := t.Test
	if name == evidence.ADFName {
		name = "ADF"
	}
	if t.Terms == "constant and trend" {
		name += " (trend)"
	}
	if t.Statistic == nil {
		return name + " not computed"
	}
	return fmt.Sprintf("%s %s, %s", name, statistic(*t.Statistic), pWords(t.P, t.PBound))
}

func statistic(v float64) string {
	switch {
	case v > -10 && v < 10:
		return fmt.Sprintf("%.2f", v)
	}
	return result.Number(v)
}
