package stats_test

import (
	"fmt"
	"math"
	"reflect"
	"testing"
)

// compare returns a line for each member of want that got does not equal:
// |got - want| <= tolerance*|want|, or <= abs where abs is given.
func compare(key string, want, got any, tolerance, abs float64) []string {
	switch w := want.(type) {
	case float64:
		g, ok := number(got)
		if !ok {
			return []string{fmt.Sprintf("%s: wanted %.17g, got %v", key, w, got)}
		}
		if near(w, g, tolerance, abs) {
			return nil
		}
		return []string{fmt.Sprintf("%s: wanted %.17g, got %.17g, off by %.2g (tolerance %g relative, %g absolute)",
			key, w, g, math.Abs(g-w), tolerance, abs)}
	case []any:
		return compareList(key, w, got, tolerance, abs)
	case map[string]any:
		return compareMembers(key, w, got, tolerance, abs)
	}
	if !reflect.DeepEqual(want, got) {
		return []string{fmt.Sprintf("%s: wanted %v, got %v", key, want, got)}
	}
	return nil
}

func near(want, got, tolerance, abs float64) bool {
	d := math.Abs(got - want)
	return d <= tolerance*math.Abs(want) || d <= abs
}

func compareList(key string, want []any, got any, tolerance, abs float64) []string {
	v := reflect.ValueOf(got)
	if !v.IsValid() || v.Kind() != reflect.Slice && v.Kind() != reflect.Array {
		return []string{fmt.Sprintf("%s: wanted a list of %d, got %v", key, len(want), got)}
	}
	if v.Len() != len(want) {
		return []string{fmt.Sprintf("%s: wanted %d members, got %d", key, len(want), v.Len())}
	}
	var out []string
	for i, w := range want {
		out = append(out, compare(fmt.Sprintf("%s[%d]", key, i), w, v.Index(i).Interface(), tolerance, abs)...)
	}
	return out
}

func compareMembers(key string, want map[string]any, got any, tolerance, abs float64) []string {
	v := reflect.ValueOf(got)
	if !v.IsValid() || v.Kind() != reflect.Map {
		return []string{fmt.Sprintf("%s: wanted an object, got %v", key, got)}
	}
	var out []string
	for _, name := range sortedKeys(want) {
		path := key + "." + name
		member := v.MapIndex(reflect.ValueOf(name))
		if !member.IsValid() {
			out = append(out, fmt.Sprintf("%s: wanted %v, got nothing", path, want[name]))
			continue
		}
		out = append(out, compare(path, want[name], member.Interface(), tolerance, abs)...)
	}
	return out
}

func number(v any) (float64, bool) {
	r := reflect.ValueOf(v)
	switch {
	case !r.IsValid():
		return 0, false
	case r.CanFloat():
		return r.Float(), true
	case r.CanInt():
		return float64(r.Int()), true
	}
	return 0, false
}

// The comparison itself must be able to fail.
func TestCompare(t *testing.T) {
	for _, c := range []struct {
		name      string
		want, got any
		rel, abs  float64
		troubles  int
	}{
		{"equal", 2.0, 2, 0, 0, 0},
		{"within the relative tolerance", 100.0, 100.9, 0.01, 0, 0},
		{"outside it", 100.0, 101.1, 0.01, 0, 1},
		{"within the absolute tolerance", 0.0, 1e-13, 1e-9, 1e-12, 0},
		{"NaN is never near", 1.0, math.NaN(), 1, 1, 1},
		{"nothing", 1.0, nil, 1, 1, 1},
		{"list", []any{1.0, 2.0}, []float64{1, 3}, 0.1, 0, 1},
		{"short list", []any{1.0, 2.0}, []float64{1}, 0.1, 0, 1},
		{"object", map[string]any{"a": 1.0, "b": 2.0}, map[string]float64{"a": 1}, 0.1, 0, 1},
	} {
		if got := compare("k", c.want, c.got, c.rel, c.abs); len(got) != c.troubles {
			t.Errorf("%s: %q", c.name, got)
		}
	}
}
