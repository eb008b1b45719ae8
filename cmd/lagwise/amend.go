package main

import (
	"bytes"
	"context"
	"fmt"
	"path/filepath"

	"github.com/rogpeppe/go-internal/diff"

	"lagwise/lint/engine"
)

func amend(ctx context.Context, s streams, args []string) (int, error) {
	o := &options{}
	f := newFlags("amend", s, o, "text")
	f.StringVar(&f.holdAt, "hold-at", "", "fail when something at this severity or above remains")
	f.StringVar(&o.named, "named", "", "with -: the place where the document on standard input would stand")
	request := f.String("request", "", "only this request")
	rule := f.String("for", "", "only what answers this rule")
	show := f.Bool("show", false, "print the difference and write nothing")
	if err := f.parse(args, o); err != nil {
		return exitFailed, err
	}
	showing := *show || len(o.paths) == 0 || o.paths[0] == "-"
	b, err := o.open(s)
	if err != nil {
		return exitFailed, err
	}
	done, err := b.workspace.Amend(ctx, b.documents, engine.AmendOptions{Request: *request, Rule: *rule, Write: !showing})
	if err != nil {
		return exitFailed, err
	}
	status := b.printAmended(s, done, showing)
	if !showing && status == exitFine {
		status, err = b.remaining(ctx, s)
	}
	if b.trouble != nil {
		return exitFailed, b.trouble
	}
	return status, err
}

// printAmended says what was changed, or shows it; the status is 2 where a
// document was left as it was, and 1 where there is a difference to show.
func (b *batch) printAmended(s streams, done *engine.Amended, showing bool) int {
	status := exitFine
	changed := false
	for _, f := range done.Files {
		name := shown(f.Path)
		if f.Err != nil {
			fmt.Fprintf(s.err, "lagwise amend: %v\n", f.Err)
			status = exitFailed
			continue
		}
		if !bytes.Equal(f.Before, f.After) {
			changed = true
			fmt.Fprintln(s.out, name)
			for _, a := range f.Applied {
				fmt.Fprintf(s.out, "  %s\n", a)
			}
			fmt.Fprintf(s.out, "%s", diff.Diff(filepath.ToSlash(name), f.Before, filepath.ToSlash(name), f.After))
		}
		for _, left := range f.Left {
			fmt.Fprintf(s.out, "%s  remains: %s\n", name, left)
		}
	}
	switch {
	case !changed && status == exitFine && !b.quiet:
		fmt.Fprintln(s.out, "Nothing to amend.")
	case changed && showing && status == exitFine:
		status = exitHeld
	}
	return status
}

// remaining is the status of what is left after writing.
func (b *batch) remaining(ctx context.Context, s streams) (int, error) {
	ed := b.workspace.Edition()
	status := exitFine
	for _, path := range b.documents {
		j, err := ed.Judge(ctx, path)
		if err != nil {
			return exitFailed, err
		}
		status = max(status, b.statusOf(s, ed, j, nil))
	}
	return status, nil
}
