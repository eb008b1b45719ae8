package engine

import (
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"path/filepath"
	"strings"
	"sync"
	"testing"
	"time"

	"lagwise/lint"
	"lagwise/lint/finding"
)

func oneRequest(t *testing.T, rest string) (root, path string) {
	t.Helper()
	root = lay(t, map[string]string{"shore.series.toml": shore, "a.analysis.toml": between("eelgrass", "boats") + rest})
	return root, filepath.Join(root, "a.analysis.toml")
}

func TestBrokenRuleNeverHidesTheOthers(t *testing.T) {
	_, path := oneRequest(t, "")
	broken := lint.Rule{Name: "broken", Severity: finding.Error, Scope: lint.OfRequest,
		Run: func(q *lint.Inquiry) { q.Report(finding.Finding{Message: "half"}); panic("out of range") }}
	failing := lint.Rule{Name: "failing", Severity: finding.Error, Scope: lint.OfRequest,
		Run: func(q *lint.Inquiry) { q.Failed(errors.New("no evidence to be had")) }}
	ed := New(Options{Rules: []lint.Rule{broken, failing, voice("drift", finding.Error)}}).Workspace().Edition()
	j := judge(t, ed, path)
	wantRules(t, j, "failed-rule failed-rule drift")
	if len(j.Broken) != 2 || !strings.Contains(j.Broken[0], "broken on eelgrass-boats") || !strings.Contains(j.Broken[1], "no evidence to be had") {
		t.Errorf("broken: %q", j.Broken)
	}
	if !strings.Contains(j.Findings[0].Message, "out of range") || j.Findings[0].Severity != finding.Error {
		t.Errorf("finding %v", j.Findings[0])
	}
}

func TestErrorInTheTextKeepsTheStatisticalRulesOff(t *testing.T) {
	for rest, want := range map[string]string{
		"":                       "drift",
		"lag = \"two\"\n":        "wrong-value",
		"stray = 1\n":            "drift stray-key",
		"given = [\"nitrat\"]\n": "unknown-series",
		"[[correlation.deviation]]\nfrom = \"drifted\"\nreason = \"pilot\"\n": "drift unknown-rule",
	} {
		root := lay(t, map[string]string{"shore.series.toml": shore, "a.analysis.toml": between("eelgrass", "boats") + rest})
		ed := New(Options{Rules: append(problemRules(), voice("drift", finding.Error))}).Workspace(root).Edition()
		wantRules(t, judge(t, ed, filepath.Join(root, "a.analysis.toml")), want)
	}
}

func TestWeights(t *testing.T) {
	root, path := oneRequest(t, "")
	write(t, filepath.Join(root, "lab.conventions.toml"), "[weight]\ndrift = \"hint\"\nseason = \"none\"\n")
	ed := New(Options{Rules: []lint.Rule{voice("drift", finding.Error), voice("season", finding.Error)}}).Workspace(root).Edition()
	j := judge(t, ed, path)
	wantRules(t, j, "drift")
	if j.Findings[0].Severity != finding.Hint {
		t.Errorf("severity %s", j.Findings[0].Severity)
	}
}

func TestDeviations(t *testing.T) {
	const given = "[[correlation.deviation]]\nfrom = \"drift\"\nreason = \"pilot series\"\n"
	for _, c := range []struct {
		name, conventions, rest, want string
		answered                      bool
	}{
		{"answers", "", given, "drift", true},
		{"another rule", "", strings.Replace(given, "drift", "season", 1), "drift idle-deviation", false},
		{"ended", "", given + "until = 2026-03-01\n", "drift ended-deviation", false},
		{"last day", "", given + "until = 2026-03-02\n", "drift ending-deviation", true},
		{"far end", "", given + "until = 2028-01-01\n", "drift", true},
		{"too far for the lab", "[asked-for]\ndeviation-longest = \"P1Y\"\n", given + "until = 2028-01-01\n", "drift incomplete-deviation", false},
		{"asked for", "[asked-for]\ndeviation = [\"by\"]\n", given, "drift incomplete-deviation", false},
		{"asked for and given", "[asked-for]\ndeviation = [\"by\"]\n", given + "by = \"RQ\"\n", "drift", true},
		{"its pair", "", given + "pair = [\"boats\", \"eelgrass\"]\n", "drift", true},
		{"another pair", "", given + "pair = [\"boats\", \"nitrate\"]\n", "drift idle-deviation", false},
		{"other data", "", given + "data = \"sha256:00ff\"\n", "drift ended-deviation", false},
	} {
		t.Run(c.name, func(t *testing.T) {
			root := lay(t, map[string]string{"shore.series.toml": shore, "shore.csv": shoreData, "lab.conventions.toml": c.conventions,
				"a.analysis.toml": between("eelgrass", "boats") + c.rest})
			quiet := lint.Rule{Name: "season", Scope: lint.OfRequest, Severity: finding.Warning, Run: func(*lint.Inquiry) {}}
			rules := append(problemRules(), voice("drift", finding.Error), quiet)
			ed := New(Options{Rules: rules, OnDate: "2026-03-02"}).Workspace(root).Edition()
			j := judge(t, ed, filepath.Join(root, "a.analysis.toml"))
			wantRules(t, j, c.want)
			if got := spokenBy(j, "drift")[0].Deviation != nil; got != c.answered {
				t.Errorf("answered: %v, want %v", got, c.answered)
			}
		})
	}
}

func TestKnownComputesNothingAndFollowsTheText(t *testing.T) {
	_, path := oneRequest(t, "")
	asked := 0
	counting := voice("drift", finding.Error)
	run := counting.Run
	counting.Run = func(q *lint.Inquiry) { asked++; run(q) }
	w := New(Options{Rules: append(problemRules(), counting)}).Workspace()
	before := w.Edition().Known(path)
	if before.Complete || len(before.Findings) != 0 || asked != 0 {
		t.Fatalf("nothing is known yet: %v", before)
	}
	judge(t, w.Edition(), path)
	asked = 0
	w.Open(path, []byte("title = \"moved down\"\nstray = 1\n\n"+between("eelgrass", "boats")), 1)
	j := w.Edition().Known(path)
	wantRules(t, j, "stray-key drift")
	if drift := spokenBy(j, "drift")[0]; !j.Complete || asked != 0 || drift.Range.Start.Line != 4 {
		t.Errorf("complete %v, asked %d, line %d", j.Complete, asked, drift.Range.Start.Line)
	}
	w.Change(path, []byte(between("eelgrass", "nitrate")), 2)
	j = w.Edition().Known(path)
	if j.Complete || len(j.Findings) != 0 {
		t.Errorf("another request is not known: %v", j.Findings)
	}
}

func TestAnyNumberOfWorkersSaysTheSame(t *testing.T) {
	var text strings.Builder
	for i := range 40 {
		fmt.Fprintf(&text, "[[correlation]]\nname = \"r%d\"\nbetween = [\"eelgrass\", \"boats\"]\nstray%d = 1\n", i, i)
	}
	root := lay(t, map[string]string{"shore.series.toml": shore, "a.analysis.toml": text.String()})
	var first []byte
	for _, workers := range []int{1, 8, 1, 8} {
		rules := append(problemRules(), voice("drift", finding.Error), voice("season", finding.Warning))
		ed := New(Options{Rules: rules, Workers: workers}).Workspace(root).Edition()
		got, err := json.Marshal(judge(t, ed, filepath.Join(root, "a.analysis.toml")))
		if err != nil {
			t.Fatal(err)
		}
		if first == nil {
			first = got
		}
		if !bytes.Equal(got, first) {
			t.Errorf("%d workers say something else", workers)
		}
	}
}

func TestFingerprintsOutliveEdits(t *testing.T) {
	_, path := oneRequest(t, "")
	w := New(Options{Rules: []lint.Rule{voice("drift", finding.Error)}}).Workspace()
	before := judge(t, w.Edition(), path).Findings[0]
	w.Open(path, []byte("# a line above\n"+between("eelgrass", "boats")), 1)
	after := judge(t, w.Edition(), path).Findings[0]
	if before.Fingerprint != after.Fingerprint || len(after.Fingerprint) != 32 || before.Range == after.Range {
		t.Errorf("%v became %v", before, after)
	}
}

func TestCancelledJudgementReturnsAtOnce(t *testing.T) {
	_, path := oneRequest(t, "")
	ctx, cancel := context.WithCancel(context.Background())
	started := make(chan struct{})
	waiting := lint.Rule{Name: "waiting", Scope: lint.OfRequest, Severity: finding.Error, Run: func(q *lint.Inquiry) {
		close(started)
		<-ctx.Done()
		q.Failed(ctx.Err())
	}}
	ed := New(Options{Rules: []lint.Rule{waiting}}).Workspace().Edition()
	done := make(chan error, 1)
	go func() {
		_, err := ed.Judge(ctx, path)
		done <- err
	}()
	<-started
	cancel()
	select {
	case err := <-done:
		if !errors.Is(err, context.Canceled) {
			t.Errorf("error %v", err)
		}
	case <-time.After(10 * time.Second):
		t.Fatal("still judging")
	}
	if _, err := ed.Judge(ctx, path); !errors.Is(err, context.Canceled) {
		t.Errorf("a context that is over: %v", err)
	}
}

func TestEditsWhileJudging(t *testing.T) {
	_, path := oneRequest(t, "")
	w := New(Options{Rules: append(problemRules(), voice("drift", finding.Error))}).Workspace()
	var group sync.WaitGroup
	for worker := range 4 {
		group.Go(func() {
			for i := range 25 {
				title := fmt.Sprintf("title = \"%d-%d\"\n", worker, i)
				w.Change(path, []byte(title+between("eelgrass", "boats")), int32(i))
				w.Touch(path)
				ed := w.Edition()
				j, err := ed.Judge(context.Background(), path)
				if err != nil || len(j.Findings) != 1 || j.Findings[0].Range.Start.Line != 2 {
					t.Errorf("%v %v", j, err)
				}
				ed.Known(path)
			}
		})
	}
	group.Wait()
}
