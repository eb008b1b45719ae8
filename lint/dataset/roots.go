package dataset

import (
	"errors"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
	"syscall"
)

// Roots are the folders below which the files of one document are read.
type Roots struct {
	root string   // real path, "" when the document has none
	all  []string // real paths: root, then the data roots
}

// NewRoots returns the root of a document, as FindRoot gives it, and the
// folders that a person added.
func NewRoots(root string, dataRoots []string) *Roots {
	r := &Roots{}
	if root != "" {
		r.root = realPath(root)
		r.all = append(r.all, r.root)
	}
	for _, folder := range dataRoots {
		if abs, err := filepath.Abs(folder); err == nil && folder != "" {
			r.all = append(r.all, realPath(abs))
		}
	}
	return r
}

// FindRoot returns the root of the document at path: the nearest folder at or
// above it that holds .git; else under, the workspace folder or argument that
// it was found below (of a file: its folder); never the home folder or the
// root of a file system. It returns "" when nothing is left.
func FindRoot(path, under string) string {
	start := folderOf(path)
	for dir := start; !isTooWide(dir); dir = filepath.Dir(dir) {
		if _, err := os.Lstat(filepath.Join(dir, ".git")); err == nil {
			return dir
		}
	}
	if under != "" {
		under = folderOf(under)
		if !isTooWide(under) && contains(under, start) {
			return under
		}
	}
	if !isTooWide(start) {
		return start
	}
	return ""
}

func folderOf(path string) string {
	if abs, err := filepath.Abs(path); err == nil {
		path = abs
	}
	if info, err := os.Stat(path); err == nil && info.IsDir() {
		return path
	}
	return filepath.Dir(path)
}

// isTooWide reports whether a folder is the home folder, above it, or the root
// of a file system.
func isTooWide(dir string) bool {
	if filepath.Dir(dir) == dir {
		return true
	}
	home, err := os.UserHomeDir()
	return err == nil && home != "" && contains(dir, filepath.Clean(home))
}

// contains reports whether path is dir or stands below it.
func contains(dir, path string) bool {
	rel, err := filepath.Rel(dir, path)
	return err == nil && filepath.IsLocal(rel)
}

// realPath resolves the links of a path as far as it exists.
func realPath(path string) string {
	if real, err := filepath.EvalSymlinks(path); err == nil {
		return real
	}
	parent := filepath.Dir(path)
	if parent == path {
		return path
	}
	return filepath.Join(realPath(parent), filepath.Base(path))
}

// Root returns the real path of the root of the document, "" when it has none.
func (r *Roots) Root() string { return r.root }

// Rel returns a path relative to the root of the document, with /; a path
// that is not below it stays as it is.
func (r *Roots) Rel(abs string) string {
	for _, path := range []string{abs, realPath(abs)} {
		if rel, err := filepath.Rel(r.root, path); err == nil && filepath.IsLocal(rel) {
			return filepath.ToSlash(rel)
		}
	}
	return filepath.ToSlash(abs)
}

// Resolve returns the real path that a document in fromDir means by what is
// written. A file that does not exist resolves too. The error is a *Refused
// for everything that must not be opened.
func (r *Roots) Resolve(fromDir, written string) (string, error) {
	path, _, err := r.resolve(fromDir, written)
	return path, err
}

// resolve also returns the root that holds the path.
func (r *Roots) resolve(fromDir, written string) (path, root string, err error) {
	if refused := refusedByText(written); refused != nil {
		return "", "", refused
	}
	joined := filepath.Join(realPath(fromDir), filepath.FromSlash(written))
	if r.holding(joined) == "" {
		return "", "", r.outside(written, "lies outside")
	}
	real := realPath(joined)
	root = r.holding(real)
	if root == "" {
		return "", "", r.outside(written, "is or passes a link that leads out of")
	}
	if rel, err := filepath.Rel(root, real); err != nil || hiddenBelow(rel) {
		return "", "", refuse(OutsideRoot, "%q is refused: files and folders that begin with a dot are never read", written)
	}
	return real, root, nil
}

// holding returns the root that contains a path, or "".
func (r *Roots) holding(path string) string {
	for _, root := range r.all {
		if contains(root, path) {
			return root
		}
	}
	return ""
}

func (r *Roots) outside(written, how string) *Refused {
	if r.root == "" {
		return refuse(OutsideRoot, "%q is refused: this document has no root, because the home folder and the root of a file system never are one; "+
			"move the document into a folder of its own, or allow the folder of the data with --data-root", written)
	}
	return refuse(OutsideRoot, "%q %s the root of this document, %s (the nearest folder that holds .git, else the folder it was found under); "+
		"move the file below it, or allow its folder with --data-root", written, how, r.root)
}

// ReadFile returns the bytes of a small file, such as a manifest, and its
// identity. The error is a *Refused.
func (r *Roots) ReadFile(fromDir, written string, limit int64) ([]byte, Identity, error) {
	f, id, err := r.open(fromDir, written, limit)
	if err != nil {
		return nil, Identity{}, err
	}
	defer f.Close()
	text, err := io.ReadAll(io.LimitReader(f, limit+1))
	if err != nil {
		return nil, Identity{}, refuse(UnreadableRecord, "%q could not be read: %s", written, plain(err))
	}
	if int64(len(text)) > limit {
		return nil, Identity{}, refuse(ReachedLimit, "%q is larger than the limit of %d bytes", written, limit)
	}
	return text, id, nil
}

// open opens a regular file below a root. A pipe or device is never waited
// for: it is refused by what it is before it is opened, and the handle is
// non-blocking and looked at again.
func (r *Roots) open(fromDir, written string, limit int64) (*os.File, Identity, error) {
	path, holding, err := r.resolve(fromDir, written)
	if err != nil {
		return nil, Identity{}, err
	}
	if _, err := r.stat(fromDir, written, limit); err != nil {
		return nil, Identity{}, err
	}
	f, err := openBelow(holding, path)
	if err != nil {
		return nil, Identity{}, refuse(UnreadableRecord, "%q cannot be read: %s", written, plain(err))
	}
	info, err := f.Stat()
	if err == nil {
		if refused := irregular(written, info, limit); refused != nil {
			f.Close()
			return nil, Identity{}, refused
		}
		return f, identityOf(path, info), nil
	}
	f.Close()
	return nil, Identity{}, refuse(UnreadableRecord, "%q cannot be read: %s", written, plain(err))
}

// stat returns the identity of a file without opening it. The error is a
// *Refused for what open would refuse.
func (r *Roots) stat(fromDir, written string, limit int64) (Identity, error) {
	path, _, err := r.resolve(fromDir, written)
	if err != nil {
		return Identity{}, err
	}
	info, err := os.Lstat(path)
	if err != nil {
		return Identity{}, refuse(UnreadableRecord, "%q cannot be read: %s", written, plain(err))
	}
	if refused := irregular(written, info, limit); refused != nil {
		return Identity{}, refused
	}
	return identityOf(path, info), nil
}

func openBelow(root, path string) (*os.File, error) {
	rel, err := filepath.Rel(root, path)
	if err != nil {
		return nil, err
	}
	dir, err := os.OpenRoot(root)
	if err != nil {
		return nil, err
	}
	defer dir.Close()
	return dir.OpenFile(rel, os.O_RDONLY|syscall.O_NONBLOCK, 0)
}

func irregular(written string, info fs.FileInfo, limit int64) *Refused {
	switch {
	case info.IsDir():
		return refuse(UnreadableRecord, "%q is a folder; name a file in it", written)
	case !info.Mode().IsRegular():
		return refuse(UnreadableRecord, "%q is not a regular file (a pipe, socket or device); only regular files are read", written)
	case info.Size() > limit:
		return refuse(ReachedLimit, "%q has %d bytes, more than the limit of %d", written, info.Size(), limit)
	}
	return nil
}

// plain words an error of the file system without the path that it quotes.
func plain(err error) string {
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return "there is no such file"
	case errors.Is(err, fs.ErrPermission):
		return "no permission to read it"
	}
	var at *fs.PathError
	if errors.As(err, &at) {
		err = at.Err
	}
	return strings.TrimSpace(err.Error())
}
