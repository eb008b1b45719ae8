package engine

import (
	"context"
	"errors"
	"fmt"
	"maps"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"lagwise/lint/request"
)

// Find returns the documents that are named, or that stand in the folders
// named, sorted and once each; without paths, in the folders of the
// workspace. Folders whose name starts with a dot are skipped, links to
// folders are not followed, and what the conventions exclude is left out
// unless it is named. The documents that were found are returned beside an
// error about the paths that cannot be searched.
func (ed *Edition) Find(paths ...string) ([]string, error) {
	return ed.FindIn(context.Background(), paths...)
}

// FindIn is Find under a context.
func (ed *Edition) FindIn(ctx context.Context, paths ...string) ([]string, error) {
	if len(paths) == 0 {
		paths = ed.folders
	}
	found := map[string]bool{}
	var troubles []error
	for _, p := range clean(paths) {
		if err := ed.findAt(ctx, p, found); err != nil {
			troubles = append(troubles, err)
		}
	}
	if err := ctx.Err(); err != nil {
		return nil, err
	}
	return slices.Sorted(maps.Keys(found)), errors.Join(troubles...)
}

func (ed *Edition) findAt(ctx context.Context, path string, found map[string]bool) error {
	_, open := ed.open[path]
	info, err := os.Stat(path)
	switch {
	case open, err == nil && !info.IsDir():
		if request.DocumentKind(path) == request.NoDoc {
			return noDocument(path)
		}
		found[path] = true
		return nil
	case errors.Is(err, os.ErrNotExist):
		return fmt.Errorf("%s is not there", path)
	case err != nil:
		return fmt.Errorf("%s cannot be searched: %w", path, err)
	}
	ed.walk(ctx, path, found)
	return nil
}

func noDocument(path string) error {
	return fmt.Errorf("%s is no document: documents are named NAME.series.toml, NAME.analysis.toml or NAME.conventions.toml", path)
}

// walk collects the documents in a folder and below.
func (ed *Edition) walk(ctx context.Context, folder string, found map[string]bool) {
	if ctx.Err() != nil {
		return
	}
	for _, e := range ed.list(folder) {
		path := filepath.Join(folder, e.name)
		switch {
		case e.folder:
			if !strings.HasPrefix(e.name, ".") && !ed.excluded(path) {
				ed.walk(ctx, path, found)
			}
		case request.DocumentKind(e.name) != request.NoDoc && !ed.excluded(path):
			found[path] = true
		}
	}
}

// list returns the names in a folder, sorted, open documents that are not yet
// on disk included.
func (ed *Edition) list(folder string) []entry {
	names := ed.disk.list(folder)
	for path := range ed.open {
		if filepath.Dir(path) != folder {
			continue
		}
		unsaved := entry{name: filepath.Base(path)}
		if i, there := slices.BinarySearchFunc(names, unsaved, byName); !there {
			names = slices.Insert(slices.Clone(names), i, unsaved)
		}
	}
	return names
}

func byName(a, b entry) int { return strings.Compare(a.name, b.name) }

// documentsIn returns the documents of a kind in one folder, sorted.
func (ed *Edition) documentsIn(folder string, kind request.Doc) []string {
	var all []string
	for _, e := range ed.list(folder) {
		if !e.folder && request.DocumentKind(e.name) == kind {
			all = append(all, filepath.Join(folder, e.name))
		}
	}
	return all
}

// excluded reports whether the nearest conventions that exclude anything
// exclude the path.
func (ed *Edition) excluded(path string) bool {
	l := ed.lab(path)
	if len(l.exclude) == 0 {
		return false
	}
	rel, err := filepath.Rel(l.excludeBase, path)
	if err != nil {
		return false
	}
	for _, pattern := range l.exclude {
		if matches(pattern, filepath.ToSlash(rel)) {
			return true
		}
	}
	return false
}

// upward returns the folders from a folder up to the root, nearest first; the
// folder alone when it does not stand below the root.
func upward(folder, root string) []string {
	all := []string{folder}
	for within(root, folder) && folder != root {
		folder = filepath.Dir(folder)
		all = append(all, folder)
	}
	return all
}
