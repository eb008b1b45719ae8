//go:build editors

package editors

import (
	"context"
	"encoding/json"
	"fmt"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
	"time"
)

// rule is the finding that the sittings answer.
const rule = "shared-drift"

const manifest = `[record.shore]
file = "shore.csv"
along = { column = "year", kind = "time", step = "P1Y" }

[series.eelgrass]
unit = "ha"

[series.boats]
unit = "{count}"
`

const analysis = `title = "Étude 😀 of the shore"

[[correlation]]
name = "eelgrass-boats"
aim = "association"
between = ["eelgrass", "boats"]
`

// seen is what a sitting wrote down.
type seen struct {
	Message, Hover, Title string
	Missed, Trouble, Mode string
}

func TestNeovim(t *testing.T) {
	nvim := editor(t, "nvim", "Neovim 0.7 or later (Debian: apt-get install neovim)")
	dir, document := lab(t)
	program := build(t)
	check(t, dir, document, sit(t, dir, exec.Command(nvim, "--headless", "--clean",
		"--cmd", fmt.Sprintf("let g:lagwise_program = '%s'", program),
		"-u", absolute(t, "neovim.lua"), document, "-c", "luafile "+absolute(t, "testdata/neovim.lua"))))
}

func TestEmacs(t *testing.T) {
	emacs := editor(t, "emacs", "Emacs 28 or later with eglot (Debian: apt-get install emacs-nox elpa-eglot)")
	dir, document := lab(t)
	c := exec.Command(emacs, "--batch", "-l", absolute(t, "testdata/emacs.el"))
	c.Env = append(os.Environ(), "PROGRAM="+build(t), "SETUP="+absolute(t, "emacs.el"), "DOCUMENT="+document)
	check(t, dir, document, sit(t, dir, c))
}

// editor finds an editor; its absence is a failure, as nothing is tested then.
func editor(t *testing.T, name, what string) string {
	t.Helper()
	path, err := exec.LookPath(name)
	if err != nil {
		t.Fatalf("these tests start %s, which is not here: install %s", name, what)
	}
	return path
}

func absolute(t *testing.T, path string) string {
	t.Helper()
	abs, err := filepath.Abs(path)
	if err != nil {
		t.Fatal(err)
	}
	return abs
}

// build compiles the program as a user has it.
func build(t *testing.T) string {
	t.Helper()
	program := filepath.Join(t.TempDir(), "lagwise")
	if out, err := exec.Command("go", "build", "-o", program, "lagwise/cmd/lagwise").CombinedOutput(); err != nil {
		t.Fatalf("building the program: %v\n%s", err, out)
	}
	return program
}

// lab lays out a folder with an analysis of two drifting series: random walks
// with opposite drift, the textbook case of a spurious correlation (Granger
// and Newbold 1974).
func lab(t *testing.T) (dir, document string) {
	t.Helper()
	dir, err := filepath.EvalSymlinks(t.TempDir())
	if err != nil {
		t.Fatal(err)
	}
	var rows strings.Builder
	rows.WriteString("year,eelgrass,boats\n")
	state := uint64(20)
	step := func() float64 { // a sum of uniforms is close to normal
		sum := 0.0
		for range 12 {
			state = state*6364136223846793005 + 1442695040888963407
			sum += float64(state>>40) / (1 << 24)
		}
		return sum - 6
	}
	eelgrass, boats := 400.0, 100.0
	for year := 1940; year < 2021; year++ {
		fmt.Fprintf(&rows, "%d,%.2f,%.2f\n", year, math.Abs(eelgrass), math.Abs(boats))
		eelgrass += 4*step() - 2
		boats += 4*step() + 2
	}
	for name, text := range map[string]string{"shore.csv": rows.String(), "shore.series.toml": manifest, "shore.analysis.toml": analysis} {
		if err := os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	return dir, filepath.Join(dir, "shore.analysis.toml")
}

// sit runs an editor and returns what it saw.
func sit(t *testing.T, dir string, c *exec.Cmd) seen {
	t.Helper()
	ctx, cancel := context.WithTimeout(context.Background(), 2*time.Minute)
	defer cancel()
	file := filepath.Join(t.TempDir(), "seen.json")
	run := exec.CommandContext(ctx, c.Path, c.Args[1:]...)
	run.Dir, run.Env = dir, append(c.Environ(), "SEEN="+file, "RULE="+rule, "HOME="+t.TempDir())
	out, err := run.CombinedOutput()
	raw, unread := os.ReadFile(file)
	if unread != nil {
		t.Fatalf("the editor wrote nothing down: %v\n%s", err, out)
	}
	var s seen
	if err := json.Unmarshal(raw, &s); err != nil {
		t.Fatalf("%v in %s", err, raw)
	}
	if s.Missed != "" || s.Trouble != "" {
		t.Fatalf("waited in vain for %s%s; seen: %s\n%s", s.Missed, s.Trouble, raw, out)
	}
	return s
}

// check compares a sitting with what it must have seen and left on disk.
func check(t *testing.T, dir, document string, s seen) {
	t.Helper()
	if !strings.Contains(s.Message, "drift") {
		t.Errorf("the finding says %q", s.Message)
	}
	for _, word := range []string{"eelgrass", "boats", "Dickey-Fuller"} {
		if !strings.Contains(s.Hover, word) {
			t.Errorf("the hover does not show %s:\n%s", word, s.Hover)
		}
	}
	if s.Title == "" {
		t.Error("no rewrite was preferred")
	}
	saved, err := os.ReadFile(document)
	if err != nil {
		t.Fatal(err)
	}
	// The rewrite is one line more; all else is as it was typed.
	var kept []string
	for _, line := range strings.SplitAfter(string(saved), "\n") {
		if strings.Contains(analysis, line) {
			kept = append(kept, line)
		}
	}
	if strings.Join(kept, "") != analysis || !strings.Contains(string(saved), "\non = ") {
		t.Errorf("saved:\n%s", saved)
	}
}
