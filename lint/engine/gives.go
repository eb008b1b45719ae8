package engine

import (
	"fmt"
	"math"
	"strconv"

	"lagwise/lint/result"
)

// gives writes what a request yields, rounded as the field does:
// "r = -0.06, p = 0.67, n = 53".
func gives(o *result.Outcome) string {
	text := ""
	if o.Estimate != nil {
		text = fmt.Sprintf("%s = %s, ", symbolOf(o), rounded(o, *o.Estimate))
	}
	if o.P != nil {
		text += probability(*o.P, o.PBound) + ", "
	}
	return text + fmt.Sprintf("n = %d", o.N)
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

func rounded(o *result.Outcome, v float64) string {
	if o.Coefficient == "" {
		return strconv.FormatFloat(v, 'g', 3, 64)
	}
	return strconv.FormatFloat(math.Round(v*100)/100+0, 'f', 2, 64)
}

func probability(p float64, bound result.Bound) string {
	sign := "="
	switch {
	case bound == result.Bound("at-most"):
		sign = "<="
	case bound == result.Bound("at-least"):
		sign = ">="
	case p < 0.001:
		return "p < 0.001"
	}
	return "p " + sign + " " + strconv.FormatFloat(p, 'g', 2, 64)
}
