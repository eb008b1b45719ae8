package document

import "bytes"

// sweep walks over a broken statement line by line and keeps what is open.
type sweep struct {
	text     []byte
	at       int
	errorAt  int // where the parser stopped
	brackets []int
	curly    int  // how many of the open brackets are curly
	unclosed int  // the first string without an end, or -1
	long     bool // one of these is a multi-line string
	comments []Span
}

// line goes to the start of the next line; multi-line strings are passed whole.
// In a header brackets open nothing.
func (s *sweep) line(header bool) {
	for s.at < len(s.text) {
		switch c := s.text[s.at]; c {
		case '\n':
			s.at++
			return
		case '#':
			end := s.at + len(lineAt(s.text, s.at))
			s.comments = append(s.comments, Span{s.at, end})
			s.at = end
		case '"', '\'':
			s.quoted(c)
		case '[', '{':
			if !header {
				s.brackets = append(s.brackets, s.at)
				if c == '{' {
					s.curly++
				}
			}
			s.at++
		case ']', '}':
			s.close(c - 2)
			s.at++
		default:
			s.at++
		}
	}
}

// close takes away the innermost bracket of a kind and what is open inside it.
func (s *sweep) close(opening byte) {
	if opening == '{' && s.curly == 0 || opening == '[' && s.curly == len(s.brackets) {
		return
	}
	for {
		last := s.text[s.brackets[len(s.brackets)-1]]
		s.brackets = s.brackets[:len(s.brackets)-1]
		if last == '{' {
			s.curly--
		}
		if last == opening {
			return
		}
	}
}

// quoted passes a string. One without an end counts up to the end of its line.
func (s *sweep) quoted(quote byte) {
	start := s.at
	long := bytes.Repeat([]byte{quote}, 3)
	if bytes.HasPrefix(s.text[start:], long) {
		end := closing(s.text, start+3, long)
		if end >= 0 && !s.swallows(start, end) {
			s.at = end + 3
			return
		}
		s.long = true
	} else if end := closing(lineAt(s.text, start), 1, long[:1]); end >= 0 {
		s.at = start + end + 1
		return
	}
	if s.unclosed < 0 {
		s.unclosed = start
	}
	s.at = start + len(lineAt(s.text, start))
}

// swallows reports whether a multi-line string seems to end only because a
// later statement opens one: the parser stopped on that line, just after it.
func (s *sweep) swallows(start, end int) bool {
	first := lineStart(s.text, end)
	return first > start && first <= s.errorAt && s.errorAt <= first+len(lineAt(s.text, first)) && pairLike(lineAt(s.text, first))
}

// closing is the offset of a closing quote at or after from, or -1.
func closing(text []byte, from int, quote []byte) int {
	for {
		i := bytes.Index(text[from:], quote)
		if i < 0 {
			return -1
		}
		i += from
		slashes := 0
		for quote[0] == '"' && i-slashes > from && text[i-slashes-1] == '\\' {
			slashes++
		}
		if slashes%2 == 0 {
			return i
		}
		from = i + 1
	}
}

// begins reports whether a statement begins on the line at which the sweep is.
// With all closed it does; in a string that never ends, if it looks so; inside
// of brackets, if the line could hardly stand there.
func (s *sweep) begins() bool {
	line := lineAt(s.text, s.at)
	like, named := headerLike(line)
	switch {
	case s.long:
		return like || pairLike(line)
	case len(s.brackets) == 0:
		return true
	case pairLike(line):
		return s.text[s.brackets[len(s.brackets)-1]] == '[' || !s.memberLike(line)
	}
	return named // [1, 2] and ["a"] are items of an array
}

// memberLike reports whether a line "key = value" reads as a member of an
// inline table: a comma ends it, or a brace begins the next line.
func (s *sweep) memberLike(line []byte) bool {
	next := bytes.TrimLeft(s.text[s.at+len(line):], " \t\r\n")
	if i := bytes.LastIndexByte(line, '#'); i >= 0 && bytes.IndexAny(line[i:], `"'`) < 0 {
		line = line[:i]
	}
	return bytes.HasSuffix(bytes.TrimRight(line, " \t"), []byte(",")) || bytes.HasPrefix(next, []byte("}"))
}

func lineStart(text []byte, at int) int { return bytes.LastIndexByte(text[:at], '\n') + 1 }

// lineAt is the text from an offset to the end of its line.
func lineAt(text []byte, at int) []byte {
	line := text[at:]
	if i := bytes.IndexByte(line, '\n'); i >= 0 {
		return bytes.TrimSuffix(line[:i], []byte("\r"))
	}
	return line
}

// nextLine is where the line after an offset begins, or the end of the text.
func nextLine(text []byte, at int) int {
	if i := bytes.IndexByte(text[at:], '\n'); i >= 0 {
		return at + i + 1
	}
	return len(text)
}

// pairLike reports whether a line begins as "key =".
func pairLike(line []byte) bool {
	keys, i := keysOf(line, 0, len(line))
	return len(keys) > 0 && i < len(line) && line[i] == '='
}

// headerLike reports whether a line reads as a header, closed or half typed;
// named: it is one with a bare word in it, so it cannot be an array of values.
func headerLike(line []byte) (like, named bool) {
	line = bytes.TrimLeft(line, " \t")
	if len(line) == 0 || line[0] != '[' {
		return false, false
	}
	keys, i := keysOf(line, openers(line), len(line))
	for n := 0; n < 2 && i < len(line) && line[i] == ']'; n++ {
		i++
	}
	rest := bytes.TrimLeft(line[i:], " \t")
	for _, k := range keys {
		c := line[k.At.Start]
		word := c >= 'a' && c <= 'z' || c >= 'A' && c <= 'Z' || c == '_'
		switch k.Text {
		case "true", "false", "inf", "nan":
			word = false
		}
		named = named || word
	}
	like = len(rest) == 0 || rest[0] == '#'
	return like, like && named
}

// openers is the number of brackets with which a header opens.
func openers(line []byte) int {
	if bytes.HasPrefix(line, []byte("[[")) {
		return 2
	}
	return 1
}

// keysOf reads the parts of a dotted key as far as they go, and returns them
// with the offset of what follows them and their blanks.
func keysOf(text []byte, from, end int) ([]Key, int) {
	var keys []Key
	i := skipBlanks(text, from, end)
	for i < end {
		start := i
		if text[i] == '"' || text[i] == '\'' {
			n := closing(text[:end], i+1, text[i:i+1])
			if n < 0 {
				return keys, i
			}
			i = n + 1
			keys = append(keys, Key{Text: string(text[start+1 : n]), At: Span{start, i}})
		} else {
			for i < end && bareByte(text[i]) {
				i++
			}
			if i == start {
				return keys, i
			}
			keys = append(keys, Key{Text: string(text[start:i]), At: Span{start, i}})
		}
		i = skipBlanks(text, i, end)
		if i == end || text[i] != '.' {
			return keys, i
		}
		i = skipBlanks(text, i+1, end)
	}
	return keys, i
}

func skipBlanks(text []byte, i, end int) int {
	for i < end && (text[i] == ' ' || text[i] == '\t') {
		i++
	}
	return i
}

func bareByte(c byte) bool {
	return c >= 'A' && c <= 'Z' || c >= 'a' && c <= 'z' || c >= '0' && c <= '9' || c == '-' || c == '_'
}
