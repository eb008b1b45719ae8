package rules

import (
	_ "embed"
	"fmt"

	"lagwise/lint"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

//go:embed unaccepted_method.md
var unacceptedMethodPage string

var unacceptedMethod = lint.Rule{
	Name:     "unaccepted-method",
	Title:    "A method that the lab does not accept",
	Page:     unacceptedMethodPage,
	Severity: finding.Warning,
	Scope:    lint.OfRequest,
	Need:     lint.Text,
	Mendable: true,
	Run:      tellUnacceptedMethod,
}

// tellUnacceptedMethod speaks once a request: at the first key that the lab
// does not accept, and of the others in the detail.
func tellUnacceptedMethod(q *lint.Inquiry) {
	if q.Conventions == nil {
		return
	}
	breaches := breachesOf(q.Request, &q.Conventions.Accepted)
	if len(breaches) == 0 {
		return
	}
	f := finding.Finding{At: q.Request.Key(breaches[0].key), Message: breaches[0].message}
	for i, b := range breaches[1:] {
		if i > 0 {
			f.Detail += " "
		}
		f.Detail += b.message
	}
	q.Report(f)
}

type breach struct{ key, message string }

func breachesOf(r *request.Asked, accepted *request.Accepted) []breach {
	var found []breach
	correlation := r.Kind == request.Correlation
	if correlation && !accepts(accepted.Coefficient, r.Coefficient) {
		found = append(found, notAccepted("coefficient", r.Coefficient, accepted.Coefficient))
	}
	if !correlation && !accepts(accepted.Estimator, r.Estimator) {
		found = append(found, notAccepted("estimator", r.Estimator, accepted.Estimator))
	}
	if !acceptsAny(accepted.On, r.On) {
		found = append(found, breach{"on", fmt.Sprintf("The lab's conventions ask for one of %s in `on`.",
			list(accepted.On, "or"))})
	}
	if always := accepted.AlwaysDifference; correlation && always != nil && *always && !evidence.Differences(r.On) {
		found = append(found, breach{"on", "The lab's conventions accept a correlation on differences only: " +
			"first-differences, rates-of-change or seasonal-differences in `on`."})
	}
	return found
}

func notAccepted(key, value string, accepted []string) breach {
	return breach{key, fmt.Sprintf("The lab's conventions do not accept %s = %q here; they accept %s.",
		key, value, list(accepted, "or"))}
}

// accepts reports whether the list holds the value; no list accepts all.
func accepts(list []string, value string) bool {
	for _, v := range list {
		if v == value {
			return true
		}
	}
	return list == nil
}

// acceptsAny reports whether one of the transforms is in the list; the levels
// are accepted where the list names them.
func acceptsAny(list []string, on []request.Transform) bool {
	if list == nil {
		return true
	}
	if len(on) == 0 {
		return accepts(list, "levels")
	}
	for _, t := range on {
		if accepts(list, t.Name) || accepts(list, t.String()) {
			return true
		}
	}
	return false
}
