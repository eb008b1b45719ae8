package request

// plural is how the values are called after a step.
var plural = map[string]string{
	Log:                 "logarithms",
	Anomalies:           "anomalies",
	Detrended:           "detrended values",
	FirstDifferences:    "first differences",
	SeasonalDifferences: "seasonal differences",
	RatesOfChange:       "rates of change",
	Increments:          "increments",
	Prewhitened:         "prewhitened values",
	Standardized:        "standardized values",
}

// OnWords names the values that a request relates: "levels", "first
// differences of anomalies". The last step comes first.
func OnWords(on []Transform) string {
	if len(on) == 0 {
		return "levels"
	}
	if len(on) >= 2 && on[len(on)-1] == on[len(on)-2] && on[len(on)-1].Name == FirstDifferences {
		words := "second differences"
		if len(on) > 2 {
			words += " of " + OnWords(on[:len(on)-2])
		}
		return words
	}
	words, known := plural[on[len(on)-1].Name]
	if !known {
		words = on[len(on)-1].String()
	}
	if len(on) > 1 {
		words += " of " + OnWords(on[:len(on)-1])
	}
	return words
}
