package engine

import (
	"fmt"

	"lagwise/lint/result"
)

// gives writes what a request yields, rounded as the field does:
// "r = -0.06, p = 0.67, n = 53".
func gives(o *result.Outcome) string {
	text := ""
	if o.Estimate != nil {
		text = estimate(o) + ", "
	}
	if o.P != nil {
		text += result.P(*o.P, o.PBound) + ", "
	}
	return text + fmt.Sprintf("n = %d", o.N)
}

func estimate(o *result.Outcome) string {
	symbols := map[string]string{"pearson": "r", "spearman": "rho", "kendall": "tau"}
	if symbol, correlation := symbols[o.Coefficient]; correlation {
		return symbol + " = " + result.Coef(*o.Estimate)
	}
	return "slope = " + result.Number(*o.Estimate)
}
