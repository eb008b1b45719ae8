package dataset

import "fmt"

// Limits bounds what a hostile or mistaken file can cost. A person raises
// them by flag or user setting, never a document.
type Limits struct {
	FileBytes   int64 // size of a data file on disk
	Cells       int64 // rows x columns of one file; 8 bytes of memory each
	Columns     int64
	LineBytes   int64 // one line, line breaks inside quotes included
	RatioAfter  int64 // decompressed bytes from which Ratio counts
	Ratio       int64 // decompressed bytes for each compressed one
	StoredBytes int64 // parsed records remembered
}

// DefaultLimits returns the limits that hold when nobody raised them.
func DefaultLimits() Limits {
	return Limits{
		FileBytes:   4 << 30,
		Cells:       250_000_000,
		Columns:     16_384,
		LineBytes:   4 << 20,
		RatioAfter:  16 << 20,
		Ratio:       100,
		StoredBytes: 1 << 30,
	}
}

// Raise sets one limit by the name that messages give it: file-bytes, cells,
// columns, line-bytes, ratio. The error lists the names.
func (l *Limits) Raise(name string, to int64) error {
	limit, known := map[string]*int64{"file-bytes": &l.FileBytes, "cells": &l.Cells, "columns": &l.Columns,
		"line-bytes": &l.LineBytes, "ratio": &l.Ratio}[name]
	if !known || to < 1 {
		return fmt.Errorf("a limit is file-bytes, cells, columns, line-bytes or ratio, and a number above 0; not %s=%d", name, to)
	}
	*limit = to
	return nil
}

// reached is the trouble of a limit: which, how much there was, and how to
// raise it.
func reached(limit string, most, seen int64, unit string) *Trouble {
	return &Trouble{Kind: ReachedLimit, Message: fmt.Sprintf(
		"the limit %s of %d %s is reached (%d here); raise it with --limit %s=%d if the file is trusted",
		limit, most, unit, seen, limit, seen)}
}
