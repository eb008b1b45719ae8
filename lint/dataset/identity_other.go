//go:build !linux && !darwin && !freebsd && !netbsd

package dataset

import "io/fs"

func identityOf(path string, info fs.FileInfo) Identity { return portableIdentity(path, info) }
