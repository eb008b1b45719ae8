package dataset

import (
	"io/fs"
	"time"
)

// Identity tells one state of one file from another without reading it.
type Identity struct {
	Path          string // only where the system gives no device and inode
	Device, Inode uint64
	Size          int64
	Modified      int64 // nanoseconds since 1970
	Changed       int64 // of the inode, nanoseconds since 1970; 0 where the system has none
}

// unsettled is how recent a change must be for the clock of the file system
// to miss the next one.
const unsettled = 2 * time.Second

// settled reports whether an identity seen at a time vouches for the content:
// its last change lies far enough back, and the system tells one.
func (id Identity) settled(seen time.Time) bool {
	if id.Changed == 0 {
		return false
	}
	return seen.UnixNano()-max(id.Modified, id.Changed) >= int64(unsettled)
}

func portableIdentity(path string, info fs.FileInfo) Identity {
	return Identity{Path: path, Size: info.Size(), Modified: info.ModTime().UnixNano()}
}
