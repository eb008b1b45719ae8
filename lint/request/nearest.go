package request

import (
	"strconv"
	"strings"
)

// Nearest returns the candidate that is nearest to a word by the fewest
// insertions, deletions, substitutions and swaps of neighbours, case apart;
// the earlier of equals, "" when none is near: more than a third of the
// longer word, or more than one letter of a short one, would have to change.
func Nearest(word string, candidates []string) string {
	best, least := "", -1
	for _, c := range candidates {
		d := distance([]rune(strings.ToLower(word)), []rune(strings.ToLower(c)))
		longer := max(len(word), len(c))
		if d > max(1, longer/3) || d >= min(len(word), len(c)) {
			continue
		}
		if least < 0 || d < least {
			best, least = c, d
		}
	}
	return best
}

// distance is the optimal string alignment distance. Words too long to be a
// slip of the keyboard are not compared.
func distance(a, b []rune) int {
	const longest = 64
	if len(a) > longest || len(b) > longest {
		return longest
	}
	before, last, row := make([]int, len(b)+1), make([]int, len(b)+1), make([]int, len(b)+1)
	for j := range last {
		last[j] = j
	}
	for i := range a {
		row[0] = i + 1
		for j := range b {
			cost := 1
			if a[i] == b[j] {
				cost = 0
			}
			row[j+1] = min(last[j+1]+1, row[j]+1, last[j]+cost)
			if i > 0 && j > 0 && a[i] == b[j-1] && a[i-1] == b[j] {
				row[j+1] = min(row[j+1], before[j-1]+1)
			}
		}
		before, last, row = last, row, before
	}
	return last[len(b)]
}

// shown quotes a word of a document for a message, cut to a length that
// leaves the message readable.
func shown(s string) string {
	const longest = 60
	runes := []rune(s)
	if len(runes) > longest {
		s = string(runes[:longest]) + "…"
	}
	return strconv.Quote(s)
}

// oneOf joins words for a message: a, b or c.
func oneOf(words []string) string {
	if len(words) < 2 {
		return strings.Join(words, "")
	}
	return strings.Join(words[:len(words)-1], ", ") + " or " + words[len(words)-1]
}
