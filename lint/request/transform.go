package request

import (
	"strconv"
	"strings"

	"lagwise/lint/document"
)

// Levels is the word for no transform: the values as measured.
const Levels = "levels"

// maxSteps bounds K of differences(K) and moving-mean(K).
const maxSteps = 100000

// ParseTransform reads one transform of `on`. Levels is not one: it is the
// empty list. differences(K) needs K of 1 or more, moving-mean(K) of 2 or
// more.
func ParseTransform(s string) (Transform, bool) {
	switch s {
	case Log, Anomalies, Detrended, FirstDifferences, SeasonalDifferences, RatesOfChange, Increments, Prewhitened, Standardized:
		return Transform{Name: s}, true
	}
	name, args, ok := call(s)
	if !ok || len(args) != 1 || args[0] > maxSteps {
		return Transform{}, false
	}
	switch {
	case name == Differences && args[0] >= 1, name == MovingMean && args[0] >= 2:
		return Transform{Name: name, K: args[0]}, true
	}
	return Transform{}, false
}

// String returns the transform as it is written.
func (t Transform) String() string {
	if t.K != 0 {
		return t.Name + "(" + strconv.Itoa(t.K) + ")"
	}
	return t.Name
}

// FormatOn returns transforms as a TOML value: "levels" when there are none,
// a bare string for one, else a list.
func FormatOn(on []Transform) string {
	switch len(on) {
	case 0:
		return document.Quote(Levels)
	case 1:
		return document.Quote(on[0].String())
	}
	return formatTransforms(on)
}

func formatTransforms(on []Transform) string {
	words := make([]string, len(on))
	for i, t := range on {
		words[i] = t.String()
	}
	if len(words) == 0 {
		words = []string{Levels}
	}
	return formatList(words)
}

func formatList(words []string) string {
	quoted := make([]string, len(words))
	for i, w := range words {
		quoted[i] = document.Quote(w)
	}
	return "[" + strings.Join(quoted, ", ") + "]"
}

// call reads name(1,2): whole numbers without a sign, blanks allowed around
// them.
func call(s string) (name string, args []int, ok bool) {
	name, rest, found := strings.Cut(s, "(")
	inner, closed := strings.CutSuffix(rest, ")")
	if !found || !closed {
		return "", nil, false
	}
	for arg := range strings.SplitSeq(inner, ",") {
		arg = strings.TrimSpace(arg)
		n, err := strconv.Atoi(arg)
		if err != nil || strings.ContainsAny(arg, "+-") {
			return "", nil, false
		}
		args = append(args, n)
	}
	return name, args, true
}
