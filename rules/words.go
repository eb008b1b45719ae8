package rules

import (
	"fmt"
	"strings"
)

// count writes a number with its noun: 1 value, 3 values.
func count(n int, one, many string) string {
	if n == 1 {
		return "1 " + one
	}
	return fmt.Sprintf("%d %s", n, many)
}

// list joins words as a sentence does: a, b and c.
func list(words []string, conjunction string) string {
	if len(words) < 2 {
		return strings.Join(words, "")
	}
	last := len(words) - 1
	return strings.Join(words[:last], ", ") + " " + conjunction + " " + words[last]
}

// few lists at most five words and counts the rest.
func few(words []string) string {
	const shown = 5
	if len(words) <= shown+1 {
		return list(words, "and")
	}
	return fmt.Sprintf("%s and %d more", strings.Join(words[:shown], ", "), len(words)-shown)
}

// agree picks the word that goes with a number.
func agree(n int, one, many string) string {
	if n == 1 {
		return one
	}
	return many
}
