package document

import (
	"strings"
	"testing"
	"time"
)

// Both are invalid by the TOML specification ("Table": dotted keys and inline
// tables define a table that a header cannot define or extend again), and
// BurntSushi/toml 1.6.0 takes them.
func TestExtendedTables(t *testing.T) {
	for _, text := range []string{"a.b = 1\n[a]\n", "a = {b=1}\n[a.c]\n", "a = {b=1}\na.c = 2\n", "a = [1]\n[[a]]\n", "[a.b]\nc = 1\n[a]\nb.d = 1\n"} {
		if tree := Parse([]byte(text)); len(tree.Problems) != 1 {
			t.Errorf("%q: %s", text, problems(tree))
		}
	}
}

func TestEveryDuplicateIsTold(t *testing.T) {
	text := "a = 1\na = 2\na = 3\n[t]\nb = { c = 1, c = 2 }\n[t]\nb = 5\n"
	tree := Parse([]byte(text))
	var at []int
	for _, p := range tree.Problems {
		at = append(at, p.At.Start)
	}
	want := []int{strings.Index(text, "a = 2"), strings.Index(text, "a = 3"), strings.Index(text, "c = 2"), strings.LastIndex(text, "t]")}
	if len(at) != len(want) {
		t.Fatalf("%s", problems(tree))
	}
	for i := range want {
		if at[i] != want[i] {
			t.Errorf("problem %d at %d, want %d", i, at[i], want[i])
		}
	}
	if got := strings.Join(outline(tree), " "); got != "a=1 [t] t.b={ c = 1, c = 2 }" {
		t.Errorf("the first of each stays: %s", got)
	}
}

func TestMessagesSayWhatToDo(t *testing.T) {
	for text, want := range map[string]string{
		"be":                      "be has no value; write be = and a value",
		"be # why":                "be has no value; write be = and a value",
		"between =":               "between has no value; write one after the equals sign",
		"between = [\"a\"":        "this [ is not closed; add ]",
		"on = { a = 1":            "this { is not closed; add }",
		"a = \"b":                 "this string has no end; close it with the same quotes",
		"[[corr":                  "this header is not closed; end it with ]]",
		"[corr":                   "this header is not closed; end it with ]",
		"[[]]":                    "this header has no name; write [[name]]",
		"on = log":                `log is not a value; write "log"`,
		"on = [\"log\", cosine":   `cosine is not a value; write "cosine"`,
		"planned = True":          "True is not a value; write true",
		"a = 1\na = 2":            `"a" is already defined on line 1; remove or rename one of the two`,
		"until = 2020-13-01":      `invalid datetime: "2020-13-01"`,
		"a = 9223372036854775808": "9223372036854775808 is out of range for int64",
	} {
		tree := Parse([]byte(text))
		if len(tree.Problems) != 1 || tree.Problems[0].Message != want {
			t.Errorf("%q: %s", text, problems(tree))
		}
	}
}

// The limits are those of the TOML specification: 64-bit integers and IEEE 754
// binary64 floats; dates and times follow RFC 3339.
func TestValues(t *testing.T) {
	for raw, want := range map[string]any{
		"9223372036854775807": int64(9223372036854775807), "-9223372036854775808": int64(-9223372036854775808),
		"0xFF_FF": int64(65535), "1_000": int64(1000), "+7": int64(7), "6.25e-1": 0.625, "1_0.5": 10.5,
		`"a\u00e9\e"`: "aé\x1b", "'a\\b'": `a\b`, "\"\"\"\na\\\n  b\"\"\"": "ab",
		"2020-06-30": "2020-06-30", "07:32": "07:32", "1979-05-27 07:32:00": "1979-05-27 07:32:00",
		"1979-05-27t07:32:00z": time.Date(1979, 5, 27, 7, 32, 0, 0, time.UTC),
	} {
		tree := Parse([]byte("x = " + raw))
		if m := tree.Root.Get("x"); m == nil || !tree.Valid() || m.Value.Value != want {
			t.Errorf("%s: %+v %s", raw, m, problems(tree))
		}
	}
	for _, raw := range []string{"-9223372036854775809", "1e999", "2020-02-30", "25:00:00", "1979-05-27T07:32:00+24:00", "1979-05-27T07:32:00+00:60", "01"} {
		tree := Parse([]byte("x = " + raw + "\ny = 1"))
		if len(tree.Problems) != 1 || tree.Root.Get("x") != nil || tree.Root.Get("y") == nil || !tree.Attempted(tree.Root, "x") {
			t.Errorf("%s: %s", raw, problems(tree))
		}
	}
}

func TestUnusualBytes(t *testing.T) {
	for name, text := range map[string]string{
		"byte order mark": "\xef\xbb\xbfa = 1\nok = 2\n",
		"CRLF":            "a = 1\r\nok = 2\r\n",
		"tabs":            "\ta\t=\t1\t\n\tok\t=\t2",
	} {
		tree := Parse([]byte(text))
		m := tree.Root.Get("ok")
		if !tree.Valid() || m == nil || tree.Raw(m.Value.At) != "2" || tree.Raw(m.Key.At) != "ok" {
			t.Errorf("%s: %s", name, problems(tree))
		}
	}
	for name, text := range map[string]string{"NUL": "a = \x00\nok = 2", "NUL in a string": "a = \"x\x00\"\nok = 2", "not UTF-8": "a = \"\xff\"\nok = 2",
		"not UTF-8 in a comment": "# \xff\nok = 2", "lone CR": "a = 1\rb\nok = 2", "mark inside": "a = 1\n\xef\xbb\xbfb = 1\nok = 2"} {
		tree := Parse([]byte(text))
		if len(tree.Problems) != 1 || tree.Root.Get("ok") == nil {
			t.Errorf("%s: %s", name, problems(tree))
		}
	}
	if tree := Parse([]byte("\xff\xfea\x00=\x00")); len(tree.Problems) != 1 || tree.Set(tree.Root, "a", "1") != nil {
		t.Errorf("UTF-16: %s", problems(tree))
	}
}

func TestDeepNestingIsAProblem(t *testing.T) {
	for name, deep := range map[string]string{
		"closed":        "a = " + strings.Repeat("[", 20_000) + strings.Repeat("]", 20_000),
		"open":          "a = " + strings.Repeat("[", 20_000),
		"under 10,000":  "a = " + strings.Repeat("[", 5_000) + strings.Repeat("]", 5_000),
		"inline tables": "a = " + strings.Repeat("{ a = ", 20_000) + "1" + strings.Repeat("}", 20_000),
		"millions":      "a = " + strings.Repeat("[", 3_000_000),
	} {
		tree := Parse([]byte(deep + "\nok = 1\n"))
		if len(tree.Problems) != 1 || tree.Root.Get("ok") == nil {
			t.Errorf("%s: %d problems, %.200s", name, len(tree.Problems), problems(tree))
		}
	}
	fits := "a = " + strings.Repeat("[", MaxNesting) + strings.Repeat("]", MaxNesting)
	if tree := Parse([]byte(fits)); !tree.Valid() {
		t.Errorf("%.200s", problems(tree))
	}
}

// The budget of recovery keeps hostile texts linear: the benchmark shows it,
// and here they end, with what stands after them read.
func TestManyBrokenLines(t *testing.T) {
	for name, line := range hostile {
		lines := 10_000
		if name == "words" || name == "open nested" {
			lines = 100_000
		}
		text := strings.Repeat(line, lines/strings.Count(line, "\n")) + "[ok]\nx = 1\n"
		tree := Parse([]byte(text))
		if tree.Valid() || len(tree.Problems) > lines {
			t.Errorf("%s: %d problems", name, len(tree.Problems))
		}
		if ok := tree.Root.Get("ok"); ok == nil || ok.Value.Get("x") == nil {
			t.Errorf("%s: what stands after is lost", name)
		}
	}
}

func FuzzParse(f *testing.F) {
	for _, text := range suite(f, "", "1.1.0") {
		f.Add(text)
	}
	for _, line := range hostile {
		f.Add([]byte(strings.Repeat(line, 3) + "[ok]\nx = 1\n"))
	}
	f.Add([]byte(typical))
	f.Fuzz(func(t *testing.T, text []byte) {
		tree := Parse(text)
		in := func(s Span) bool { return 0 <= s.Start && s.Start <= s.End && s.End <= len(text) }
		for _, p := range tree.Problems {
			if !in(p.At) || p.Message == "" {
				t.Fatalf("%q: problem %+v", text, p)
			}
		}
		last := 0
		for _, s := range tree.statements {
			if !in(s.at) || s.at.Start < last || s.table == nil {
				t.Fatalf("%q: statement %+v", text, s)
			}
			last = s.at.End
		}
		visit(tree.Root, func(m *Member, n *Node) {
			if !in(n.At) || !in(n.Header) || m != nil && (!in(m.Key.At) || !in(m.Statement) || m.Key.At.Empty()) {
				t.Fatalf("%q: %+v", text, n)
			}
		})
		checkSpans(t, string(text), tree)
		for at := 0; at <= len(text); at += 1 + len(text)/50 {
			tree.At(at)
		}
	})
}
