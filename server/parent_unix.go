//go:build !windows

package server

import (
	"errors"
	"syscall"
)

// alive reports whether a process exists; one that may not be signalled does.
func alive(pid int) bool { return !errors.Is(syscall.Kill(pid, 0), syscall.ESRCH) }
