package stats_test

import (
	"math"
	"strings"

	"lagwise/stats/association"
	"lagwise/stats/distribution"
	"lagwise/stats/multiple"
	"lagwise/stats/regression"
	"lagwise/stats/residual"
)

// modelDrivers drive the methods that relate series: correlation, regression
// and the checks on residuals.
var modelDrivers = map[string]driver{
	"pearson":                 drivePearson,
	"spearman":                driveSpearman,
	"kendall":                 driveKendall,
	"partial":                 driveGiven,
	"semipartial":             driveGiven,
	"effective-n-correlation": driveEffectiveN,
	"ols":                     driveOLS,
	"nist-regression":         driveNIST,
	"hac":                     driveHAC,
	"gls":                     driveGLS,
	"gls-boundary":            driveBoundary,
	"gls-two-maxima":          driveGLS,
	"durbin-watson":           driveDurbinWatson,
	"breusch-godfrey":         driveBreuschGodfrey,
	"reset":                   driveRESET,
	"breusch-pagan":           driveBreuschPagan,
	"white":                   driveWhite,
	"shapiro-wilk":            driveShapiroWilk,
	"influence":               driveInfluence,
	"vif":                     driveVIF,
	"p-adjust":                driveAdjust,
}

// unserved reports a case whose kind of errors is not computed: it counts as
// one without a driver.
func unserved(c refCase) bool {
	return strings.HasPrefix(c.Method, "gls") && errorOrder(c) == 0
}

// errorOrder is p of a case with AR(p) errors, else 0.
func errorOrder(c refCase) int {
	kind := c.text("kind")
	if len(kind) < 3 || kind[:2] != "ar" {
		return 0
	}
	p := 0
	for _, digit := range kind[2:] {
		if digit < '0' || digit > '9' {
			return 0
		}
		p = 10*p + int(digit-'0')
	}
	return p
}

// differenced reports whether the case takes first differences.
func (c refCase) differenced() bool {
	return strings.HasPrefix(c.text("transform"), "first-differences")
}

// together are the complete rows of columns, differenced where the case says.
func (c refCase) together(data refData, names ...string) [][]float64 {
	columns := data.complete(names...)
	if c.differenced() {
		for j, x := range columns {
			d := make([]float64, len(x)-1)
			for i := range d {
				d[i] = x[i+1] - x[i]
			}
			columns[j] = d
		}
	}
	return columns
}

func (c refCase) pair(data refData) (x, y []float64, runs []int) {
	p := c.together(data, c.column("x"), c.column("y"))
	return p[0], p[1], []int{len(p[0])}
}

func drivePearson(c refCase, data refData) (map[string]any, error) {
	x, y, runs := c.pair(data)
	r, err := association.Pearson(x, y, runs, association.Inference{})
	return map[string]any{"n": r.N, "r": r.Estimate, "t": r.Statistic, "df": r.DF, "p": r.P,
		"lower": r.Lower, "upper": r.Upper}, err
}

func driveSpearman(c refCase, data refData) (map[string]any, error) {
	x, y, runs := c.pair(data)
	exact := strings.HasPrefix(c.text("p_value"), "exact")
	r, err := association.Spearman(x, y, runs, association.Inference{Approximate: !exact})
	return map[string]any{"n": r.N, "rho": r.Estimate, "t": r.Statistic, "sum_d2": r.Statistic, "p": r.P}, err
}

func driveKendall(c refCase, data refData) (map[string]any, error) {
	x, y, runs := c.pair(data)
	exact := strings.HasPrefix(c.text("p_value"), "exact")
	r, err := association.Kendall(x, y, runs, association.Inference{Approximate: !exact})
	pairs := float64(r.N*(r.N-1)) / 2
	return map[string]any{"n": r.N, "tau_b": r.Estimate, "z": r.Statistic, "p": r.P,
		"concordant": (pairs + r.Statistic) / 2}, err
}

func driveGiven(c refCase, data refData) (map[string]any, error) {
	names := append([]string{c.column("x"), c.column("y")}, c.columns("given")...)
	columns := c.together(data, names...)
	if c.text("coefficient") == "spearman" {
		// The cases rank the binary values as they are, broken ties and all.
		for j, x := range columns {
			columns[j] = association.Ranks(x)
		}
	}
	x, y, given := columns[0], columns[1], columns[2:]
	runs := []int{len(x)}
	inf := association.Inference{OwnTest: true}
	var r association.Result
	var err error
	switch from := c.text("remove_from"); {
	case strings.HasPrefix(from, "first"):
		r, err = association.Semipartial(x, y, given, runs, "first", "pearson", inf)
	case strings.HasPrefix(from, "second"):
		r, err = association.Semipartial(x, y, given, runs, "second", "pearson", inf)
	default:
		r, err = association.Partial(x, y, given, runs, "pearson", inf)
	}
	return map[string]any{"n": r.N, "r": r.Estimate, "t": r.Statistic, "df": r.DF, "p": r.P,
		"lower": r.Lower, "upper": r.Upper}, err
}

func driveEffectiveN(c refCase, data refData) (map[string]any, error) {
	x, y, runs := c.pair(data)
	rule := association.LagOne
	if strings.Contains(c.text("formula"), "sum_{j=1}") {
		rule = association.Weighted
		if strings.Contains(c.text("formula"), "scaled") {
			rule = association.WeightedScaled
		}
	}
	n, raw, err := association.EffectiveNBy(rule, x, y, runs)
	if err != nil {
		return nil, err
	}
	r, err := association.Pearson(x, y, runs, association.Inference{})
	out := map[string]any{"n": len(x), "r": r.Estimate, "n_effective_uncapped": raw, "n_effective": n}
	if n > 2 {
		t := r.Estimate * math.Sqrt((n-2)/(1-r.Estimate*r.Estimate))
		out["t"], out["df"], out["p"] = t, n-2, distribution.TTwoSided(t, n-2)
	}
	return out, err
}

func driveAdjust(c refCase, data refData) (map[string]any, error) {
	adjust := map[string]func([]float64) []float64{
		"holm": multiple.Holm, "hochberg": multiple.Hochberg, "bonferroni": multiple.Bonferroni,
		"BH": multiple.BenjaminiHochberg, "BY": multiple.BenjaminiYekutieli,
	}[c.text("method")]
	return map[string]any{"adjusted": adjust(data.complete(c.column("p"))[0])}, nil
}

func driveShapiroWilk(c refCase, data refData) (map[string]any, error) {
	x := c.together(data, c.column("y"))[0]
	w, p, err := residual.ShapiroWilk(x)
	return map[string]any{"W": w, "p": p, "n": len(x)}, err
}

// design is the regression of the case.
func (c refCase) design(data refData) regression.Design {
	names := append([]string{c.column("response")}, c.columns("predictors")...)
	columns := c.together(data, names...)
	if rows, ok := c.Options["rows"].([]any); ok {
		from, to := int(rows[0].(float64))-1, int(rows[1].(float64))
		for j := range columns {
			columns[j] = columns[j][from:to]
		}
	}
	d := regression.Design{Y: columns[0], X: columns[1:], Runs: []int{len(columns[0])}}
	if group := c.columns("group"); group != nil {
		d.Runs = nil
		of := data.text[group[0]]
		for i := range of {
			if i+1 == len(of) || of[i+1] != of[i] {
				d.Runs = append(d.Runs, i+1)
			}
		}
	}
	return d
}
