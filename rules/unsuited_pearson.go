package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
	"lagwise/lint/result"
)

//go:embed unsuited_pearson.md
var unsuitedPearsonPage string

var unsuitedPearson = lint.Rule{
	Name:     "unsuited-pearson",
	Title:    "Pearson's coefficient on a scatter that does not suit it",
	Page:     unsuitedPearsonPage,
	Severity: finding.Warning,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Mendable: true,
	Run: func(q *lint.Inquiry) {
		r := q.Case.Req()
		if r.Kind != request.Correlation || r.Coefficient != "pearson" || drifts(q) {
			return
		}
		var first string
		pairs, _ := pairsWith(q, func(i, j int) bool {
			s, err := q.Case.Scatter(i, j)
			if err != nil {
				return false
			}
			reason := s.Reason(q.Case.Settings)
			if reason != "" && first == "" {
				first = scatterMessage(reason, s)
			}
			return reason != ""
		})
		if len(pairs) == 0 {
			return
		}
		f := place(q, "coefficient")
		f.Pairs, f.Message = pairs, first
		if len(pairs) > 1 {
			f.Detail = "Concerned are " + pairWords(pairs) + "; the number is that of the first."
		}
		q.Report(f)
	},
}

func scatterMessage(reason string, s evidence.Scatter) string {
	const advice = " A rank coefficient has more power here and does not hang on a few values."
	odd := s.X
	if s.Y.P < s.X.P {
		odd = s.Y
	}
	switch reason {
	case "curved":
		return fmt.Sprintf("The scatter is curved (Cohen's f2 %s beyond the line).", result.Coef(s.Curvature)) + advice
	case "skewed":
		return fmt.Sprintf("The values are skewed (skewness %s).", result.Coef(odd.Skewness)) + advice
	case "heavy-tailed":
		return fmt.Sprintf("The values have heavy tails (excess kurtosis %s).", result.Coef(odd.ExcessKurtosis)) + advice
	}
	return fmt.Sprintf("Spearman's coefficient and Pearson's lie %s apart: a few values carry the latter.", result.Coef(s.Difference)) + advice
}
