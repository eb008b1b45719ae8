package present

import (
	"encoding/csv"
	"encoding/json"
	"math"
	"strings"
	"testing"
	"unicode/utf8"

	"lagwise/lint/document"
	"lagwise/lint/finding"
	"lagwise/lint/request"
	"lagwise/lint/result"
)

func TestSpark(t *testing.T) {
	for _, c := range []struct {
		values []float64
		width  int
		want   string
	}{
		{[]float64{0, 1, 2, 3, 4, 5, 6, 7}, 8, "▁▂▃▄▅▆▇█"},
		{[]float64{0, 1, 2, 3, 4, 5, 6, 7}, 4, "▁▃▆█"}, // means 0.5, 2.5, 4.5, 6.5
		{[]float64{7, 0}, 40, "█▁"},
		{[]float64{0.1, 0.1, 0.1, 0.1, 0.1, 0.1, 0.1}, 2, "▅▅"}, // flat, whatever the means round to
		{[]float64{-math.MaxFloat64, math.MaxFloat64}, 2, "▅▅"}, // a span beyond the largest number
		{nil, 8, ""},
		{[]float64{1}, 0, ""},
	} {
		if got := Spark(c.values, c.width); got != c.want {
			t.Errorf("%v at %d: %s, want %s", c.values, c.width, got, c.want)
		}
	}
}

func TestMessagesFoldAtTheWidth(t *testing.T) {
	const words = "autocorrelation, warning"
	long := strings.TrimSpace(strings.Repeat("eelgrass ", 30))
	lines := told("  ", long, words)
	var back []string
	for i, line := range lines {
		if n := utf8.RuneCountInString(line); n > textWidth {
			t.Errorf("line %d is %d wide", i, n)
		}
		if !strings.HasPrefix(line, "  ") {
			t.Errorf("line %d stands at the margin: %q", i, line)
		}
		back = append(back, strings.Fields(line)...)
	}
	if got := strings.Join(back, " "); got != long+" "+words {
		t.Errorf("words were lost: %s", got)
	}
	if last := lines[len(lines)-1]; !strings.HasSuffix(last, words) || utf8.RuneCountInString(last) != textWidth {
		t.Errorf("the last line is %q", last)
	}
	word := strings.Repeat("x", 3*textWidth)
	if lines := told("", word, words); len(lines) != 2 || lines[0] != word {
		t.Errorf("a long word is broken: %q", lines)
	}
}

// Text of documents never moves the cursor, hides, or reorders what a person
// reads (Unicode TR 36 and CVE-2021-42574 on bidirectional controls).
func TestForeignTextIsShownNotObeyed(t *testing.T) {
	for text, want := range map[string]string{
		"boats\x1b[2J":   `boats\u{1b}[2J`,
		"a\u202eb":       `a\u{202e}b`,
		"a\nerror: none": `a\u{a}error: none`,
		"Käse 😀":         "Käse 😀",
	} {
		if got := safe(text); got != want {
			t.Errorf("%q is shown as %q, want %q", text, got, want)
		}
	}
	if got := safe(strings.Repeat("ä", 500)); utf8.RuneCountInString(got) != longest+1 {
		t.Errorf("a name of 500 is cut to %d", utf8.RuneCountInString(got))
	}
	if got := escaped("[x](http://y) <b> | `c`"); strings.Contains(strings.NewReplacer(`\[`, "", `\]`, "", `\<`, "", `\|`, "", "\\`", "").Replace(got), "[") {
		t.Errorf("Markdown is obeyed: %s", got)
	}
}

// Cells that a spreadsheet takes for formulas get an apostrophe (the advice of
// OWASP on CSV injection).
func TestCellsAreNoFormulas(t *testing.T) {
	name := "=HYPERLINK(\"http://x\")"
	var b strings.Builder
	estimate := 0.5
	pair := [2]string{name, "@boats"}
	o := &result.Outcome{Coefficient: "pearson", Estimate: &estimate, N: 54, Level: 0.95}
	if err := ComputeCSV(&b, []result.Computed{{File: "a.analysis.toml", Request: name, Kind: "correlation", Pair: &pair, AsWritten: o}}); err != nil {
		t.Fatal(err)
	}
	rows, err := csv.NewReader(strings.NewReader(b.String())).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	if len(rows) != 2 || rows[1][1] != "'"+name || rows[1][3] != "'"+name || rows[1][4] != "'@boats" || rows[1][9] != "0.5" {
		t.Errorf("rows %q", rows)
	}
}

func TestNumbersOfJSON(t *testing.T) {
	for v, want := range map[float64]string{
		0.1:                 "0.1",
		1.0 / 3:             "0.333333333333", // 12 significant digits
		1e-300:              "1e-300",
		math.NaN():          "null",
		math.Inf(-1):        "null",
		-18.200000000000003: "-18.2",
	} {
		got, err := json.Marshal(value(v))
		if err != nil || string(got) != want {
			t.Errorf("%g is written as %s (%v), want %s", v, got, err, want)
		}
	}
	if got, _ := json.Marshal(number{}); string(got) != "null" {
		t.Errorf("nothing is written as %s", got)
	}
}

func TestWordsForAShell(t *testing.T) {
	for word, want := range map[string]string{
		"eelgrass-boats": "eelgrass-boats",
		"a b":            "'a b'",
		"it's":           `'it'\''s'`,
		"$(rm)":          "'$(rm)'",
		"":               "''",
	} {
		if got := quoted(word); got != want {
			t.Errorf("%q is quoted as %s, want %s", word, got, want)
		}
	}
}

func drift(request_ string, line int) finding.Finding {
	return finding.Finding{Rule: "shared-drift", Severity: finding.Error, File: "a.analysis.toml", Request: request_,
		Message:  "Both series drift, so r = -0.93 is no evidence that they change together.",
		Range:    document.Range{Start: document.Position{Line: line, Character: 5}},
		Rewrites: []finding.Rewrite{{Title: "Correlate first differences", Preferred: true}}}
}

// Text groups by request, the document's own findings first, and counts lines
// and columns from 1.
func TestReviewText(t *testing.T) {
	aim := finding.Finding{Rule: "unstated-aim", Severity: finding.Information, Request: "b", Message: "No aim is stated."}
	stray := finding.Finding{Rule: "stray-key", Severity: finding.Warning, Message: "\"by\" is not a key.", Range: document.Range{Start: document.Position{Line: 1}}}
	answered := drift("c", 20)
	answered.Deviation = &request.Deviation{From: "shared-drift", Reason: "pilot", Until: "2027-06-30"}
	var b strings.Builder
	doc := Reviewed{File: "a.analysis.toml", Shown: "lab/a.analysis.toml", Findings: []finding.Finding{aim, drift("b", 9), answered, stray}, Requests: 2, Series: 3}
	if err := ReviewText(&b, []Reviewed{doc}); err != nil {
		t.Fatal(err)
	}
	text := b.String()
	for _, want := range []string{
		"lab/a.analysis.toml\n  2:1     \"by\" is not a key.",
		"shared-drift, error\n",
		"lab/a.analysis.toml:10:6\n",
		"to apply: lagwise amend lab/a.analysis.toml --request b\n",
		"shared-drift, error, under a deviation until 2027-06-30\n",
		"2 requests in 1 document: 1 error, 1 warning, 1 information, 0 hints, 1 under a deviation.\n",
	} {
		if !strings.Contains(text, want) {
			t.Errorf("%q is not in\n%s", want, text)
		}
	}
	if strings.Index(text, "Both series") > strings.Index(text, "No aim") || strings.Index(text, "is not a key") > strings.Index(text, "Both series") {
		t.Errorf("the order is wrong:\n%s", text)
	}
	if strings.Contains(text, "--request c") {
		t.Errorf("what is under a deviation is offered to be amended:\n%s", text)
	}
}
