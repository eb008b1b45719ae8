// Package stats is the parent of lagwise's numerical packages. They work on
// slices of float64, know nothing of documents or files, hold no global state
// and never modify their inputs.
//
// A statistic that does not exist for the given data is reported as an
// *Undefined error; NaN is never returned for "undefined". Shape mistakes by
// a programmer (slices of different length, a negative lag) panic.
package stats
