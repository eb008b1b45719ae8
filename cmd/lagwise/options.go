package main

import (
	"errors"
	"flag"
	"fmt"
	"io"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"time"

	"lagwise/lint/dataset"
	"lagwise/lint/engine"
	"lagwise/lint/finding"
	"lagwise/rules"
)

var errHelp = errors.New("help was asked for")

// options are those that the batch commands share.
type options struct {
	as          string
	also        []output
	holdAt      finding.Severity
	onDate      string
	dataRoots   []string
	workers     int
	conventions string
	quiet       bool
	named       string
	known       string
	textOnly    bool
	limits      dataset.Limits
	paths       []string
}

// output is one --also FORMAT=FILE.
type output struct{ format, file string }

// flags is the parser of one command.
type flags struct {
	*flag.FlagSet
	formats []string
	also    list
	holdAt  string
	roots   list
	limits  list
}

// list is an option that may be given several times.
type list []string

func (l *list) String() string     { return strings.Join(*l, " ") }
func (l *list) Set(s string) error { *l = append(*l, s); return nil }

func newFlags(command string, s streams, o *options, formats ...string) *flags {
	f := &flags{FlagSet: flag.NewFlagSet("lagwise "+command, flag.ContinueOnError), formats: formats}
	f.SetOutput(io.Discard)
	f.StringVar(&o.as, "as", "text", "the form of the output: "+strings.Join(formats, ", "))
	f.Var(&f.also, "also", "FORMAT=FILE: write this form to a file too (repeatable)")
	f.StringVar(&o.onDate, "on-date", time.Now().Format(time.DateOnly), "the day on which deviations are judged, YYYY-MM-DD")
	f.Var(&f.roots, "data-root", "a folder outside the root that data may stand in (repeatable)")
	f.Var(&f.limits, "limit", "NAME=N: raise a limit on data files, by the name that its message gives (repeatable)")
	f.IntVar(&o.workers, "workers", 0, "how many computations run at a time (0: one a processor)")
	f.StringVar(&o.conventions, "conventions", "", "this conventions file instead of those that are found")
	f.BoolVar(&o.quiet, "quiet", false, "print nothing but what was asked for")
	f.Usage = func() {
		fmt.Fprintf(s.out, "lagwise %s\n\n", command)
		f.SetOutput(s.out)
		f.PrintDefaults()
	}
	return f
}

// parse takes options and paths in any order.
func (f *flags) parse(args []string, o *options) error {
	for len(args) > 0 {
		if err := f.Parse(args); err != nil {
			if errors.Is(err, flag.ErrHelp) {
				return errHelp
			}
			return &usageError{err.Error()}
		}
		rest := f.Args()
		if len(rest) == 0 {
			break
		}
		o.paths = append(o.paths, rest[0])
		args = rest[1:]
	}
	return f.check(o)
}

func (f *flags) check(o *options) error {
	if !slices.Contains(f.formats, o.as) {
		return &usageError{fmt.Sprintf("--as takes %s, not %q", strings.Join(f.formats, ", "), o.as)}
	}
	for _, a := range f.also {
		format, file, ok := strings.Cut(a, "=")
		if !ok || file == "" || !slices.Contains(f.formats, format) {
			return &usageError{fmt.Sprintf("--also takes FORMAT=FILE with a format of %s, not %q", strings.Join(f.formats, ", "), a)}
		}
		o.also = append(o.also, output{format, file})
	}
	if _, err := time.Parse(time.DateOnly, o.onDate); err != nil {
		return &usageError{fmt.Sprintf("--on-date takes YYYY-MM-DD, not %q", o.onDate)}
	}
	if f.holdAt != "" {
		held, ok := finding.ParseSeverity(f.holdAt)
		if !ok || held == finding.None {
			return &usageError{fmt.Sprintf("--hold-at takes error, warning, information or hint, not %q", f.holdAt)}
		}
		o.holdAt = held
	}
	if o.workers < 0 {
		return &usageError{fmt.Sprintf("--workers takes 0 or more, not %d", o.workers)}
	}
	o.dataRoots = f.roots
	return f.raise(o)
}

// raise takes in the limits that a person raised.
func (f *flags) raise(o *options) error {
	o.limits = dataset.DefaultLimits()
	for _, l := range f.limits {
		name, number, _ := strings.Cut(l, "=")
		to, err := strconv.ParseInt(number, 10, 64)
		if err == nil {
			err = o.limits.Raise(name, to)
		}
		if err != nil {
			return &usageError{fmt.Sprintf("--limit takes NAME=N, not %q: %v", l, err)}
		}
	}
	return nil
}

// engine makes the engine that the options describe.
func (o *options) engine() (*engine.Engine, error) {
	conventions := o.conventions
	if conventions != "" {
		abs, err := filepath.Abs(conventions)
		if err != nil {
			return nil, err
		}
		conventions = abs
	}
	return engine.New(engine.Options{Rules: rules.All(), Workers: o.workers, OnDate: o.onDate, DataRoots: o.dataRoots,
		Conventions: conventions, Limits: o.limits, Version: version}), nil
}
