package engine

import (
	"bytes"
	"maps"
	"path/filepath"
	"slices"
	"sync"
)

// Workspace is what changes: the folders, the texts that are open, and what
// the disk held when it was last read. Its methods may be called from any
// goroutine; each change makes a new edition and leaves the earlier ones as
// they were.
type Workspace struct {
	engine *Engine

	mu      sync.Mutex // guards everything below
	folders []string
	open    map[string]overlay
	disk    *disk
	current *Edition // nil: to be made
}

// overlay is the text of an open document, which lies over the disk.
type overlay struct {
	text    []byte
	version int32
	made    *snapshot // nil: to be made
}

// Workspace returns a workspace of these folders.
func (e *Engine) Workspace(folders ...string) *Workspace {
	return &Workspace{engine: e, folders: clean(folders), open: map[string]overlay{}, disk: &disk{}}
}

func clean(paths []string) []string {
	var all []string
	for _, p := range paths {
		all = append(all, filepath.Clean(p))
	}
	slices.Sort(all)
	return slices.Compact(all)
}

// SetFolders replaces the folders.
func (w *Workspace) SetFolders(folders ...string) {
	w.change(func() {
		w.folders = clean(folders)
		w.disk = &disk{}
		for path, o := range w.open {
			w.open[path] = overlay{text: o.text, version: o.version}
		}
	})
}

// Open lays the text over the file. The text is copied.
func (w *Workspace) Open(path string, text []byte, version int32) {
	w.Change(path, text, version)
}

// Change replaces the text of an open document. The text is copied.
func (w *Workspace) Change(path string, text []byte, version int32) {
	w.change(func() {
		w.open[filepath.Clean(path)] = overlay{text: bytes.Clone(text), version: version}
	})
}

// Close takes the text away; the file on disk counts again, read afresh.
func (w *Workspace) Close(path string) {
	path = filepath.Clean(path)
	w.change(func() {
		delete(w.open, path)
		w.disk = w.disk.without([]string{path})
	})
}

// Touch says that these files or folders changed on disk.
func (w *Workspace) Touch(paths ...string) {
	w.change(func() { w.disk = w.disk.without(clean(paths)) })
}

func (w *Workspace) change(do func()) {
	w.mu.Lock()
	defer w.mu.Unlock()
	do()
	w.current = nil
}

// Edition returns the present state; cheap, and the same value until
// something changes.
func (w *Workspace) Edition() *Edition {
	w.mu.Lock()
	defer w.mu.Unlock()
	if w.current == nil {
		w.current = w.make()
	}
	return w.current
}

// make builds the edition; the caller holds the mutex. An open text that did
// not change keeps its snapshot, and with it its tree.
func (w *Workspace) make() *Edition {
	ed := &Edition{engine: w.engine, folders: w.folders, open: make(map[string]*snapshot, len(w.open)), disk: w.disk}
	for _, path := range slices.Sorted(maps.Keys(w.open)) {
		o := w.open[path]
		if o.made == nil || o.made.root != ed.Root(path) {
			o.made = ed.overlaid(path, o.text, o.version)
			w.open[path] = o
		}
		ed.open[path] = o.made
	}
	return ed
}
