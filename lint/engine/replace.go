package engine

import (
	"bytes"
	"errors"
	"fmt"
	"os"
	"path/filepath"
)

// errChanged is the error of a file that somebody else changed meanwhile.
var errChanged = errors.New("it changed on disk meanwhile and is left alone; run again")

// replace puts the new text in the place of the old, whole or not at all: a
// temporary file beside it, synced, renamed over it. The mode is kept, and of
// a link the target is replaced.
func (ed *Edition) replace(path string, before, after []byte) error {
	s := ed.snapshot(path)
	guard := ed.guard(s.root)
	target, err := guard.Resolve(filepath.Dir(path), filepath.Base(path))
	if err != nil {
		return err
	}
	info, err := os.Stat(target)
	if err != nil {
		return fmt.Errorf("%s cannot be replaced: %w", s.file, err)
	}
	if err := replaceFile(target, info.Mode().Perm(), after, func() error {
		now, err := readDocument(guard, path)
		if err == nil && !bytes.Equal(now, before) {
			err = errChanged
		}
		return err
	}); err != nil {
		return fmt.Errorf("%s: %w", s.file, err)
	}
	return nil
}

// replaceFile writes beside the target and renames; unchanged is asked last,
// just before. On any error the temporary file is taken away.
func replaceFile(target string, mode os.FileMode, text []byte, unchanged func() error) (err error) {
	f, err := os.CreateTemp(filepath.Dir(target), ".lagwise-*")
	if err != nil {
		return err
	}
	defer func() {
		if err != nil {
			f.Close()
			os.Remove(f.Name())
		}
	}()
	if _, err = f.Write(text); err != nil {
		return err
	}
	if err = f.Chmod(mode); err != nil {
		return err
	}
	if err = f.Sync(); err != nil {
		return err
	}
	if err = f.Close(); err != nil {
		return err
	}
	if err = unchanged(); err != nil {
		return err
	}
	if err = os.Rename(f.Name(), target); err != nil {
		return err
	}
	return syncFolder(filepath.Dir(target))
}

// syncFolder makes the new name last; systems that cannot do it do without.
func syncFolder(folder string) error {
	d, err := os.Open(folder)
	if err != nil {
		return nil
	}
	defer d.Close()
	d.Sync()
	return nil
}
