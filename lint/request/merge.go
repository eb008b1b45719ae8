package request

import (
	"fmt"
	"maps"
	"reflect"
	"slices"
	"strings"
)

// Merge lays one conventions file over another: tables merge key by key,
// lists are replaced whole, and what base declares final stays. The result
// belongs to no file: File, Keys, Places, BuildsOn and Tree are empty. Either
// may be nil.
func Merge(base, over *Conventions) *Conventions {
	merged, _ := MergeFinal(base, over)
	return merged
}

// MergeFinal is Merge that also returns a problem, placed in over, for each
// key of over that would change what base declares final. `final` itself only
// grows: a later file cannot take back an earlier one's.
func MergeFinal(base, over *Conventions) (*Conventions, []Problem) {
	merged := &Conventions{}
	if base != nil {
		for _, f := range conventionsFields {
			f.copy(merged, base)
		}
		merged.Weight, merged.Limits, merged.Review.LeastN = maps.Clone(base.Weight), maps.Clone(base.Limits), maps.Clone(base.Review.LeastN)
		merged.Review.Final = slices.Clone(base.Review.Final)
	}
	if over == nil {
		return merged, nil
	}
	final := merged.Review.Final
	var problems []Problem
	lay := func(path string, changes bool, apply func()) {
		switch by := coveredBy(path, final); {
		case by == "":
			apply()
		case changes:
			problems = append(problems, Problem{Rule: "wrong-value", At: over.Keys[path].Value,
				Message: fmt.Sprintf("%s is final: conventions further up declare %s, so this value does not take effect.", path, shown(by))})
		}
	}
	for _, f := range conventionsFields {
		if f.given(over) {
			lay(f.path, !f.equal(merged, over), func() { f.copy(merged, over) })
		}
	}
	layMap(lay, "weight.", &merged.Weight, over.Weight)
	layMap(lay, "limits.", &merged.Limits, over.Limits)
	layMap(lay, "review.least-n.", &merged.Review.LeastN, over.Review.LeastN)
	for _, path := range over.Review.Final {
		if !slices.Contains(final, path) {
			final = append(final, path)
		}
	}
	merged.Review.Final = final
	merged.Accepted.acceptAll()
	return merged, problems
}

// acceptAll turns an empty list, which lifts a farther file's, into nil.
func (a *Accepted) acceptAll() {
	for _, list := range []*[]string{&a.Coefficient, &a.Estimator, &a.On} {
		if len(*list) == 0 {
			*list = nil
		}
	}
}

// layMap lays one table over another, key by key, in the order of the keys.
func layMap[V comparable](lay func(string, bool, func()), prefix string, base *map[string]V, over map[string]V) {
	for _, key := range slices.Sorted(maps.Keys(over)) {
		was, had := (*base)[key]
		lay(prefix+key, !had || was != over[key], func() {
			if *base == nil {
				*base = map[string]V{}
			}
			(*base)[key] = over[key]
		})
	}
}

// coveredBy returns the final path that a path is or lies under.
func coveredBy(path string, final []string) string {
	for _, f := range final {
		if path == f || strings.HasPrefix(path, f+".") {
			return f
		}
	}
	return ""
}

// conventionsField is one key of conventions that is replaced whole.
type conventionsField struct {
	path  string
	field func(*Conventions) any // pointer to the field
}

var conventionsFields = []conventionsField{
	{"review.exclude", func(c *Conventions) any { return &c.Review.Exclude }},
	{"review.hold-at", func(c *Conventions) any { return &c.Review.HoldAt }},
	{"review.alpha", func(c *Conventions) any { return &c.Review.Alpha }},
	{"review.least-effective-n", func(c *Conventions) any { return &c.Review.LeastEffectiveN }},
	{"asked-for.request", func(c *Conventions) any { return &c.AskedFor.Request }},
	{"asked-for.series", func(c *Conventions) any { return &c.AskedFor.Series }},
	{"asked-for.deviation", func(c *Conventions) any { return &c.AskedFor.Deviation }},
	{"asked-for.deviation-longest", func(c *Conventions) any { return &c.AskedFor.DeviationLongest }},
	{"accepted-methods.coefficient", func(c *Conventions) any { return &c.Accepted.Coefficient }},
	{"accepted-methods.estimator", func(c *Conventions) any { return &c.Accepted.Estimator }},
	{"accepted-methods.on", func(c *Conventions) any { return &c.Accepted.On }},
	{"accepted-methods.always-difference", func(c *Conventions) any { return &c.Accepted.AlwaysDifference }},
	{"test-settings.adf.lags", func(c *Conventions) any { return &c.Tests.ADFLags }},
	{"test-settings.kpss.bandwidth", func(c *Conventions) any { return &c.Tests.KPSSBandwidth }},
	{"test-settings.least-n-verdict", func(c *Conventions) any { return &c.Tests.LeastNVerdict }},
	{"test-settings.family", func(c *Conventions) any { return &c.Tests.Family }},
}

func (f conventionsField) given(c *Conventions) bool {
	return !reflect.ValueOf(f.field(c)).Elem().IsZero()
}

func (f conventionsField) equal(a, b *Conventions) bool {
	return reflect.DeepEqual(f.field(a), f.field(b))
}

func (f conventionsField) copy(to, from *Conventions) {
	reflect.ValueOf(f.field(to)).Elem().Set(reflect.ValueOf(f.field(from)).Elem())
}
