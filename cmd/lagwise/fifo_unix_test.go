//go:build unix

package main

import "syscall"

// makeFIFO makes a named pipe that nobody writes to.
func makeFIFO(path string) error { return syscall.Mkfifo(path, 0o644) }
