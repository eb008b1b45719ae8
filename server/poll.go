package server

import (
	"maps"
	"os"
	"path/filepath"
	"slices"
	"time"
)

// Polling looks at this many files at most, this often.
const (
	pollEvery = 2 * time.Second
	pollFiles = 500
)

// poll remembers what files looked like, and where the next round begins when
// there are more of them than one round looks at.
type poll struct {
	seen map[string]stamp
	next int
}

// stamp tells one state of a file from another; the zero stamp is a file that
// is not there.
type stamp struct {
	size    int64
	changed time.Time
}

func stampOf(path string) stamp {
	info, err := os.Stat(path)
	if err != nil {
		return stamp{}
	}
	return stamp{info.Size(), info.ModTime()}
}

// notice notes what files look like that were not looked at before; the
// caller holds the mutex.
func (w *watch) notice(files []string) {
	for _, f := range files {
		if _, known := w.poll.seen[f]; !known {
			w.poll.seen[f] = stampOf(f)
		}
	}
}

// look is one round: it reports the files that changed since the last look.
func (w *watch) look() {
	w.mu.Lock()
	files := w.unwatched()
	if w.poll.next >= len(files) {
		w.poll.next = 0
	}
	files = files[w.poll.next:min(len(files), w.poll.next+pollFiles)]
	w.poll.next += len(files)
	w.mu.Unlock()
	for _, f := range files {
		now := stampOf(f)
		w.mu.Lock()
		before := w.poll.seen[f]
		w.poll.seen[f] = now
		w.mu.Unlock()
		if now != before {
			w.changed(f)
		}
	}
}

// unwatched lists the files that nobody watches for us: what the open
// documents reach, and the folders above those documents, in which a new
// manifest or new conventions would show. The caller holds the mutex.
func (w *watch) unwatched() []string {
	all := map[string]bool{}
	for path, files := range w.reached {
		for _, f := range append(files, above(path, w.s.folders.list())...) {
			if !w.byClient(f) {
				all[f] = true
			}
		}
	}
	return slices.Sorted(maps.Keys(all))
}

// above lists the folders from a document's own up to its workspace folder;
// of a document outside all of them, its own.
func above(path string, folders []string) []string {
	var found []string
	for dir := filepath.Dir(path); ; dir = filepath.Dir(dir) {
		found = append(found, dir)
		inside := slices.ContainsFunc(folders, func(f string) bool {
			rel, err := filepath.Rel(f, filepath.Dir(dir))
			return err == nil && filepath.IsLocal(rel)
		})
		if !inside {
			return found
		}
	}
}
