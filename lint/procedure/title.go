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
	t := "Correlate " + onWords(r.On)
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
		t = fmt.Sprintf("Fit %s by GLS with %s errors", onWords(r.On), strings.ToUpper(r.Errors))
	} else {
		t = fmt.Sprintf("Regress %s by least squares", onWords(r.On))
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

// plural is how the values are called after a step.
var plural = map[string]string{
	request.Log:                 "logarithms",
	request.Anomalies:           "anomalies",
	request.Detrended:           "detrended values",
	request.FirstDifferences:    "first differences",
	request.SeasonalDifferences: "seasonal differences",
	request.RatesOfChange:       "rates of change",
	request.Increments:          "increments",
	request.Prewhitened:         "prewhitened values",
	request.Standardized:        "standardized values",
}

// onWords names the values after the transforms: "first differences of
// anomalies". The last step comes first.
func onWords(on []request.Transform) string {
	if len(on) == 0 {
		return "levels"
	}
	if len(on) >= 2 && on[len(on)-1] == on[len(on)-2] && on[len(on)-1].Name == request.FirstDifferences {
		words := "second differences"
		if len(on) > 2 {
			words += " of " + onWords(on[:len(on)-2])
		}
		return words
	}
	words, known := plural[on[len(on)-1].Name]
	if !known {
		words = on[len(on)-1].String()
	}
	if len(on) > 1 {
		words += " of " + onWords(on[:len(on)-1])
	}
	return words
}

// OnWords names the values that a request relates: "levels", "first
// differences of anomalies".
func OnWords(on []request.Transform) string { return onWords(on) }
