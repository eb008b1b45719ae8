package request

import (
	"maps"
	"slices"
	"strconv"
	"strings"

	"lagwise/lint/document"
)

// written returns the value of a key of a request as TOML, as short as it can
// be said; "" where the key is absent or at its default. The default of
// errors depends on the estimator, so a process of the errors is always
// spelled out.
func (r *Request) written(key string) string {
	if _, ok := schemaIndex[[2]string{r.Kind.String(), key}]; !ok {
		return ""
	}
	switch key {
	case "name":
		return word(r.Name, "")
	case "question":
		return word(r.Question, "")
	case "aim":
		return word(r.Aim, "")
	case "expected":
		return word(r.Expected, "")
	case "planned":
		if r.Planned != nil {
			return strconv.FormatBool(*r.Planned)
		}
	case "time-scale":
		return length(r.TimeScale, "")
	case "on":
		if len(r.On) > 0 {
			return FormatOn(r.On)
		}
	case "on-each":
		return r.writtenOnEach()
	default:
		if sampled, ok := r.writtenSample(key); ok {
			return sampled
		}
		if r.Kind == Regression {
			return r.writtenRegression(key)
		}
		return r.writtenCorrelation(key)
	}
	return ""
}

func (r *Request) writtenCorrelation(key string) string {
	switch key {
	case "between":
		return list(r.Between)
	case "given":
		return list(r.Given)
	case "remove-from":
		return word(r.RemoveFrom, "both")
	case "coefficient":
		return word(r.Coefficient, "pearson")
	case "inference":
		return word(r.Inference, "usual")
	case "replicates":
		if r.Replicates != 2000 && r.Replicates != 0 {
			return strconv.Itoa(r.Replicates)
		}
	case "lag":
		if r.Lag != 0 {
			return strconv.Itoa(r.Lag)
		}
	case "lags":
		if r.Lags != nil {
			return "{ from = " + strconv.Itoa(r.Lags.From) + ", to = " + strconv.Itoa(r.Lags.To) + " }"
		}
	}
	return ""
}

func (r *Request) writtenRegression(key string) string {
	switch key {
	case "response":
		return word(r.Response, "")
	case "predictors":
		return predictorList(r.Predictors)
	case "estimator":
		return word(r.Estimator, "ols")
	case "errors":
		return word(r.Errors, Independent)
	case "likelihood":
		return word(r.Likelihood, "reml")
	case "standard-errors":
		return word(r.StandardErrors, "usual")
	case "trend":
		return flag(r.Trend)
	case "seasonal-terms":
		return flag(r.SeasonalTerms)
	case "form":
		return word(r.Form, "static")
	}
	return ""
}

// writtenSample writes the keys that say which values a request uses.
func (r *Request) writtenSample(key string) (toml string, ok bool) {
	switch key {
	case "every":
		return length(r.Every, ""), true
	case "aggregate":
		return word(r.Aggregate, ""), true
	case "least-share":
		if r.LeastShare != 0.8 && r.LeastShare != 0 {
			return plain(r.LeastShare), true
		}
		return "", true
	case "year-starts":
		return word(r.YearStarts, "01-01"), true
	case "tolerance":
		return length(r.Tolerance, "0"), true
	case "grid":
		if r.Grid != nil {
			return "{ step = " + plain(r.Grid.Step) + ", by = " + document.Quote(r.Grid.By) + " }", true
		}
		return "", true
	case "from":
		return word(r.From, ""), true
	case "until":
		return word(r.Until, ""), true
	case "groups":
		if len(r.GroupList) > 0 {
			return formatList(r.GroupList), true
		}
		return word(r.Groups, "within"), true
	}
	return "", false
}

func (r *Request) writtenOnEach() string {
	if len(r.OnEach) == 0 {
		return ""
	}
	var parts []string
	for _, series := range slices.Sorted(maps.Keys(r.OnEach)) {
		parts = append(parts, quoteKey(series)+" = "+formatTransforms(r.OnEach[series]))
	}
	return "{ " + strings.Join(parts, ", ") + " }"
}

func predictorList(predictors []Predictor) string {
	if len(predictors) == 0 {
		return ""
	}
	items := make([]string, len(predictors))
	for i, p := range predictors {
		items[i] = predictorItem(p)
	}
	return "[" + strings.Join(items, ", ") + "]"
}

func predictorItem(p Predictor) string {
	if p.Lag == 0 {
		return document.Quote(p.Series)
	}
	return "{ series = " + document.Quote(p.Series) + ", lag = " + strconv.Itoa(p.Lag) + " }"
}

func word(s, otherwise string) string {
	if s == otherwise || s == "" {
		return ""
	}
	return document.Quote(s)
}

// length writes a duration as text and a size as a number.
func length(s, otherwise string) string {
	if _, err := ParsePeriod(s); err == nil || s == otherwise {
		return word(s, otherwise)
	}
	return s
}

func flag(v bool) string {
	if v {
		return "true"
	}
	return ""
}

func list(words []string) string {
	if len(words) == 0 {
		return ""
	}
	return formatList(words)
}

// quoteKey writes a key bare where TOML allows it.
func quoteKey(key string) string {
	for _, r := range key {
		switch {
		case r >= 'a' && r <= 'z', r >= 'A' && r <= 'Z', r >= '0' && r <= '9', r == '-', r == '_':
		default:
			return document.Quote(key)
		}
	}
	if key == "" {
		return `""`
	}
	return key
}

// Changed lists the keys in which two requests differ, in the order of the
// schema; of requests of two kinds, those of the first kind come first. A
// name is no difference, nor are deviations.
func Changed(from, to *Request) []string {
	var changed []string
	for _, key := range requestKeys(from.Kind, to.Kind) {
		if key != "name" && from.written(key) != to.written(key) {
			changed = append(changed, key)
		}
	}
	return changed
}

// requestKeys lists the keys of one kind or two, deviations apart.
func requestKeys(kinds ...Kind) []string {
	var tables [][]Key
	for _, k := range kinds {
		tables = append(tables, schemaTables[k.String()])
	}
	return slices.DeleteFunc(names(tables...), func(key string) bool { return key == "deviation" })
}
