package main

import (
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"

	"lagwise/lint/request"
)

// The scenarios are one text file each, in testdata/scenarios: a paragraph of
// why, the steps, the files. Findings are expected where they are to stand:
//
//	on = "levels"   #> shared-drift error r = -0\.9
//
// rule, severity, and a regular expression that the message matches; several
// are parted by " ;; ". Where no comment can stand, a step says it before the
// review: expect FILE:LINE RULE SEVERITY [EXPRESSION]. A review matches what it
// finds with what is expected one to one: what nobody expects fails, and so
// does what is not found.

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"lagwise": func() {
		os.Exit(run(context.Background(), streams{os.Stdin, os.Stdout, os.Stderr}, os.Args[1:]))
	}})
}

func TestScenarios(t *testing.T) {
	const folder = "../../testdata/scenarios"
	files, err := filepath.Glob(folder + "/*.txtar")
	if err != nil || len(files) < 30 {
		t.Fatalf("%d scenarios in %s (%v)", len(files), folder, err)
	}
	data, err := filepath.Abs("../../testdata")
	if err != nil {
		t.Fatal(err)
	}
	testscript.Run(t, testscript.Params{
		Files:               files,
		RequireUniqueNames:  true,
		RequireExplicitExec: true,
		Setup: func(env *testscript.Env) error {
			env.Setenv("TESTDATA", data)
			env.Values[expectedKey{}] = new([]expected)
			return nil
		},
		Cmds: map[string]func(*testscript.TestScript, bool, []string){
			"review": reviewStep, "expect": expectStep, "status": statusStep,
			"draw": drawStep, "without": withoutStep, "hostile": hostileStep, "edit": editStep, "open-data": openDataStep,
		},
	})
}

// expected is one finding that a scenario expects; found is one there is.
type expected struct {
	file, rule, severity string
	line                 int
	message              *regexp.Regexp
}

type found struct {
	Rule, Severity, File, Message string
	Range                         struct{ Start struct{ Line int } }
}

type expectedKey struct{}

// expectStep: expect FILE:LINE RULE SEVERITY [EXPRESSION].
func expectStep(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 3 {
		ts.Fatalf("usage: expect FILE:LINE RULE SEVERITY [EXPRESSION]")
	}
	file, at, _ := strings.Cut(args[0], ":")
	line, err := strconv.Atoi(at)
	ts.Check(err)
	all := ts.Value(expectedKey{}).(*[]expected)
	*all = append(*all, expectation(ts, file, line, strings.Join(args[1:], " ")))
}

func expectation(ts *testscript.TestScript, file string, line int, text string) expected {
	words := strings.SplitN(strings.TrimSpace(text), " ", 3)
	if len(words) < 2 {
		ts.Fatalf("%s:%d: an expectation is RULE SEVERITY [EXPRESSION], not %q", file, line, text)
	}
	e := expected{file: file, line: line, rule: words[0], severity: words[1], message: regexp.MustCompile("")}
	if len(words) == 3 {
		message, err := regexp.Compile(words[2])
		ts.Check(err)
		e.message = message
	}
	return e
}

// written gathers the expectations in the documents below the work folder.
func written(ts *testscript.TestScript) []expected {
	var all []expected
	root := ts.MkAbs(".")
	ts.Check(filepath.WalkDir(root, func(path string, d os.DirEntry, err error) error {
		if err != nil || !d.Type().IsRegular() || request.DocumentKind(path) == request.NoDoc {
			return err
		}
		text, err := os.ReadFile(path)
		if err != nil {
			return err
		}
		name, err := filepath.Rel(root, path)
		for i, line := range strings.Split(string(text), "\n") {
			if _, comment, ok := strings.Cut(line, "#> "); ok {
				for _, one := range strings.Split(comment, " ;; ") {
					all = append(all, expectation(ts, filepath.ToSlash(name), i+1, one))
				}
			}
		}
		return err
	}))
	return all
}

// reviewStep: review STATUS [OPTIONS] [PATH…].
func reviewStep(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) == 0 {
		ts.Fatalf("usage: review STATUS [OPTIONS] [PATH…]")
	}
	all := ts.Value(expectedKey{}).(*[]expected)
	want := append(written(ts), *all...)
	*all = nil
	statusStep(ts, false, append([]string{args[0], "lagwise", "review", "--as", "json"}, args[1:]...))
	var got struct{ Findings []found }
	ts.Check(json.Unmarshal([]byte(ts.ReadFile("stdout")), &got))
	if trouble := unmatched(want, got.Findings); trouble != "" {
		ts.Fatalf("%s", trouble)
	}
}

// unmatched pairs each finding with one expectation and says what is left.
func unmatched(want []expected, got []found) string {
	var b strings.Builder
	for _, f := range got {
		i := slices.IndexFunc(want, func(e expected) bool {
			return e.file == f.File && e.line == f.Range.Start.Line+1 && e.rule == f.Rule && e.severity == f.Severity && e.message.MatchString(f.Message)
		})
		if i < 0 {
			fmt.Fprintf(&b, "nobody expects %s:%d %s %s: %s\n", f.File, f.Range.Start.Line+1, f.Rule, f.Severity, f.Message)
			continue
		}
		want = slices.Delete(want, i, i+1)
	}
	for _, e := range want {
		fmt.Fprintf(&b, "not found: %s:%d %s %s %s\n", e.file, e.line, e.rule, e.severity, e.message)
	}
	return b.String()
}

// statusStep: status STATUS PROGRAM [ARGUMENT…]; the program ends with just
// that status.
func statusStep(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 2 {
		ts.Fatalf("usage: status STATUS PROGRAM [ARGUMENT…]")
	}
	err := ts.Exec(args[1], args[2:]...)
	status := 0
	var exit *exec.ExitError
	if errors.As(err, &exit) {
		status = exit.ExitCode()
	} else if err != nil {
		ts.Fatalf("%v", err)
	}
	if strconv.Itoa(status) != args[0] {
		ts.Fatalf("status %d, want %s\n%s%s", status, args[0], ts.ReadFile("stdout"), ts.ReadFile("stderr"))
	}
}

// editStep: edit FILE OLD NEW replaces the one place where OLD stands; \n is a
// line's end in both.
func editStep(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) != 3 {
		ts.Fatalf("usage: edit FILE OLD NEW")
	}
	text := ts.ReadFile(args[0])
	old, fresh := strings.ReplaceAll(args[1], `\n`, "\n"), strings.ReplaceAll(args[2], `\n`, "\n")
	if strings.Count(text, old) != 1 {
		ts.Fatalf("%q stands %d times in %s", old, strings.Count(text, old), args[0])
	}
	ts.Check(os.WriteFile(ts.MkAbs(args[0]), []byte(strings.Replace(text, old, fresh, 1)), 0o644))
}

// openDataStep: open-data NAME copies a data set of testdata/reference/data,
// whose sources stand in testdata/reference/SOURCES.md.
func openDataStep(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) != 1 {
		ts.Fatalf("usage: open-data NAME")
	}
	text, err := os.ReadFile(filepath.Join(ts.Getenv("TESTDATA"), "reference", "data", args[0]))
	ts.Check(err)
	ts.Check(os.WriteFile(ts.MkAbs(args[0]), text, 0o644))
}
