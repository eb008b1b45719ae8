package stats_test

import (
	"encoding/json"
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"sort"
	"strings"
	"testing"
)

// The reference cases are values computed by general-purpose statistics
// libraries and confirmed by a second route; testdata/reference/SOURCES.md
// names the origin of each and the rule of comparison.
var referenceDir = flag.String("reference", "../testdata/reference",
	"folder with expected.json and data/ (absolute, or relative to stats/)")

// refCase is one case of expected.json.
type refCase struct {
	ID           string             `json:"id"`
	Dataset      string             `json:"dataset"`
	Method       string             `json:"method"`
	Columns      map[string]any     `json:"columns"`
	Options      map[string]any     `json:"options"`
	Expect       map[string]any     `json:"expect"`
	Tolerance    float64            `json:"tolerance"`
	AbsTolerance float64            `json:"abs_tolerance"`
	Tolerances   map[string]float64 `json:"tolerances"`
}

// A driver computes the keys of c.Expect with the code under test, by the
// options of the case alone. A key that it leaves out fails.
type driver func(c refCase, data refData) (map[string]any, error)

func driverOf(method string) driver {
	if d, ok := seriesDrivers[method]; ok {
		return d
	}
	return modelDrivers[method]
}

func TestReference(t *testing.T) {
	cases := readCases(t, *referenceDir)
	count := make(map[string]*tally)
	for _, c := range cases {
		n := count[c.Method]
		if n == nil {
			n = &tally{}
			count[c.Method] = n
		}
		run := driverOf(c.Method)
		if run == nil || unserved(c) {
			n.undriven++
			continue
		}
		if t.Run(c.ID, func(t *testing.T) { checkCase(t, c, run) }) {
			n.passed++
		} else {
			n.failed++
		}
	}
	closing = summary(count)
	t.Log(closing)
}

// closing is printed when all tests have run, so that the counts stand last.
var closing string

func TestMain(m *testing.M) {
	code := m.Run()
	if closing != "" {
		fmt.Println(closing)
	}
	os.Exit(code)
}

func readCases(t *testing.T, dir string) []refCase {
	t.Helper()
	text, err := os.ReadFile(filepath.Join(dir, "expected.json"))
	if err != nil {
		t.Fatal(err)
	}
	var cases []refCase
	if err := json.Unmarshal(text, &cases); err != nil {
		t.Fatal(err)
	}
	if len(cases) == 0 {
		t.Fatalf("%s/expected.json has no cases", dir)
	}
	return cases
}

func checkCase(t *testing.T, c refCase, run driver) {
	defer func() { // one broken case must not hide the others
		if trouble := recover(); trouble != nil {
			t.Errorf("panic: %v", trouble)
		}
	}()
	var data refData
	if c.Dataset != "" {
		var err error
		if data, err = readData(filepath.Join(*referenceDir, "data", c.Dataset)); err != nil {
			t.Fatal(err)
		}
	}
	got, err := run(c, data)
	if err != nil {
		t.Fatal(err)
	}
	for _, key := range sortedKeys(c.Expect) {
		tolerance := c.Tolerance
		if own, ok := c.Tolerances[key]; ok {
			tolerance = own
		}
		v, ok := got[key]
		if !ok {
			t.Errorf("%s: wanted %v, got nothing", key, c.Expect[key])
			continue
		}
		for _, trouble := range compare(key, c.Expect[key], v, tolerance, c.AbsTolerance) {
			t.Error(trouble)
		}
	}
}

// tally counts the cases of one method.
type tally struct{ passed, failed, undriven int }

func (n tally) String() string {
	return fmt.Sprintf("%d passed, %d failed, %d without a driver", n.passed, n.failed, n.undriven)
}

func summary(count map[string]*tally) string {
	var all tally
	var b strings.Builder
	for _, method := range sortedKeys(count) {
		n := count[method]
		all.passed += n.passed
		all.failed += n.failed
		all.undriven += n.undriven
		fmt.Fprintf(&b, "\n  %s: %s", method, n)
	}
	return "reference: " + all.String() + b.String()
}

func sortedKeys[V any](m map[string]V) []string {
	keys := make([]string, 0, len(m))
	for k := range m {
		keys = append(keys, k)
	}
	sort.Strings(keys)
	return keys
}
