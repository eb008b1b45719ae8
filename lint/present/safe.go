package present

import (
	"fmt"
	"strings"
	"unicode"
)

// longest is how much of a name from a document is shown.
const longest = 200

// safe returns text of documents and data as it may be shown: control and
// bidirectional characters by their number, cut at 200 characters.
func safe(s string) string { return cut(visible(s), longest) }

// visible shows control and bidirectional characters by their number.
func visible(s string) string {
	if !strings.ContainsFunc(s, hidden) {
		return s
	}
	var b strings.Builder
	for _, r := range s {
		if hidden(r) {
			fmt.Fprintf(&b, `\u{%x}`, r)
		} else {
			b.WriteRune(r)
		}
	}
	return b.String()
}

func hidden(r rune) bool {
	return unicode.IsControl(r) || unicode.Is(unicode.Bidi_Control, r) || r == '\u2028' || r == '\u2029' || r == unicode.ReplacementChar
}

func cut(s string, n int) string {
	runes := []rune(s)
	if len(runes) <= n {
		return s
	}
	return string(runes[:n]) + "…"
}

// escaped is text for Markdown: no character of it makes a link, an image,
// emphasis or HTML.
func escaped(s string) string {
	return markdownEscapes.Replace(visible(s))
}

var markdownEscapes = strings.NewReplacer(
	`\`, `\\`, "`", "\\`", "*", `\*`, "_", `\_`, "[", `\[`, "]", `\]`, "<", `\<`, ">", `\>`, "|", `\|`, "#", `\#`, "!", `\!`, "&", `\&`,
)
