package procedure

import (
	"fmt"
	"strings"

	"lagwise/lint/request"
)

// title says what a request does, in the imperative.
func title(r request.Request) string {
	if r.Kind == request.Regression {
		return regressionTitle(r)
	}
	t := "Correlate " + request.OnWords(r.On)
	switch r.Inference {
	case "effective-n":
		t += ", with effective n"
	case "usual":
	default:
		t += ", with " + r.Inference
	}
	if r.Coefficient != "pearson" {
		t += ", by " + strings.ToUpper(r.Coefficient[:1]) + r.Coefficient[1:] + "'s coefficient"
	}
	return t
}

func regressionTitle(r request.Request) string {
	var t string
	if r.Estimator == "gls" {
		t = fmt.Sprintf("Fit %s by GLS with %s errors", request.OnWords(r.On), strings.ToUpper(r.Errors))
	} else {
		t = fmt.Sprintf("Regress %s by least squares", request.OnWords(r.On))
	}
	switch {
	case r.Trend && r.SeasonalTerms:
		t += ", a trend and seasonal terms"
	case r.Trend:
		t += " and a trend"
	case r.SeasonalTerms:
		t += " and seasonal terms"
	}
	switch r.StandardErrors {
	case "effective-n":
		t += ", with effective n"
	case "hac":
		t += ", with cosine HAC errors"
	}
	return t
}
