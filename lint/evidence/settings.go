package evidence

import (
	"fmt"
	"strconv"

	"lagwise/lint/request"
	"lagwise/stats/unitroot"
)

// Settings is what a lab's conventions say about the computing of evidence
// and the thresholds of rules.
type Settings struct {
	Alpha           float64
	ADFLags         unitroot.Lags
	KPSSBandwidth   int // below 0: chosen from the data
	LeastNVerdict   int
	LeastN          map[string]int // correlation, regression
	LeastEffectiveN float64
	Limits          map[string]float64
	// AlwaysDifference is the lab's word that levels are never accepted for a
	// correlation.
	AlwaysDifference bool
}

// DefaultSettings returns the defaults of the judgement.
func DefaultSettings() Settings {
	return Settings{
		Alpha:           0.05,
		ADFLags:         unitroot.Lags{Rule: unitroot.AIC, Max: -1},
		KPSSBandwidth:   -1,
		LeastNVerdict:   20,
		LeastN:          map[string]int{"correlation": 20, "regression": 30},
		LeastEffectiveN: 6,
	}
}

// Limit returns a threshold of `[limits]`, or its default.
func (s Settings) Limit(name string, standard float64) float64 {
	if v, ok := s.Limits[name]; ok {
		return v
	}
	return standard
}

// SettingsOf reads the settings out of merged conventions; nil gives the
// defaults. A value that cannot serve is a wrong-value problem, and the
// default stands.
func SettingsOf(c *request.Conventions) (Settings, []request.Problem) {
	s := DefaultSettings()
	if c == nil {
		return s, nil
	}
	var problems []request.Problem
	wrong := func(path, allowed string) {
		problems = append(problems, request.Problem{Rule: "wrong-value", At: c.Keys[path].Value,
			Message: fmt.Sprintf("%s takes %s.", path, allowed)})
	}
	if a := c.Review.Alpha; a != nil {
		if *a > 0 && *a < 0.5 {
			s.Alpha = *a
		} else {
			wrong("review.alpha", "a number above 0 and below 0.5")
		}
	}
	for kind, n := range c.Review.LeastN {
		s.LeastN[kind] = n
	}
	if n := c.Review.LeastEffectiveN; n != nil {
		s.LeastEffectiveN = max(3, *n)
	}
	if c.Tests.LeastNVerdict > 0 {
		s.LeastNVerdict = max(8, c.Tests.LeastNVerdict)
	}
	if always := c.Accepted.AlwaysDifference; always != nil {
		s.AlwaysDifference = *always
	}
	s.Limits = c.Limits
	var ok bool
	if s.ADFLags, ok = adfLags(c.Tests.ADFLags); !ok {
		wrong("test-settings.adf", "lags = aic, bic, general-to-specific, or a number of lags")
	}
	if s.KPSSBandwidth, ok = bandwidth(c.Tests.KPSSBandwidth); !ok {
		wrong("test-settings.kpss", "bandwidth = newey-west, or a number")
	}
	return s, problems
}

func adfLags(text string) (unitroot.Lags, bool) {
	switch text {
	case "", "aic":
		return unitroot.Lags{Rule: unitroot.AIC, Max: -1}, true
	case "bic":
		return unitroot.Lags{Rule: unitroot.BIC, Max: -1}, true
	case "general-to-specific":
		return unitroot.Lags{Rule: unitroot.GeneralToSpecific, Max: -1}, true
	}
	if k, err := strconv.Atoi(text); err == nil && k >= 0 {
		return unitroot.Lags{Rule: unitroot.Fixed, Fixed: k}, true
	}
	return unitroot.Lags{Rule: unitroot.AIC, Max: -1}, false
}

func bandwidth(text string) (int, bool) {
	if text == "" || text == "newey-west" {
		return -1, true
	}
	if k, err := strconv.Atoi(text); err == nil && k >= 0 {
		return k, true
	}
	return -1, false
}
