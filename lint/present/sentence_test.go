package present

import (
	"strings"
	"testing"

	"lagwise/lint/result"
)

// What counts as evidence is the lab's alpha, not the level of the interval.
func TestSentenceGoesByTheAlphaOfTheLab(t *testing.T) {
	p := 0.03
	for alpha, want := range map[float64]string{0.05: "are associated", 0.01: "No evidence of an association"} {
		o := &result.Outcome{Coefficient: "pearson", N: 40, P: &p, Level: 0.95, Alpha: alpha}
		got := Sentence(&result.Computed{Pair: &[2]string{"eelgrass", "boats"}, AsWritten: o, Recommended: o})
		if !strings.Contains(got, want) {
			t.Errorf("alpha %v: %q lacks %q", alpha, got, want)
		}
	}
}
