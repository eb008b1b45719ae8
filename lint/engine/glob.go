package engine

import (
	"path"
	"strings"
)

// matches reports whether a pattern of `exclude` fits a path or a folder
// above it. Both use /; ** stands for any number of folders, * ? [ ] stay
// within one name.
func matches(pattern, name string) bool {
	return fits(strings.Split(pattern, "/"), strings.Split(name, "/"))
}

func fits(pattern, name []string) bool {
	if len(pattern) == 0 {
		return true // the name, or a folder above it
	}
	if pattern[0] == "**" {
		if len(pattern) == 1 {
			return len(name) > 0
		}
		for i := range len(name) + 1 {
			if fits(pattern[1:], name[i:]) {
				return true
			}
		}
		return false
	}
	if len(name) == 0 {
		return false
	}
	ok, err := path.Match(pattern[0], name[0])
	return err == nil && ok && fits(pattern[1:], name[1:])
}
