package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"

	"lagwise/lint/engine"
	"lagwise/lint/present"
)

// batch is a run over documents on disk.
type batch struct {
	*options
	workspace *engine.Workspace
	documents []string // absolute, sorted
	trouble   error    // of paths that could not be searched
}

// mostInput is how much one document from standard input may hold.
const mostInput = 64 << 20

// open finds the documents of the paths; none: the current folder. A single
// "-" is one document from standard input, as if it stood at --named.
func (o *options) open(s streams) (*batch, error) {
	e, err := o.engine()
	if err != nil {
		return nil, err
	}
	if len(o.paths) == 1 && o.paths[0] == "-" {
		return o.openInput(e, s)
	}
	paths := o.paths
	if len(paths) == 0 {
		paths = []string{"."}
	}
	var absolute, folders []string
	for _, p := range paths {
		abs, err := filepath.Abs(p)
		if err != nil {
			return nil, err
		}
		absolute = append(absolute, abs)
		if info, err := os.Stat(abs); err == nil && !info.IsDir() {
			abs = filepath.Dir(abs)
		}
		folders = append(folders, abs)
	}
	b := &batch{options: o, workspace: e.Workspace(folders...)}
	b.documents, b.trouble = b.workspace.Edition().Find(absolute...)
	return b, nil
}

func (o *options) openInput(e *engine.Engine, s streams) (*batch, error) {
	if o.named == "" {
		return nil, &usageError{"- reads one document from standard input and wants --named PATH, the place where it would stand"}
	}
	path, err := filepath.Abs(o.named)
	if err != nil {
		return nil, err
	}
	text, err := io.ReadAll(io.LimitReader(s.in, mostInput+1))
	if err != nil {
		return nil, err
	}
	if len(text) > mostInput {
		return nil, fmt.Errorf("the document on standard input is longer than %d MB", mostInput>>20)
	}
	b := &batch{options: o, workspace: e.Workspace(filepath.Dir(path)), documents: []string{path}}
	b.workspace.Open(path, text, 0)
	return b, nil
}

// head opens the JSON of the run.
func (b *batch) head() present.Head {
	root := ""
	if len(b.documents) > 0 {
		root = filepath.ToSlash(b.workspace.Edition().Root(b.documents[0]))
	}
	return present.NewHead(version, root, b.onDate)
}

// each runs work on every document. A document that cannot be worked on is
// trouble of the run, and the others are still told; only the end of the
// context stops it.
func (b *batch) each(ctx context.Context, s streams, doing string, work func(path string) error) error {
	p := newProgress(s.err, doing, len(b.documents), b.quiet)
	defer p.end()
	for i, path := range b.documents {
		if err := ctx.Err(); err != nil {
			return err
		}
		p.at(i)
		if err := work(path); err != nil && ctx.Err() == nil {
			b.trouble = errors.Join(b.trouble, err)
		}
	}
	return ctx.Err()
}

// shown is a path as the text names it: relative to the current folder.
func shown(path string) string {
	here, err := os.Getwd()
	if err != nil {
		return path
	}
	rel, err := filepath.Rel(here, path)
	if err != nil {
		return path
	}
	return filepath.ToSlash(rel)
}

// forms are the forms that a command writes, by name.
type forms map[string]func(io.Writer) error

// write sends each form that is asked for where it belongs.
func (o *options) write(s streams, all forms) error {
	if err := all[o.as](s.out); err != nil {
		return err
	}
	for _, a := range o.also {
		if err := writeFile(a.file, all[a.format]); err != nil {
			return err
		}
	}
	return nil
}

// writeFile writes a file as a whole or not at all.
func writeFile(name string, write func(io.Writer) error) error {
	f, err := os.CreateTemp(filepath.Dir(name), ".lagwise-*")
	if err != nil {
		return err
	}
	defer os.Remove(f.Name())
	if err := write(f); err != nil {
		f.Close()
		return err
	}
	if err := f.Chmod(0o644); err != nil {
		f.Close()
		return err
	}
	if err := f.Close(); err != nil {
		return err
	}
	return os.Rename(f.Name(), name)
}
