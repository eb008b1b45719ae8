package request

import (
	"fmt"
	"strings"
)

// MadeName returns the name of a request that has none: its series joined by
// hyphens for a correlation (eelgrass-boats, then -given-nitrate), and
// response-on-predictors for a regression, as "y is regressed on x" is said
// (eelgrass-on-nitrate-rain). Of more than four series, three and "more".
func MadeName(r *Request) string {
	if r.Kind == Correlation {
		name := joined(r.Between)
		if len(r.Given) > 0 {
			name += "-given-" + joined(r.Given)
		}
		if name == "" {
			return r.Kind.String()
		}
		return name
	}
	var predictors []string
	for _, p := range r.Predictors {
		predictors = append(predictors, p.Series)
	}
	switch {
	case r.Response == "" && len(predictors) == 0:
		return r.Kind.String()
	case len(predictors) == 0:
		return r.Response
	}
	return strings.TrimPrefix(r.Response+"-on-", "-") + joined(predictors)
}

func joined(series []string) string {
	if len(series) > 4 {
		return strings.Join(series[:3], "-") + "-more"
	}
	return strings.Join(series, "-")
}

// nameRequests names those that have no name, and reports a name that is
// written twice. A made-up name that is taken gets a number. It returns which
// names are written.
func (c *checker) nameRequests(requests []*Asked) (written []bool) {
	first := map[string]*Asked{}
	written = make([]bool, len(requests))
	for i, a := range requests {
		if a.Name == "" {
			continue
		}
		written[i] = true
		earlier := first[a.Name]
		if earlier == nil {
			first[a.Name] = a
			continue
		}
		c.add(Problem{Rule: "repeated-name", At: a.Key("name"), Request: a.Name,
			Message: fmt.Sprintf("Another request of this file is named %s.", shown(a.Name)),
			Related: []RelatedPlace{{At: earlier.Key("name"), Message: "the first of that name"}}})
	}
	for _, a := range requests {
		if a.Name != "" {
			continue
		}
		made := MadeName(&a.Request)
		a.Name = made
		for n := 2; first[a.Name] != nil; n++ {
			a.Name = fmt.Sprintf("%s-%d", made, n)
		}
		first[a.Name] = a
	}
	return written
}
