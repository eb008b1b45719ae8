package rules_test

import (
	"strings"
	"testing"

	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
	"lagwise/rules"
)

const moorings = `[record.moorings]
file = "moorings.csv"
along = { column = "year", kind = "time", step = "P1Y" }

[series.boats]
column = "boats_moored"
unit = "{count}"
`

// read is what reading the moorings shows when nothing is wrong.
func read() evidence.Read {
	return evidence.Read{Record: "moorings", File: "moorings.csv", Rows: 40, Columns: []string{"year", "boats_moored"},
		Axis:   evidence.AxisSeen{Column: "year", Kind: "time", Declared: "P1Y", Step: "P1Y", Even: true, First: "1981", Last: "2020"},
		Series: []evidence.SeriesRead{{Name: "boats", Column: "boats_moored", N: 40, Measured: 40, Unit: "{count}", DeclaredSeries: true}}}
}

func inquiryOf(text string, r evidence.Read) lint.Inquiry {
	tree := document.Parse([]byte(text))
	m, _ := request.BindManifest("estuary.series.toml", tree)
	return lint.Inquiry{File: "estuary.series.toml", Tree: tree, Manifest: m, Reads: []evidence.Read{r}}
}

// dataCase is one state of the moorings. place is the text that the finding
// marks, rewrite a text of its first edit; either may be left open.
type dataCase struct {
	rule, name     string
	change         func(*evidence.Read, *evidence.SeriesRead)
	want           string // "": silence
	place, rewrite string
}

func troubled(kind evidence.TroubleKind) func(*evidence.Read, *evidence.SeriesRead) {
	return func(r *evidence.Read, _ *evidence.SeriesRead) {
		*r = evidence.Read{Record: r.Record, File: r.File, Trouble: &evidence.Trouble{Kind: kind, Message: "why"}}
	}
}

var dataCases = []dataCase{
	{"unreadable-record", "no file", troubled(evidence.UnreadableRecord), "why", `"moorings.csv"`, ""},
	{"unreadable-record", "outside the root", troubled(evidence.OutsideRoot), "", "", ""},
	{"outside-root", "outside the root", troubled(evidence.OutsideRoot), "why", `"moorings.csv"`, ""},
	{"outside-root", "no file", troubled(evidence.UnreadableRecord), "", "", ""},
	{"unknown-column", "of a series", func(_ *evidence.Read, s *evidence.SeriesRead) {
		s.Trouble = &evidence.Trouble{Kind: evidence.UnknownColumn, Message: "no such column", Nearest: "boats-moored"}
	}, "no such column", `"boats_moored"`, `"boats-moored"`},
	{"unknown-column", "of the axis", func(r *evidence.Read, _ *evidence.SeriesRead) {
		r.Trouble = &evidence.Trouble{Kind: evidence.UnknownColumn, Message: "no such axis", Nearest: "Year"}
	}, "no such axis", `"year"`, `"Year"`},
	{"unknown-column", "split by another delimiter", func(r *evidence.Read, s *evidence.SeriesRead) {
		r.SplitBy, s.Trouble = ";", &evidence.Trouble{Kind: evidence.UnknownColumn, Message: "no such column"}
	}, "looks split by semicolons", "", `";"`},
	{"unparsed-values", "one value", func(_ *evidence.Read, s *evidence.SeriesRead) {
		s.Unparsed, s.UnparsedText, s.UnparsedLine = 1, "lost", 12
	}, `1 value of boats is no number; the first is "lost" on line 12`, "", ""},
	{"unparsed-values", "two positions", func(r *evidence.Read, _ *evidence.SeriesRead) {
		r.Axis.Unparsed, r.Axis.UnparsedText, r.Axis.UnparsedLine = 2, "198x", 5
	}, `2 positions in column year were not read; the first is "198x" on line 5`, "", ""},
	{"unparsed-values", "day or month first", func(r *evidence.Read, _ *evidence.SeriesRead) {
		r.Axis.Ambiguous, r.Axis.UnparsedText = true, "01/02/2003"
	}, "day or month first", "", ""},
	{"step-mismatch", "monthly rows", func(r *evidence.Read, _ *evidence.SeriesRead) { r.Axis.Step = "P1M" },
		"declared as P1Y, and column year goes by P1M", `"P1Y"`, `"P1M"`},
	{"step-mismatch", "the same step in other words", func(r *evidence.Read, _ *evidence.SeriesRead) { r.Axis.Step = "P12M" }, "", "", ""},
	{"step-mismatch", "uneven", func(r *evidence.Read, _ *evidence.SeriesRead) { r.Axis.Even = false }, "are uneven", `"P1Y"`, ""},
	{"step-mismatch", "not declared", func(r *evidence.Read, _ *evidence.SeriesRead) { r.Axis.Declared, r.Axis.Step = "", "P1M" }, "", "", ""},
	{"repeated-positions", "three rows", func(r *evidence.Read, _ *evidence.SeriesRead) {
		r.Axis.Repeated, r.Axis.FirstRepeated, r.Axis.RepeatedLine = 3, "1994", 16
	}, "3 positions of column year stand more than once; the first is 1994, again on line 16", `"year"`, ""},
	{"backward-axis", "newest first", func(r *evidence.Read, _ *evidence.SeriesRead) { r.Axis.Backward = true },
		"runs backwards, from 2020 to 1981", `"year"`, ""},
	{"backward-axis", "an age", func(r *evidence.Read, _ *evidence.SeriesRead) { r.Axis.Backward, r.Axis.Kind = true, "age" }, "", "", ""},
	{"constant-series", "all equal", func(_ *evidence.Read, s *evidence.SeriesRead) { s.Constant, s.Value = true, 7 },
		"All 40 values of boats are 7", "", ""},
	{"constant-series", "one value", func(_ *evidence.Read, s *evidence.SeriesRead) { s.N, s.Value = 1, 7 }, "boats has one value, 7", "", ""},
	{"constant-series", "no value", func(_ *evidence.Read, s *evidence.SeriesRead) { s.N, s.Missing = 0, 40 },
		"boats has no value: all its 40 rows are missing", "", ""},
	{"missing-unit", "declared", func(_ *evidence.Read, s *evidence.SeriesRead) { s.Unit = "" }, "boats has no unit", "", ""},
	{"missing-unit", "from a header", func(_ *evidence.Read, s *evidence.SeriesRead) { s.Unit, s.DeclaredSeries = "", false },
		"1 column of moorings.csv has no unit: boats", `"moorings.csv"`, ""},
	{"suspected-missing-code", "-999 three times", func(_ *evidence.Read, s *evidence.SeriesRead) { s.Suspect, s.SuspectCount = -999, 3 },
		"-999 stands 3 times among the 40 values of boats", "", `"-999"`},
	{"censored-values", "5 of 40", func(_ *evidence.Read, s *evidence.SeriesRead) { s.Censored = 5 }, "shows whether they matter", "", ""},
	{"censored-values", "6 of 40 are 15 %, the edge", func(_ *evidence.Read, s *evidence.SeriesRead) { s.Censored = 6 }, "shows whether they matter", "", ""},
	{"censored-values", "7 of 40", func(_ *evidence.Read, s *evidence.SeriesRead) { s.Censored = 7 }, "is the fair choice", "", ""},
	{"censored-values", "20 of 40 are half, the edge", func(_ *evidence.Read, s *evidence.SeriesRead) { s.Censored = 20 }, "is the fair choice", "", ""},
	{"censored-values", "21 of 40", func(_ *evidence.Read, s *evidence.SeriesRead) { s.Censored = 21 }, "can say little", "", ""},
}

func TestRulesAboutData(t *testing.T) {
	for _, c := range dataCases {
		r := read()
		c.change(&r, &r.Series[0])
		name := c.rule + ", " + c.name
		got := ask(t, c.rule, inquiryOf(moorings, r))
		wantOne(t, name, got, c.want, severityOf(t, c.rule))
		if len(got) != 1 {
			continue
		}
		f := got[0]
		if marked := moorings[f.At.Start:f.At.End]; marked == "" || c.place != "" && marked != c.place {
			t.Errorf("%s: marks %q, want %q", name, marked, c.place)
		}
		if len(f.Series) != 1 || f.Series[0] != "boats" {
			t.Errorf("%s: is about %q, want boats", name, f.Series)
		}
		wantRewrite(t, name, f, c.rewrite)
	}
}

func wantRewrite(t *testing.T, name string, f finding.Finding, want string) {
	t.Helper()
	switch {
	case want == "" && len(f.Rewrites) != 0:
		t.Errorf("%s: offers %q", name, f.Rewrites[0].Title)
	case want == "":
	case len(f.Rewrites) != 1:
		t.Errorf("%s: %d rewrites, want one", name, len(f.Rewrites))
	case !strings.Contains(f.Rewrites[0].Edits[0].Text, want):
		t.Errorf("%s: writes %q, want %s in it", name, f.Rewrites[0].Edits[0].Text, want)
	}
}

func severityOf(t *testing.T, name string) finding.Severity {
	t.Helper()
	for _, r := range rules.All() {
		if r.Name == name {
			return r.Severity
		}
	}
	t.Fatalf("there is no rule %s", name)
	return finding.Unset
}

// TestRulesAboutDataKeepSilent asks every rule about manifests of one with
// which nothing is wrong, and sees that each was made to speak above.
func TestRulesAboutDataKeepSilent(t *testing.T) {
	spoke := map[string]bool{"idle-series": true} // by its own test
	for _, c := range dataCases {
		spoke[c.rule] = spoke[c.rule] || c.want != ""
	}
	for _, r := range rules.All() {
		if !r.Scope.Has(lint.OfManifest) {
			continue
		}
		if got := ask(t, r.Name, inquiryOf(moorings, read())); len(got) != 0 {
			t.Errorf("%s speaks of clean data: %q", r.Name, got[0].Message)
		}
		if !spoke[r.Name] {
			t.Errorf("%s is not made to speak by any case", r.Name)
		}
	}
}

// TestLimitsOfDataAreTold holds what a data file exceeds to the name of the
// rule about limits, which itself is asked about documents.
func TestLimitsOfDataAreTold(t *testing.T) {
	r := read()
	troubled(evidence.ReachedLimit)(&r, nil)
	got := ask(t, "unreadable-record", inquiryOf(moorings, r))
	if len(got) != 1 || got[0].Rule != "reached-limit" {
		t.Errorf("the findings are %+v, want one of reached-limit", got)
	}
}

func TestUnitsThatTheLabAsksFor(t *testing.T) {
	r := read()
	r.Series[0].Unit = ""
	q := inquiryOf(moorings, r)
	q.Conventions = &request.Conventions{AskedFor: request.AskedFor{Series: []string{"unit"}}}
	wantOne(t, "absent-field says it", ask(t, "missing-unit", q), "", finding.Information)
}

func TestIdleSeries(t *testing.T) {
	q := inquiryOf(moorings, read())
	q.Idle = []string{"boats", "made_from_a_header"}
	got := ask(t, "idle-series", q)
	wantOne(t, "idle-series", got, "No analysis below the root uses boats.", finding.Hint)
	if len(got) == 1 && moorings[got[0].At.Start:got[0].At.End] != "[series.boats]" {
		t.Errorf("idle-series marks %q", moorings[got[0].At.Start:got[0].At.End])
	}
}
