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

//go:embed short_record.md
var shortRecordPage string

var shortRecord = lint.Rule{
	Name:     "short-record",
	Title:    "Fewer values than the request needs",
	Page:     shortRecordPage,
	Severity: finding.Information,
	Scope:    lint.OfRequest,
	Need:     lint.Data,
	Run: func(q *lint.Inquiry) {
		rows, err := q.Case.Rows()
		if err != nil {
			if evidence.IsTooShort(err) {
				reportTooShort(q, "Nothing is left to relate: "+err.Error()+".")
			}
			return
		}
		if q.Case.Req().Kind == request.Regression {
			shortRegression(q, rows)
			return
		}
		shortCorrelation(q, rows)
	},
}

func reportTooShort(q *lint.Inquiry, message string) {
	f := place(q, "from")
	f.Severity, f.Series, f.Message = finding.Error, q.Case.Names(), message
	q.Report(f)
}

// shortCorrelation speaks once: of the pairs that cannot be judged, else of
// the rows.
func shortCorrelation(q *lint.Inquiry, rows int) {
	least := max(q.Case.Settings.LeastN["correlation"], leastSeasons(q))
	var lowest float64
	pairs, columns := pairsWith(q, func(i, j int) bool {
		r, err := q.Case.Pair(i, j)
		if err != nil {
			return evidence.IsTooFewIndependent(err) || evidence.IsTooShort(err)
		}
		few := q.Case.Req().Inference == "effective-n" && r.EffectiveN < q.Case.Settings.LeastEffectiveN
		if few && (lowest == 0 || r.EffectiveN < lowest) {
			lowest = r.EffectiveN
		}
		return few
	})
	f := place(q, "from")
	switch {
	case len(pairs) > 0:
		f.Severity, f.Pairs = finding.Error, pairs
		f.Message = fmt.Sprintf("%d values count as %s: %s cannot be judged.", rows, fewWords(lowest), pairWords(pairs))
	case rows < least:
		f.Series = q.Case.Names()
		f.Message = fmt.Sprintf("%d values are left where at least %d are asked for.", rows, least)
		if all := q.Case.Pairs(); len(all) > 0 {
			columns = all
		}
		if len(columns) > 0 {
			if r, err := q.Case.Pair(columns[0][0], columns[0][1]); err == nil {
				if d := q.Case.Detectable(r); d != nil {
					f.Message += fmt.Sprintf(" The smallest correlation that they would find with 80 %% power is %s.", result.Coef(*d))
				}
			}
		}
	default:
		return
	}
	q.Report(f)
}

func fewWords(n float64) string {
	if n == 0 {
		return "too few independent ones"
	}
	return result.Count(n) + " independent ones"
}

// leastSeasons is how many values four full seasons hold, 0 without a season.
func leastSeasons(q *lint.Inquiry) int {
	frame, err := q.Case.Used()
	if err != nil {
		return 0
	}
	return 4 * frame.Season
}

// leastForEach is how many values each estimated coefficient asks for.
const leastForEach = 10

func shortRegression(q *lint.Inquiry, rows int) {
	fit, err := q.Case.Fit()
	if err != nil {
		if evidence.IsTooShort(err) || evidence.IsTooFewIndependent(err) {
			reportTooShort(q, fmt.Sprintf("%d values are too few for this regression: %s.", rows, err))
		}
		return
	}
	estimated := len(fit.Terms)
	if fit.GLS != nil {
		estimated += fit.GLS.Order
	}
	least := max(q.Case.Settings.LeastN["regression"], leastForEach*estimated, leastSeasons(q))
	if rows >= least {
		return
	}
	f := place(q, "from")
	f.Series = q.Case.Names()
	f.Message = fmt.Sprintf("%d values are left where at least %d are asked for (%s estimated).", rows, least, count(estimated, "coefficient is", "coefficients are"))
	q.Report(f)
}
