//go:build darwin || freebsd || netbsd

package dataset

import (
	"io/fs"
	"syscall"
)

func identityOf(path string, info fs.FileInfo) Identity {
	st, ok := info.Sys().(*syscall.Stat_t)
	if !ok {
		return portableIdentity(path, info)
	}
	return Identity{Device: uint64(st.Dev), Inode: uint64(st.Ino), Size: st.Size, Modified: info.ModTime().UnixNano(), Changed: st.Ctimespec.Nano()}
}
