//go:build unix

package dataset

import (
	"errors"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"syscall"
	"testing"

	"lagwise/lint/request"
)

// estuary makes a repository with data and a secret beside it.
func estuary(t *testing.T) (root string) {
	t.Helper()
	base := realPath(t.TempDir())
	root = filepath.Join(base, "lab")
	write(t, filepath.Join(root, ".git", "config"), "secret,1\n")
	write(t, filepath.Join(root, "data", "boats.csv"), "year,boats\n2001,1\n2002,2\n")
	write(t, filepath.Join(base, "outside", "secret.csv"), "password,1\nhunter2,2\n")
	return root
}

func TestFindRoot(t *testing.T) {
	root := estuary(t)
	doc := write(t, filepath.Join(root, "analyses", "eelgrass.analysis.toml"), "")
	if got := FindRoot(doc, filepath.Join(root, "analyses")); got != root {
		t.Errorf("got %s", got)
	}
	os.RemoveAll(filepath.Join(root, ".git"))
	if got := FindRoot(doc, root); got != root {
		t.Errorf("folder it was found under: got %s", got)
	}
	if got := FindRoot(doc, doc); got != filepath.Dir(doc) {
		t.Errorf("a file: got %s", got)
	}
	t.Setenv("HOME", root)
	t.Setenv("USERPROFILE", root)
	write(t, filepath.Join(root, ".git", "config"), "")
	if got := FindRoot(doc, root); got != filepath.Dir(doc) {
		t.Errorf("the home folder became a root: %s", got)
	}
	if got := FindRoot(filepath.Join(root, "x.series.toml"), root); got != "" {
		t.Errorf("the home folder became a root: %s", got)
	}
	if got := FindRoot("/x.series.toml", "/"); got != "" && runtime.GOOS != "windows" {
		t.Errorf("the root of the file system became a root: %s", got)
	}
	_, err := NewRoots("", nil).Resolve(root, "x.csv")
	wantMessage(t, err, "has no root", "--data-root")
}

func TestRefusedByText(t *testing.T) {
	root := estuary(t)
	roots := NewRoots(root, nil)
	for _, written := range []string{"", "/etc/passwd", `\\server\share\x.csv`, "//server/share/x.csv", `\\?\C:\x.csv`, `C:\x.csv`, "C:x.csv", "c:/x.csv",
		"x.csv:stream", "a\x00b.csv", "../../outside/secret.csv", "../../../../../../etc/passwd", ".git/config", "../.git/config",
		"con", "CON.csv", "sub/nul.txt", "com1.csv", "LPT9", `sub\x.csv`, ".hidden.csv", "data/../../outside/secret.csv"} {
		_, _, err := roots.ReadFile(filepath.Join(root, "data"), written, 1<<20)
		var refused *Refused
		if !errors.As(err, &refused) {
			t.Errorf("%q was read: %v", written, err)
			continue
		}
		if strings.Contains(err.Error(), "hunter2") || strings.Contains(err.Error(), "password") || strings.Contains(err.Error(), "root:") {
			t.Errorf("%q: the message quotes the file: %s", written, err)
		}
	}
	for _, written := range []string{"boats.csv", "./boats.csv", "../data/boats.csv", "../data//boats.csv"} {
		if _, _, err := roots.ReadFile(filepath.Join(root, "data"), written, 1<<20); err != nil {
			t.Errorf("%q: %s", written, err)
		}
	}
}

func TestMessagesSayTheRootAndHowToAllowMore(t *testing.T) {
	root := estuary(t)
	_, err := NewRoots(root, nil).Resolve(root, "../outside/secret.csv")
	wantMessage(t, err, root, "--data-root", ".git")
	outside := filepath.Join(filepath.Dir(root), "outside")
	text, id, err := NewRoots(root, []string{outside}).ReadFile(root, "../outside/secret.csv", 1<<20)
	if err != nil || len(text) == 0 || id.Size != int64(len(text)) {
		t.Errorf("a data root was refused: %v", err)
	}
}

func TestLinks(t *testing.T) {
	root := estuary(t)
	link := func(to, at string) {
		if err := os.Symlink(to, filepath.Join(root, at)); err != nil {
			t.Fatal(err)
		}
	}
	link("../outside/secret.csv", "out.csv")
	link("../outside", "outside")
	link("data/boats.csv", "in.csv")
	link(".git/config", "config.csv")
	link("loop.csv", "loop.csv")
	link("../outside/none.csv", "dangling.csv")
	roots := NewRoots(root, nil)
	for written, want := range map[string]string{"out.csv": "link", "outside/secret.csv": "link", "config.csv": "dot", "loop.csv": "loop.csv", "dangling.csv": "dangling.csv"} {
		_, _, err := roots.ReadFile(root, written, 1<<20)
		wantMessage(t, err, want)
	}
	if _, _, err := roots.ReadFile(root, "in.csv", 1<<20); err != nil {
		t.Error(err)
	}
	linked := filepath.Join(t.TempDir(), "lab")
	if err := os.Symlink(root, linked); err != nil {
		t.Fatal(err)
	}
	if _, _, err := NewRoots(linked, nil).ReadFile(linked, "data/boats.csv", 1<<20); err != nil {
		t.Errorf("a root behind a link: %s", err)
	}
	if got := NewRoots(linked, nil).Rel(filepath.Join(linked, "data", "boats.csv")); got != "data/boats.csv" {
		t.Errorf("rel %s", got)
	}
}

func TestOnlyRegularFilesAreOpened(t *testing.T) {
	root := estuary(t)
	if err := syscall.Mkfifo(filepath.Join(root, "pipe.csv"), 0o644); err != nil {
		t.Fatal(err)
	}
	roots := NewRoots(root, []string{"/dev"})
	dev, _ := filepath.Rel(root, "/dev/zero")
	for written, want := range map[string]string{"pipe.csv": "not a regular file", filepath.ToSlash(dev): "not a regular file",
		"data": "is a folder", "none.csv": "no such file"} {
		_, _, err := roots.ReadFile(root, written, 1<<20)
		wantMessage(t, err, want)
	}
	if abs, err := roots.Resolve(root, "data/none.csv"); err != nil || abs != filepath.Join(root, "data", "none.csv") {
		t.Errorf("a missing file: %s, %v", abs, err)
	}
	_, _, err := roots.ReadFile(root, "data/boats.csv", 5)
	var refused *Refused
	if !errors.As(err, &refused) || refused.Kind != ReachedLimit {
		t.Errorf("%v", err)
	}
	for _, file := range []string{"estuary.series.toml", "book.xlsx"} {
		_, err := NewStore(DefaultLimits()).Record(t.Context(), roots, root, &request.Record{File: file, HeaderRows: 1})
		wantMessage(t, err, "csv")
	}
}
