package engine

import (
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"strings"

	"lagwise/lint/dataset"
)

// disk remembers what was read of the disk until somebody says that it
// changed, so that all editions between two changes agree.
type disk struct {
	files   memo[*snapshot]      // by path
	folders memo[[]entry]        // by path
	roots   memo[string]         // by folder
	guards  memo[*dataset.Roots] // by root
}

// entry is one name in a folder.
type entry struct {
	name   string
	folder bool // a folder, not a link to one
}

// without returns the disk as it stands after the paths changed. Every
// listing is read again: a new file shows nowhere else.
func (d *disk) without(paths []string) *disk {
	fresh := &disk{}
	drop := map[string]bool{}
	for _, p := range paths {
		drop[p] = true
		if strings.Contains(filepath.ToSlash(p)+"/", "/.git/") {
			return fresh // roots may have moved, and every file's name with them
		}
	}
	d.files.without(&fresh.files, drop)
	d.roots.without(&fresh.roots, nil)
	d.guards.without(&fresh.guards, nil)
	return fresh
}

// list returns the names in a folder, sorted; none when it cannot be read.
func (d *disk) list(folder string) []entry {
	return d.folders.get(folder, func() []entry {
		found, _ := os.ReadDir(folder)
		entries := make([]entry, 0, len(found))
		for _, f := range found {
			entries = append(entries, entry{f.Name(), f.IsDir()})
		}
		return entries
	})
}

// readDocument reads a document below the root, and nothing else. The error
// is a *dataset.Refused.
func readDocument(guard *dataset.Roots, path string) ([]byte, error) {
	text, _, err := guard.ReadFile(filepath.Dir(path), filepath.Base(path), documentBytes)
	return text, err
}

// tooLarge is the error of a document above the size limit.
func tooLarge() error {
	return &dataset.Refused{Kind: dataset.ReachedLimit, Message: fmt.Sprintf("the document is larger than %d MB", documentBytes>>20)}
}

// isTooLarge reports whether a document was refused for its size.
func isTooLarge(err error) bool {
	var refused *dataset.Refused
	return errors.As(err, &refused) && refused.Kind == dataset.ReachedLimit
}
