package main

import (
	"context"
	"encoding/json"
	"fmt"
	"io"
	"os"

	"lagwise/lint/engine"
	"lagwise/lint/finding"
	"lagwise/lint/present"
	"lagwise/lint/result"
)

func review(ctx context.Context, s streams, args []string) (int, error) {
	o := &options{}
	f := newFlags("review", s, o, "text", "json")
	f.StringVar(&f.holdAt, "hold-at", "", "fail at this severity or above: error, warning, information, hint (beats the conventions)")
	f.StringVar(&o.named, "named", "", "with -: the place where the document on standard input would stand")
	f.StringVar(&o.known, "known", "", "an earlier review's JSON: what it lists is shown and does not hold")
	f.BoolVar(&o.textOnly, "documents-only", false, "judge the documents and read no data")
	if err := f.parse(args, o); err != nil {
		return exitFailed, err
	}
	known, err := readKnown(o.known)
	if err != nil {
		return exitFailed, err
	}
	b, err := o.open(s)
	if err != nil {
		return exitFailed, err
	}
	all, status, err := b.reviewAll(ctx, s, known)
	if err != nil {
		return exitFailed, err
	}
	err = o.write(s, forms{
		"text": func(w io.Writer) error { return present.ReviewText(w, all) },
		"json": func(w io.Writer) error { return present.ReviewJSON(w, b.head(), all) },
	})
	if b.trouble != nil {
		return exitFailed, b.trouble
	}
	return status, err
}

// reviewAll judges every document. The status is what the findings make of it.
func (b *batch) reviewAll(ctx context.Context, s streams, known map[string]bool) ([]present.Reviewed, int, error) {
	ed := b.workspace.Edition()
	var all []present.Reviewed
	status := exitFine
	err := b.each(ctx, s, "reviewing", func(path string) error {
		j, err := b.judge(ctx, ed, path)
		if err != nil {
			return err
		}
		explained, err := b.explain(ctx, ed, j)
		if err != nil {
			return err
		}
		all = append(all, present.Reviewed{File: j.File, Shown: shown(path), Findings: j.Findings, Explained: explained,
			Known: known, Requests: j.Requests, Series: j.Series})
		status = max(status, b.statusOf(s, ed, j, known))
		return nil
	})
	return all, status, err
}

func (b *batch) judge(ctx context.Context, ed *engine.Edition, path string) (*engine.Judgement, error) {
	if b.textOnly {
		return ed.Known(path), nil
	}
	return ed.Prove(ctx, path)
}

// explain gathers the evidence of the requests that something is said of.
func (b *batch) explain(ctx context.Context, ed *engine.Edition, j *engine.Judgement) (map[string]*result.Explanation, error) {
	if b.textOnly {
		return nil, nil
	}
	spoken := map[string]bool{}
	for _, f := range j.Findings {
		spoken[f.Request] = true
	}
	explained := map[string]*result.Explanation{}
	for _, asked := range ed.Requests(j.Path) {
		if !spoken[asked.Name] {
			continue
		}
		e, err := ed.Explain(ctx, j.Path, asked.Index)
		if err != nil {
			return nil, err
		}
		explained[asked.Name] = e
	}
	return explained, nil
}

// statusOf is the exit status that one document brings about.
func (b *batch) statusOf(s streams, ed *engine.Edition, j *engine.Judgement, known map[string]bool) int {
	holdAt := b.holdAt
	if holdAt == finding.Unset {
		holdAt = ed.HoldAt(j.Path)
	}
	status := exitFine
	for _, f := range j.Findings {
		if f.Deviation == nil && !known[f.Fingerprint] && f.Severity.AtLeast(holdAt) {
			status = exitHeld
		}
	}
	for _, broken := range j.Broken {
		fmt.Fprintf(s.err, "lagwise: %s: %s\n", shown(j.Path), broken)
		status = exitFailed
	}
	return status
}

// readKnown reads the fingerprints that an earlier review lists.
func readKnown(file string) (map[string]bool, error) {
	if file == "" {
		return nil, nil
	}
	text, err := os.ReadFile(file)
	if err != nil {
		return nil, err
	}
	var earlier struct {
		Findings []struct {
			Fingerprint string `json:"fingerprint"`
		} `json:"findings"`
	}
	if err := json.Unmarshal(text, &earlier); err != nil {
		return nil, fmt.Errorf("%s is not the JSON of a review: %w", file, err)
	}
	known := map[string]bool{}
	for _, f := range earlier.Findings {
		known[f.Fingerprint] = true
	}
	return known, nil
}
