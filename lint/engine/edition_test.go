package engine

import (
	"os"
	"path/filepath"
	"testing"
)

func TestEditionStaysAsItWas(t *testing.T) {
	root := lay(t, map[string]string{"a.analysis.toml": "title = \"disk\"\n"})
	path := filepath.Join(root, "a.analysis.toml")
	w := New(Options{}).Workspace(root)
	onDisk := w.Edition()
	if string(must(onDisk.Text(path))) != "title = \"disk\"\n" {
		t.Fatal("the disk counts while nothing is open")
	}
	w.Open(path, []byte("title = \"open\"\n"), 7)
	open := w.Edition()
	w.Change(path, []byte("title = \"changed\"\n"), 9)
	for _, c := range []struct {
		ed      *Edition
		title   string
		version int32
	}{{onDisk, "disk", 0}, {open, "open", 7}, {w.Edition(), "changed", 9}} {
		version, _ := c.ed.Version(path)
		if got := c.ed.Analysis(path).Title; got != c.title || version != c.version {
			t.Errorf("title %q version %d, want %q %d", got, version, c.title, c.version)
		}
	}
	write(t, path, "title = \"later\"\n")
	w.Close(path)
	if got := w.Edition().Analysis(path).Title; got != "later" {
		t.Errorf("after closing the disk is read afresh, got %q", got)
	}
}

func TestTreesAreMadeOnce(t *testing.T) {
	root := lay(t, map[string]string{"a.analysis.toml": "", "b.analysis.toml": ""})
	a, b := filepath.Join(root, "a.analysis.toml"), filepath.Join(root, "b.analysis.toml")
	w := New(Options{}).Workspace(root)
	w.Open(a, []byte("title = \"a\"\n"), 1)
	before := w.Edition()
	w.Change(b, []byte("title = \"b\"\n"), 1)
	if before.Tree(a) != w.Edition().Tree(a) {
		t.Error("a change of one document parsed another again")
	}
}

func TestTouchReadsAgain(t *testing.T) {
	root := lay(t, map[string]string{"a.analysis.toml": "title = \"one\"\n"})
	path := filepath.Join(root, "a.analysis.toml")
	w := New(Options{}).Workspace(root)
	first := w.Edition()
	first.Tree(path)
	write(t, path, "title = \"two\"\n")
	write(t, filepath.Join(root, "b.analysis.toml"), "")
	if got := w.Edition().Analysis(path).Title; got != "one" {
		t.Errorf("nobody said that the file changed, got %q", got)
	}
	w.Touch(path)
	if got := w.Edition().Analysis(path).Title; got != "two" {
		t.Errorf("touched, got %q", got)
	}
	if found, _ := w.Edition().Find(); len(found) != 2 {
		t.Errorf("found %v", found)
	}
	if got := first.Analysis(path).Title; got != "one" {
		t.Errorf("the earlier edition changed to %q", got)
	}
}

func TestRoot(t *testing.T) {
	root := lay(t, map[string]string{"sub/.git/HEAD": "", "sub/deep/a.analysis.toml": "", "b.analysis.toml": ""})
	plain, err := filepath.EvalSymlinks(t.TempDir())
	if err != nil {
		t.Fatal(err)
	}
	write(t, filepath.Join(plain, "x/y/c.analysis.toml"), "")
	ed := New(Options{}).Workspace(root, filepath.Join(plain, "x")).Edition()
	for path, want := range map[string]string{
		filepath.Join(root, "sub/deep/a.analysis.toml"): filepath.Join(root, "sub"),
		filepath.Join(root, "b.analysis.toml"):          root,
		filepath.Join(plain, "x/y/c.analysis.toml"):     filepath.Join(plain, "x"),
		filepath.Join(plain, "other.analysis.toml"):     plain,
	} {
		if got := ed.Root(path); got != want {
			t.Errorf("root of %s is %s, want %s", path, got, want)
		}
	}
}

func TestHugeDocumentIsAFinding(t *testing.T) {
	root := lay(t, map[string]string{"huge.analysis.toml": ""})
	path := filepath.Join(root, "huge.analysis.toml")
	if err := os.Truncate(path, 200<<20); err != nil {
		t.Fatal(err)
	}
	w := New(Options{Rules: problemRules()}).Workspace(root)
	wantRules(t, judge(t, w.Edition(), path), "reached-limit")
	w.Open(path, make([]byte, documentBytes+1), 1)
	wantRules(t, judge(t, w.Edition(), path), "reached-limit")
}

func must[V any](v V, err error) V {
	if err != nil {
		panic(err)
	}
	return v
}
