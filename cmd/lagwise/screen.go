package main

import (
	"context"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"lagwise/lint/document"
	"lagwise/lint/present"
	"lagwise/lint/request"
	"lagwise/lint/result"
)

func screen(ctx context.Context, s streams, args []string) (int, error) {
	o := &options{}
	f := newFlags("screen", s, o, "text", "json", "csv", "markdown")
	if err := f.parse(args, o); err != nil {
		return exitFailed, err
	}
	bare, err := o.takeBare()
	if err != nil {
		return exitFailed, err
	}
	b, err := o.open(s)
	if err != nil {
		return exitFailed, err
	}
	b.layManifests(bare)
	ed := b.workspace.Edition()
	var all []result.Screened
	err = b.each(ctx, s, "screening", func(path string) error {
		if request.DocumentKind(path) != request.ManifestDoc {
			return nil
		}
		got, err := ed.Screen(ctx, path)
		if slices.Contains(bare, strings.TrimSuffix(path, manifestEnding)) {
			for i := range got {
				got[i].Manifest = strings.TrimSuffix(got[i].Manifest, manifestEnding)
			}
		}
		all = append(all, got...)
		return err
	})
	if err != nil {
		return exitFailed, err
	}
	err = o.write(s, forms{
		"text":     func(w io.Writer) error { return present.ScreenText(w, all) },
		"json":     func(w io.Writer) error { return present.ScreenJSON(w, b.head(), all) },
		"csv":      func(w io.Writer) error { return present.ScreenCSV(w, all) },
		"markdown": func(w io.Writer) error { return present.ScreenMarkdown(w, all) },
	})
	if b.trouble != nil {
		return exitFailed, b.trouble
	}
	return exitFine, err
}

// takeBare takes the data files out of the paths: whatever is named, is a
// file, and is no document.
func (o *options) takeBare() ([]string, error) {
	var bare []string
	named := len(o.paths)
	o.paths = slices.DeleteFunc(o.paths, func(p string) bool {
		info, err := os.Stat(p)
		isData := err == nil && !info.IsDir() && request.DocumentKind(p) == request.NoDoc
		if isData {
			bare = append(bare, p)
		}
		return isData
	})
	for i, p := range bare {
		abs, err := filepath.Abs(p)
		if err != nil {
			return nil, err
		}
		bare[i] = abs
	}
	if named > 0 && len(o.paths) == 0 {
		o.paths = []string{bare[0] + manifestEnding}
	}
	return bare, nil
}

const manifestEnding = ".series.toml"

// layManifests gives each bare data file a manifest of one record that stands
// beside it in this run alone.
func (b *batch) layManifests(bare []string) {
	for _, path := range bare {
		base := filepath.Base(path)
		name := strings.TrimSuffix(base, filepath.Ext(base))
		text := fmt.Sprintf("[record.%s]\nfile = %s\n", document.Quote(name), document.Quote(base))
		b.workspace.Open(path+manifestEnding, []byte(text), 0)
		if !slices.Contains(b.documents, path+manifestEnding) {
			b.documents = append(b.documents, path+manifestEnding)
		}
	}
	if len(bare) > 0 && b.trouble != nil && len(b.documents) == len(bare) {
		b.trouble = nil // the only paths were the bare files
	}
}
