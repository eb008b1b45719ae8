//go:build !unix

package main

import "errors"

// makeFIFO fails: there are no named pipes in a folder here. The scenario that
// makes one is for Unix alone.
func makeFIFO(string) error { return errors.ErrUnsupported }
