package document

import (
	"bytes"
	"fmt"
	"strings"
)

// describe says in plain words what is wrong with a broken statement and what
// to do; where there are none, in BurntSushi's.
func (b *builder) describe(s statement, sweep *sweep, at Span, message string) Problem {
	line := lineAt(b.text, s.at.Start)
	here := Span{s.at.Start, s.at.Start + len(bytes.TrimRight(line, " \t\r"))}
	if s.form == brokenHeader {
		if words := headerTrouble(line); words != "" {
			return Problem{here, words}
		}
	} else if words := b.pairTrouble(s, line); words != "" {
		return Problem{here, words}
	}
	if sweep.unclosed >= 0 && sweep.unclosed <= at.Start {
		return Problem{b.within(Span{sweep.unclosed, here.End}, s.at), "this string has no end; close it with the same quotes"}
	}
	if n := len(sweep.brackets); n > 0 && at.Start >= s.at.End-1 {
		open := sweep.brackets[n-1]
		return Problem{Span{open, open + 1}, fmt.Sprintf("this %c is not closed; add %c", b.text[open], b.text[open]+2)}
	}
	if words, word := b.bareWord(at.Start); words != "" {
		return Problem{word, words}
	}
	if p, found := b.ask(s.at); found {
		return Problem{b.within(p.At, s.at), p.Message}
	}
	return Problem{b.within(at, s.at), message}
}

// headerTrouble words a header that is half typed.
func headerTrouble(line []byte) string {
	brackets := openers(line)
	keys, i := keysOf(line, brackets, len(line))
	closers := strings.Repeat("]", brackets)
	switch rest := bytes.TrimLeft(line[i:], "] \t"); {
	case len(rest) > 0 && rest[0] != '#':
		return ""
	case len(keys) == 0:
		return fmt.Sprintf("this header has no name; write %sname%s", line[:brackets], closers)
	case !bytes.HasPrefix(line[i:], []byte(closers)):
		return fmt.Sprintf("this header is not closed; end it with %s", closers)
	}
	return ""
}

// pairTrouble words a key without a value.
func (b *builder) pairTrouble(s statement, line []byte) string {
	if len(s.keys) == 0 {
		return ""
	}
	from := s.at.Start
	_, i := keysOf(b.text, from, from+len(line))
	rest := line[i-from:]
	key := string(b.text[s.keys[0].At.Start:s.keys[len(s.keys)-1].At.End])
	ended := func(rest []byte) bool { return len(rest) == 0 || rest[0] == '#' }
	switch {
	case ended(rest):
		return fmt.Sprintf("%s has no value; write %s = and a value", key, key)
	case rest[0] == '=' && ended(bytes.TrimLeft(rest[1:], " \t")):
		return fmt.Sprintf("%s has no value; write one after the equals sign", key)
	}
	return ""
}

// bareWord words text without quotes where a value should stand.
func (b *builder) bareWord(at int) (string, Span) {
	before := bytes.TrimRight(b.text[:at], " \t\r\n")
	if len(before) == 0 || bytes.IndexByte([]byte("=[,"), before[len(before)-1]) < 0 {
		return "", Span{}
	}
	end := at
	for end < len(b.text) && bareByte(b.text[end]) {
		end++
	}
	word := string(b.text[at:end])
	if word == "" || word[0] < 'A' {
		return "", Span{}
	}
	advice := Quote(word)
	switch lower := strings.ToLower(word); lower {
	case "true", "false", "inf", "nan":
		advice = lower
	}
	return fmt.Sprintf("%s is not a value; write %s", word, advice), Span{at, end}
}

// within keeps a place inside of a statement, and not empty.
func (b *builder) within(at, whole Span) Span {
	at.Start = max(whole.Start, min(at.Start, whole.End-1))
	at.End = max(at.Start+1, min(at.End, whole.End))
	return at
}
