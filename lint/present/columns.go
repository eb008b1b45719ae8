package present

import (
	"strings"
	"unicode/utf8"
)

// aligned pads the cells of rows to the widest of their column, two spaces
// apart, without spaces at the end of a line.
func aligned(rows [][]string) []string {
	var widths []int
	for _, row := range rows {
		for i, cell := range row {
			if i == len(widths) {
				widths = append(widths, 0)
			}
			widths[i] = max(widths[i], utf8.RuneCountInString(cell))
		}
	}
	lines := make([]string, len(rows))
	for k, row := range rows {
		var b strings.Builder
		for i, cell := range row {
			b.WriteString(cell)
			b.WriteString(strings.Repeat(" ", widths[i]-utf8.RuneCountInString(cell)+2))
		}
		lines[k] = strings.TrimRight(b.String(), " ")
	}
	return lines
}

// apart puts two texts at the ends of a line of that width, at least three
// spaces apart.
func apart(left, right string, width int) string {
	gap := width - utf8.RuneCountInString(left) - utf8.RuneCountInString(right)
	return left + strings.Repeat(" ", max(3, gap)) + right
}

// told lays a message out between an indent and the width of a page, on as
// many lines as it takes, with other words at the right end of the last.
func told(indent, message, right string) []string {
	room := textWidth - utf8.RuneCountInString(indent)
	lines := folded(message, room)
	last := len(lines) - 1
	if utf8.RuneCountInString(lines[last])+3+utf8.RuneCountInString(right) > room {
		lines, last = append(lines, ""), last+1
	}
	lines[last] = apart(lines[last], right, room)
	for i := range lines {
		lines[i] = indent + lines[i]
	}
	return lines
}

// folded breaks a text between words into lines of at most that width; a word
// that is longer stands alone.
func folded(text string, width int) []string {
	lines, used := []string{""}, 0
	for i, word := range strings.Split(text, " ") {
		n := utf8.RuneCountInString(word)
		switch {
		case i == 0:
			lines[0], used = word, n
		case used+1+n > width:
			lines, used = append(lines, word), n
		default:
			lines[len(lines)-1] += " " + word
			used += 1 + n
		}
	}
	return lines
}
