package engine

import (
	"path/filepath"
	"slices"

	"lagwise/lint/evidence"
	"lagwise/lint/request"
)

// lab is the conventions in force in one folder.
type lab struct {
	merged      *request.Conventions // never nil
	settings    evidence.Settings
	exclude     []string
	excludeBase string   // folder that the patterns are relative to
	digest      string   // of the texts of these files
	reaches     []string // every conventions file that was taken or looked for
}

// step is one conventions file in the order in which they are taken.
type step struct {
	file   *snapshot
	folder string // for which it was taken
}

// lab returns the conventions in force for a document or folder at the path.
func (ed *Edition) lab(path string) *lab {
	folder := filepath.Dir(filepath.Clean(path))
	return ed.labs.get(folder, func() *lab { return ed.layOver(ed.chain(folder)) })
}

// chain lists the conventions files for a folder in the order in which they
// are taken: from the root down, each after what it builds on.
func (ed *Edition) chain(folder string) []step {
	if given := ed.engine.options.Conventions; given != "" {
		return ed.withBase(ed.snapshot(given), ed.Root(filepath.Join(folder, "x")), nil)
	}
	var steps []step
	folders := upward(folder, ed.Root(filepath.Join(folder, "x")))
	slices.Reverse(folders)
	for _, f := range folders {
		if files := ed.documentsIn(f, request.ConventionsDoc); len(files) > 0 {
			steps = append(steps, ed.withBase(ed.snapshot(files[0]), f, nil)...)
		}
	}
	return steps
}

// givenConventions is the error of conventions that were given to replace the
// search and cannot be read: nothing is judged without them.
func (ed *Edition) givenConventions() error {
	if given := ed.engine.options.Conventions; given != "" {
		return ed.snapshot(given).err
	}
	return nil
}

// withBase lists a conventions file after what it builds on; a file that
// builds on itself by any way is taken once.
func (ed *Edition) withBase(s *snapshot, folder string, above []string) []step {
	var steps []step
	above = append(slices.Clip(above), s.path)
	for _, written := range s.conventions().BuildsOn {
		path, err := ed.resolve(s, written)
		if err == nil && !slices.Contains(above, path) {
			steps = append(steps, ed.withBase(ed.snapshot(path), folder, above)...)
		}
	}
	return append(steps, step{s, folder})
}

// layOver merges conventions in their order.
func (ed *Edition) layOver(steps []step) *lab {
	l := &lab{merged: &request.Conventions{}}
	var texts []string
	for _, s := range steps {
		l.reaches = append(l.reaches, s.file.path)
		texts = append(texts, s.file.path, string(s.file.text))
		if s.file.err != nil {
			continue
		}
		over := s.file.conventions().Conventions
		l.merged = request.Merge(l.merged, over)
		if given := over.Review.Exclude; given != nil && slices.Equal(given, l.merged.Review.Exclude) {
			l.exclude, l.excludeBase = given, s.folder
		}
	}
	sum := digest(texts...)
	l.digest = string(sum[:])
	l.settings, _ = evidence.SettingsOf(l.merged) // told where the file is judged
	return l
}

// resolve returns the absolute path that a document names, once its guard
// allows it: as written, so that it is the path under which an editor opens
// the file, links and all.
func (ed *Edition) resolve(from *snapshot, written string) (string, error) {
	folder := filepath.Dir(from.path)
	if _, err := ed.guard(from.root).Resolve(folder, written); err != nil {
		return "", err
	}
	return filepath.Join(folder, filepath.FromSlash(written)), nil
}
