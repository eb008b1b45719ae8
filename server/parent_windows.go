package server

import "syscall"

// stillActive is the exit code of a process that has not ended.
const stillActive = 259

// alive reports whether a process runs; one that may not be asked does.
func alive(pid int) bool {
	const queryLimited = 0x1000
	h, err := syscall.OpenProcess(queryLimited, false, uint32(pid))
	if err != nil {
		return err == syscall.ERROR_ACCESS_DENIED
	}
	defer syscall.CloseHandle(h)
	var code uint32
	return syscall.GetExitCodeProcess(h, &code) != nil || code == stillActive
}
