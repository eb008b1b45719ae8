package dataset

import (
	"path/filepath"
	"strings"
)

// deviceNames are the names that one family of systems reserves in every
// folder; they are refused everywhere, so that a repository reads the same on
// all systems.
var deviceNames = map[string]bool{
	"con": true, "prn": true, "aux": true, "nul": true, "conin$": true, "conout$": true, "clock$": true,
}

// refusedByText judges a path as it is written in a document, before any call
// to the file system. It returns nil when the text is an ordinary relative
// path.
func refusedByText(written string) *Refused {
	outside := func(why string) *Refused {
		return refuse(OutsideRoot, "%q is refused: %s; write a path relative to this document, with /", written, why)
	}
	switch {
	case written == "":
		return refuse(UnreadableRecord, "the path is empty; write a path relative to this document, with /")
	case strings.ContainsRune(written, 0):
		return outside("it holds a NUL character")
	case strings.HasPrefix(written, `\\`) || strings.HasPrefix(written, "//"):
		return outside("it names another machine or a device")
	case len(written) >= 2 && written[1] == ':' && isLetter(written[0]):
		return outside("it begins with a drive letter")
	case strings.HasPrefix(written, "/") || filepath.IsAbs(written):
		return outside("it is absolute")
	case strings.Contains(written, `\`):
		return outside(`it holds a \`)
	case strings.Contains(written, ":"):
		return outside("it holds a :, which names a stream of a file on some systems")
	}
	for _, part := range strings.Split(written, "/") {
		if isDeviceName(part) {
			return outside("it names a device")
		}
		if isHidden(part) {
			return outside("files and folders that begin with a dot are never read")
		}
	}
	return nil
}

func isLetter(c byte) bool { return 'a' <= c|0x20 && c|0x20 <= 'z' }

func isHidden(part string) bool {
	return strings.HasPrefix(part, ".") && part != "." && part != ".."
}

func isDeviceName(part string) bool {
	base, _, _ := strings.Cut(strings.ToLower(part), ".")
	base = strings.TrimRight(base, " ")
	if deviceNames[base] {
		return true
	}
	if len(base) != 4 || base[3] < '0' || base[3] > '9' {
		return false
	}
	return strings.HasPrefix(base, "com") || strings.HasPrefix(base, "lpt")
}

// hiddenBelow reports whether a path relative to a root passes through
// something hidden.
func hiddenBelow(rel string) bool {
	for _, part := range strings.Split(filepath.ToSlash(rel), "/") {
		if isHidden(part) {
			return true
		}
	}
	return false
}
