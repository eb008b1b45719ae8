package lint_test

import (
	"go/parser"
	"go/token"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// mayImport says which of our own packages each package may import. Anything
// else is forbidden: imports point one way. A name that ends in /* stands for
// all packages below it.
var mayImport = map[string][]string{
	"lint/document":  {},
	"lint/request":   {"lint/document"},
	"lint/dataset":   {"lint/document", "lint/request", "stats/*"},
	"lint/evidence":  {"lint/document", "lint/request", "lint/dataset", "stats/*"},
	"lint/result":    {"lint/document", "lint/request", "lint/dataset", "lint/evidence", "stats/*"},
	"lint/finding":   {"lint/document", "lint/request"},
	"lint":           {"lint/document", "lint/request", "lint/evidence", "lint/result", "lint/finding"},
	"lint/procedure": {"lint/document", "lint/request", "lint/evidence"},
	"lint/present":   {"lint/document", "lint/request", "lint/evidence", "lint/result", "lint/finding"},
	"lint/engine":    {"lint", "lint/document", "lint/request", "lint/dataset", "lint/evidence", "lint/result", "lint/finding", "lint/procedure"},
	"rules":          {"lint", "lint/document", "lint/request", "lint/evidence", "lint/result", "lint/finding"},
	"stats/*":        {"stats/*"},
	"server/*":       {"lint", "lint/*", "server/*"},
	"cmd/*":          {"lint", "lint/*", "server", "server/*", "rules", "cmd/*"},
}

// mayNotImport says what a package must not take from the standard library:
// a rule sees the world only through its inquiry, and numerics do no I/O.
var mayNotImport = map[string][]string{
	"rules":          {"os", "time", "net", "io/fs"},
	"lint/procedure": {"os", "time", "net", "io/fs"},
	"stats/*":        {"os", "time", "net", "io/fs"},
	"server/*":       {"os/exec"},
	"lint/*":         {"os/exec", "net"},
}

func TestImportsPointOneWay(t *testing.T) {
	for _, f := range productionFiles(t) {
		allowed := lookUp(mayImport, f.pkg)
		if allowed == nil {
			t.Errorf("%s: nothing says what package %s may import", f.path, f.pkg)
			continue
		}
		forbidden := lookUp(mayNotImport, f.pkg)
		for _, imported := range f.imports {
			own, ours := strings.CutPrefix(imported, "lagwise/")
			switch {
			case ours && !slices.ContainsFunc(allowed, func(a string) bool { return covers(a, own) }):
				t.Errorf("%s imports %s; %s may import only %v", f.path, imported, f.pkg, allowed)
			case slices.Contains(forbidden, imported):
				t.Errorf("%s imports %s, which %s must not", f.path, imported, f.pkg)
			case imported == "testing" || strings.HasPrefix(imported, "testing/"):
				t.Errorf("%s imports %s, which belongs in tests", f.path, imported)
			case imported == "C":
				t.Errorf("%s uses cgo", f.path)
			}
		}
	}
}

func TestNoFileIsTooLong(t *testing.T) {
	const most = 500
	for _, f := range productionFiles(t) {
		if f.lines > most {
			t.Errorf("%s has %d lines, more than %d: split it", f.path, f.lines, most)
		}
	}
}

type sourceFile struct {
	path, pkg string
	imports   []string
	lines     int
}

// productionFiles parses every Go file of the module that is no test.
func productionFiles(t *testing.T) []sourceFile {
	t.Helper()
	const root = ".."
	var files []sourceFile
	err := filepath.WalkDir(root, func(path string, d fs.DirEntry, err error) error {
		if err != nil {
			return err
		}
		if d.IsDir() {
			if name := d.Name(); path != root && (strings.HasPrefix(name, ".") || name == "testdata" || name == "node_modules") {
				return filepath.SkipDir
			}
			return nil
		}
		if !strings.HasSuffix(path, ".go") || strings.HasSuffix(path, "_test.go") {
			return nil
		}
		files = append(files, parsed(t, root, path))
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	if len(files) < 20 {
		t.Fatalf("only %d files found: the walk is broken", len(files))
	}
	return files
}

func parsed(t *testing.T, root, path string) sourceFile {
	t.Helper()
	text, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	file, err := parser.ParseFile(token.NewFileSet(), path, text, parser.ImportsOnly)
	if err != nil {
		t.Fatal(err)
	}
	pkg, err := filepath.Rel(root, filepath.Dir(path))
	if err != nil {
		t.Fatal(err)
	}
	f := sourceFile{path: path, pkg: filepath.ToSlash(pkg), lines: strings.Count(string(text), "\n")}
	for _, i := range file.Imports {
		imported, err := strconv.Unquote(i.Path.Value)
		if err != nil {
			t.Fatal(err)
		}
		f.imports = append(f.imports, imported)
	}
	return f
}

// lookUp returns the entry of a package, or of the tree that it is in.
func lookUp(table map[string][]string, pkg string) []string {
	if exact, ok := table[pkg]; ok {
		return exact
	}
	for name, entry := range table {
		if strings.HasSuffix(name, "/*") && covers(name, pkg) {
			return entry
		}
	}
	return nil
}

// covers reports whether a name of the table stands for a package.
func covers(name, pkg string) bool {
	tree, all := strings.CutSuffix(name, "/*")
	return name == pkg || all && (pkg == tree || strings.HasPrefix(pkg, tree+"/"))
}
