package request

import "testing"

func TestParseTransform(t *testing.T) {
	for s, want := range map[string]Transform{
		"log": {Name: Log}, "first-differences": {Name: FirstDifferences}, "differences(3)": {Differences, 3}, "moving-mean( 5 )": {MovingMean, 5},
	} {
		got, ok := ParseTransform(s)
		if !ok || got != want {
			t.Errorf("%q: %v %v", s, got, ok)
		}
		if again, ok := ParseTransform(got.String()); !ok || again != got {
			t.Errorf("%q does not come back: %v", got.String(), again)
		}
	}
	for _, s := range []string{"", "levels", "Log", "differences", "differences()", "differences(0)", "differences(-1)", "differences(+1)",
		"differences(1,2)", "differences(x)", "differences(1", "moving-mean(1)", "log(2)", "differences(99999999999999999999)"} {
		if got, ok := ParseTransform(s); ok {
			t.Errorf("%q is read as %v", s, got)
		}
	}
}

func TestFormatOn(t *testing.T) {
	for _, tc := range []struct {
		on   []Transform
		want string
	}{
		{nil, `"levels"`}, {[]Transform{{Name: Log}}, `"log"`},
		{[]Transform{{Name: Log}, {Differences, 2}}, `["log", "differences(2)"]`},
	} {
		if got := FormatOn(tc.on); got != tc.want {
			t.Errorf("%v: %s, want %s", tc.on, got, tc.want)
		}
	}
}

func TestParseErrors(t *testing.T) {
	for s, want := range map[string]ErrorProcess{
		"independent": {Kind: "independent"}, "ar(1)": {Kind: "ar", P: 1}, "ar(12)": {Kind: "ar", P: 12}, "arma(1,1)": {Kind: "arma", P: 1, Q: 1},
		"arma(0, 2)": {Kind: "arma", Q: 2}, "car(1)": {Kind: "car", P: 1}, "spherical": {Kind: "spherical"},
		"nugget+exponential": {Kind: "exponential", Nugget: true},
	} {
		got, ok := ParseErrors(s)
		if !ok || got != want {
			t.Errorf("%q: %+v %v", s, got, ok)
		}
		if again, ok := ParseErrors(got.String()); !ok || again != got {
			t.Errorf("%q does not come back", got.String())
		}
	}
	for _, s := range []string{"", "ar", "ar()", "ar(0)", "ar(1,1)", "arma(1)", "arma(0,0)", "car(2)", "nugget", "nugget+", "nugget+ar(1)", "ma(1)", "AR(1)", "ar(1000)"} {
		if got, ok := ParseErrors(s); ok {
			t.Errorf("%q is read as %+v", s, got)
		}
	}
}

// Source: ISO 8601-1:2019, 5.5.2 (durations): designators Y M W D, then T and
// H M S, in this order; a decimal fraction on the smallest only.
func TestParsePeriod(t *testing.T) {
	for s, want := range map[string]Period{
		"P1Y": {Months: 12}, "P3M": {Months: 3}, "P1M": {Months: 1}, "P7D": {Days: 7}, "P1W": {Days: 7}, "PT1H": {Seconds: 3600},
		"PT15M": {Seconds: 900}, "P1DT12H": {Days: 1, Seconds: 43200}, "P1Y6M": {Months: 18}, "PT0.5S": {Seconds: 0.5}, "PT1,5H": {Seconds: 5400},
		"P0D": {}, "P2Y3M4DT5H6M7S": {Months: 27, Days: 4, Seconds: 18367},
	} {
		if got, err := ParsePeriod(s); err != nil || got != want {
			t.Errorf("%s: %+v %v", s, got, err)
		}
	}
	for _, s := range []string{"", "P", "PT", "P1", "1Y", "P1YT", "p1y", "P-1Y", "P1M1Y", "P1Y1Y", "P0.5Y", "PT1.5H30M", "P1H", "P1S", "PT1Y",
		"P1.Y", "P.5D", "PT.5S", "P1234567890Y", "P1 Y", "12", "P1YX"} {
		if got, err := ParsePeriod(s); err == nil {
			t.Errorf("%q is read as %+v", s, got)
		}
	}
}

func TestNearest(t *testing.T) {
	words := []string{"pearson", "spearman", "kendall", "on"}
	for word, want := range map[string]string{
		"pearsn": "pearson", "paerson": "pearson", "Pearson": "pearson", "spermann": "spearman", "kendal": "kendall",
		"of": "on", "": "", "x": "", "tau": "", "regression": "",
	} {
		if got := Nearest(word, words); got != want {
			t.Errorf("%q: %q, want %q", word, got, want)
		}
	}
}
