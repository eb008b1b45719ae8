package main

import (
	"context"
	"io"

	"lagwise/lint/present"
	"lagwise/lint/result"
)

func compute(ctx context.Context, s streams, args []string) (int, error) {
	o := &options{}
	f := newFlags("compute", s, o, "text", "json", "csv", "markdown")
	if err := f.parse(args, o); err != nil {
		return exitFailed, err
	}
	b, err := o.open(s)
	if err != nil {
		return exitFailed, err
	}
	ed := b.workspace.Edition()
	var all []result.Computed
	err = b.each(ctx, s, "computing", func(path string) error {
		got, err := ed.Compute(ctx, path)
		all = append(all, got...)
		return err
	})
	if err != nil {
		return exitFailed, err
	}
	err = o.write(s, forms{
		"text":     func(w io.Writer) error { return present.ComputeText(w, all) },
		"json":     func(w io.Writer) error { return present.ComputeJSON(w, b.head(), all) },
		"csv":      func(w io.Writer) error { return present.ComputeCSV(w, all) },
		"markdown": func(w io.Writer) error { return present.ComputeMarkdown(w, all) },
	})
	if b.trouble != nil {
		return exitFailed, b.trouble
	}
	return computeStatus(all), err
}

// computeStatus is 1 when a request could not be computed as it is written.
func computeStatus(all []result.Computed) int {
	for _, c := range all {
		if c.AsWritten == nil || c.AsWritten.Error != "" {
			return exitHeld
		}
	}
	return exitFine
}
