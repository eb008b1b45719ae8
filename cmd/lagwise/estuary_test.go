package main

import (
	"bytes"
	"context"
	"encoding/json"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strings"
	"testing"
)

const estuary = "../../testdata/estuary"

// lagwise runs a command in this process.
func lagwise(t *testing.T, want int, args ...string) string {
	t.Helper()
	var out, trouble bytes.Buffer
	if got := run(context.Background(), streams{strings.NewReader(""), &out, &trouble}, args); got != want {
		t.Fatalf("lagwise %s: status %d, want %d\n%s%s", strings.Join(args, " "), got, want, out.String(), trouble.String())
	}
	return out.String()
}

// estuaryCopy copies the demo's documents and data into a folder of its own.
func estuaryCopy(t *testing.T) string {
	t.Helper()
	to := t.TempDir()
	if err := os.CopyFS(to, os.DirFS(estuary)); err != nil {
		t.Fatal(err)
	}
	return to
}

func TestEstuaryIsWhatTheGeneratorWrites(t *testing.T) {
	to := t.TempDir()
	if out, err := exec.Command("go", "run", estuary+"/generate.go", to).CombinedOutput(); err != nil {
		t.Fatalf("%v\n%s", err, out)
	}
	files, err := filepath.Glob(filepath.Join(to, "*.csv"))
	if err != nil || len(files) != 4 {
		t.Fatalf("%d files (%v)", len(files), err)
	}
	for _, fresh := range files {
		got, err := os.ReadFile(fresh)
		if err != nil {
			t.Fatal(err)
		}
		kept, err := os.ReadFile(filepath.Join(estuary, "data", filepath.Base(fresh)))
		if err != nil {
			t.Fatal(err)
		}
		if !bytes.Equal(got, kept) {
			t.Errorf("%s is not what the generator writes: go run testdata/estuary/generate.go", filepath.Base(fresh))
		}
	}
}

// reviewed is what the tests read of a review's JSON.
type reviewed struct {
	Findings []struct {
		Rule, Request, Fingerprint string
		Deviation                  *struct{ From string }
		Rewrites                   []struct {
			Preferred bool
			Leaves    []string
			Edits     []struct{ Text string }
		}
	}
}

func reviewOf(t *testing.T, status int, folder string, args ...string) reviewed {
	t.Helper()
	var r reviewed
	text := lagwise(t, status, append([]string{"review", "--as", "json", folder}, args...)...)
	if err := json.Unmarshal([]byte(text), &r); err != nil {
		t.Fatal(err)
	}
	return r
}

// The comments of the demo tell a story; this is the list of what it tells.
func TestEstuaryShowsEachFindingOnce(t *testing.T) {
	want := []string{
		" idle-series",
		" suspected-missing-code",
		"bloom-silicate stray-key",
		"bloom-silicate unsuited-pearson",
		"eelgrass-boats shared-drift",
		"eelgrass-nitrate aim-and-method",
		"eelgrass-rain one-sided-drift",
		"mussels-nitrate dropped-differences",
		"mussels-since-1995 dropped-differences",
		"mussels-since-1995 short-record, under a deviation",
		"nitrate-effect drifting-regression",
		"nitrate-effect-gls drifting-regression",
		"nitrate-effect-gls near-unit-root-errors",
		"north-south autocorrelated-levels",
		"north-south unstated-aim",
		"rain-gales leftover-autocorrelation",
		"rain-gales over-differencing",
		"tide-effect autocorrelated-residuals",
		"warm-months-oxygen leftover-autocorrelation",
		"warm-water-oxygen leftover-season",
	}
	var got []string
	for _, f := range reviewOf(t, exitHeld, estuary).Findings {
		words := f.Request + " " + f.Rule
		if f.Deviation != nil {
			words += ", under a deviation"
		}
		got = append(got, words)
	}
	slices.Sort(got)
	if !slices.Equal(got, want) {
		t.Errorf("found\n%s\nwant\n%s", strings.Join(got, "\n"), strings.Join(want, "\n"))
	}
}

// Amending the demo leaves what no rewrite mends, and a second run changes
// nothing.
func TestEstuaryAmends(t *testing.T) {
	folder := estuaryCopy(t)
	lagwise(t, exitHeld, "amend", folder)
	var left []string
	for _, f := range reviewOf(t, exitHeld, folder).Findings {
		if f.Deviation == nil {
			left = append(left, f.Rule)
		}
	}
	slices.Sort(left)
	want := []string{"aim-and-method", "dropped-differences", "dropped-differences", "idle-series", "suspected-missing-code", "unstated-aim"}
	if !slices.Equal(left, want) {
		t.Errorf("left %v, want %v", left, want)
	}
	before := readAll(t, folder)
	lagwise(t, exitHeld, "amend", folder)
	if after := readAll(t, folder); after != before {
		t.Error("a second run changed the documents again")
	}
	for line := range strings.Lines(readAll(t, estuary)) {
		if strings.HasPrefix(line, "#") && !strings.Contains(before, line) {
			t.Errorf("this comment is lost: %s", line)
		}
	}
}

func readAll(t *testing.T, folder string) string {
	t.Helper()
	files, err := filepath.Glob(filepath.Join(folder, "*", "*.toml"))
	if err != nil {
		t.Fatal(err)
	}
	var all strings.Builder
	for _, f := range files {
		text, err := os.ReadFile(f)
		if err != nil {
			t.Fatal(err)
		}
		all.Write(text)
	}
	return all.String()
}

func TestStatuses(t *testing.T) {
	lagwise(t, exitHeld, "review", estuary)
	lagwise(t, exitFailed, "review", filepath.Join(estuary, "not-there"))
	lagwise(t, exitFailed, "review", estuary, filepath.Join(estuary, "not-there"))
	lagwise(t, exitFine, "review", estuary+"/lab.conventions.toml")
	lagwise(t, exitFailed, "review", "--as", "prose", estuary)
	lagwise(t, exitFailed, "revue")
	lagwise(t, exitFine, "screen", estuary)
	lagwise(t, exitFine, "compute", estuary)
	lagwise(t, exitHeld, "amend", "--show", estuary)
}

func TestInterruptedRunsEndWith130(t *testing.T) {
	ctx, stop := context.WithCancel(context.Background())
	stop()
	var out, trouble bytes.Buffer
	folder := estuaryCopy(t)
	before := readAll(t, folder)
	if got := run(ctx, streams{strings.NewReader(""), &out, &trouble}, []string{"amend", folder}); got != exitInterrupted {
		t.Errorf("status %d\n%s", got, trouble.String())
	}
	if readAll(t, folder) != before {
		t.Error("an interrupted run wrote")
	}
}

func TestWorkersNeverChangeTheBytes(t *testing.T) {
	for _, command := range []string{"review", "compute", "screen"} {
		status := exitFine
		if command == "review" {
			status = exitHeld
		}
		one := lagwise(t, status, command, "--as", "json", "--workers", "1", estuary)
		eight := lagwise(t, status, command, "--as", "json", "--workers", "8", estuary)
		if one != eight {
			t.Errorf("%s: one worker and eight write different bytes", command)
		}
	}
}

// The choice of a rewrite never looks at the result: with one series turned
// upside down the same rules speak and the same rewrites are preferred.
func TestSignNeverChangesTheChoice(t *testing.T) {
	folder := estuaryCopy(t)
	for file, column := range map[string]int{"shore-annual.csv": 1, "sonde-monthly.csv": 2, "turbidity-daily.csv": 1} {
		turn(t, filepath.Join(folder, "data", file), column)
	}
	upright, turned := reviewOf(t, exitHeld, estuary), reviewOf(t, exitHeld, folder)
	a, b := choices(upright), choices(turned)
	if !slices.Equal(a, b) {
		t.Errorf("upright\n%s\nturned\n%s", strings.Join(a, "\n"), strings.Join(b, "\n"))
	}
}

// turn multiplies one column of a CSV file by -1.
func turn(t *testing.T, file string, column int) {
	t.Helper()
	text, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	lines := strings.Split(strings.TrimSpace(string(text)), "\n")
	for i, line := range lines[1:] {
		cells := strings.Split(line, ",")
		if cells[column] != "" {
			cells[column] = "-" + cells[column]
		}
		lines[i+1] = strings.Join(cells, ",")
	}
	if err := os.WriteFile(file, []byte(strings.Join(lines, "\n")+"\n"), 0o644); err != nil {
		t.Fatal(err)
	}
}

// choices lists what speaks and what is offered, without numbers.
func choices(r reviewed) []string {
	var all []string
	for _, f := range r.Findings {
		line := f.Request + " " + f.Rule
		for _, w := range f.Rewrites {
			line += " |"
			for _, e := range w.Edits {
				line += " " + strings.TrimSpace(e.Text)
			}
			if w.Preferred {
				line += " (preferred)"
			}
			line += " leaves " + strings.Join(w.Leaves, ",")
		}
		all = append(all, line)
	}
	return all
}
