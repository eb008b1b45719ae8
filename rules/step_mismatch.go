package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed step_mismatch.md
var stepMismatchPage string

var stepMismatch = lint.Rule{
	Name:     "step-mismatch",
	Title:    "A declared step that the data do not keep",
	Page:     stepMismatchPage,
	Severity: finding.Warning,
	Scope:    lint.OfManifest,
	Need:     lint.Data,
	Run:      tellStepMismatch,
}

func tellStepMismatch(q *lint.Inquiry) {
	eachReadable(q, func(rec *request.Record, read *evidence.Read) {
		a := &read.Axis
		if a.Declared == "" || a.Step == "" || a.Ambiguous {
			return
		}
		same := sameStep(a.Declared, a.Step)
		if same && a.Even {
			return
		}
		f := finding.Finding{At: axisPlace(rec, "step"), Series: seriesRead(read)}
		if same {
			f.Message = fmt.Sprintf("The step is declared as %s, and the steps of column %s are uneven.", a.Declared, a.Column)
		} else {
			f.Message = fmt.Sprintf("The step is declared as %s, and column %s goes by %s.", a.Declared, a.Column, a.Step)
			f.Rewrites = measuredStep(q.File, rec, a)
		}
		q.Report(f)
	})
}

// measuredStep offers the measured step where an even one was found.
func measuredStep(file string, rec *request.Record, a *evidence.AxisSeen) []finding.Rewrite {
	if rec.Along == nil || !a.Even {
		return nil
	}
	p, written := rec.Along.Keys["step"]
	if !written {
		return nil
	}
	text := a.Step
	if _, number := asNumber(text); !number {
		text = document.Quote(text)
	}
	return []finding.Rewrite{textRewrite(file, "Declare the measured step "+a.Step, true,
		document.Edit{At: p.Value, Text: text})}
}

// sameStep compares two steps by what they mean: P12M is P1Y, 0.50 is 0.5.
func sameStep(a, b string) bool {
	if a == b {
		return true
	}
	if x, ok := asNumber(a); ok {
		y, ok := asNumber(b)
		return ok && (x-y)*(x-y) <= 1e-18*x*x
	}
	p, errA := request.ParsePeriod(a)
	r, errB := request.ParsePeriod(b)
	return errA == nil && errB == nil && p.Months == r.Months && seconds(p) == seconds(r)
}

func seconds(p request.Period) float64 { return float64(p.Days)*86400 + p.Seconds }

func asNumber(s string) (float64, bool) {
	var x float64
	var rest string
	n, _ := fmt.Sscanf(s, "%g%s", &x, &rest)
	return x, n == 1
}
