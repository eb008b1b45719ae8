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
