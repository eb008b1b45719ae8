package present

import (
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"math"
	"strconv"
	"unicode"

	"lagwise/lint/result"
)

// Head opens every JSON object.
type Head struct {
	Format  int    `json:"format"`
	Tool    string `json:"tool"`
	Version string `json:"version"`
	Root    string `json:"root"`
	OnDate  string `json:"on-date"`
}

// NewHead returns the head of the present format.
func NewHead(version, root, onDate string) Head {
	return Head{Format: 1, Tool: "lagwise", Version: version, Root: root, OnDate: onDate}
}

// number is a float as JSON prints it: at most 12 significant digits; what is
// undefined is null.
type number struct{ v *float64 }

// MarshalJSON implements json.Marshaler.
func (n number) MarshalJSON() ([]byte, error) {
	if n.v == nil || math.IsNaN(*n.v) || math.IsInf(*n.v, 0) {
		return []byte("null"), nil
	}
	short, err := strconv.ParseFloat(strconv.FormatFloat(*n.v, 'g', 12, 64), 64)
	if err != nil {
		return nil, err
	}
	return json.Marshal(short)
}

func value(v float64) number { return number{&v} }

func numbers(all []float64) []number {
	out := make([]number, len(all))
	for i := range all {
		out[i] = number{&all[i]}
	}
	return out
}

// pair is an interval; nil is null.
func interval(i *[2]float64) *[2]number {
	if i == nil {
		return nil
	}
	return &[2]number{value(i[0]), value(i[1])}
}

func bound(b result.Bound) *string {
	if b == "" {
		return nil
	}
	s := string(b)
	return &s
}

// writeJSON writes a value, indented, with bidirectional characters escaped.
func writeJSON(w io.Writer, v any) error {
	var b bytes.Buffer
	e := json.NewEncoder(&b)
	e.SetEscapeHTML(false)
	e.SetIndent("", " ")
	if err := e.Encode(v); err != nil {
		return err
	}
	_, err := w.Write(escapeBidi(b.Bytes()))
	return err
}

// escapeBidi writes bidirectional characters as JSON escapes, which mean the
// same and cannot reorder what a person reads.
func escapeBidi(text []byte) []byte {
	if !bytes.ContainsFunc(text, func(r rune) bool { return unicode.Is(unicode.Bidi_Control, r) }) {
		return text
	}
	var out []byte
	for _, r := range string(text) {
		if unicode.Is(unicode.Bidi_Control, r) {
			out = fmt.Appendf(out, `\u%04x`, r)
		} else {
			out = append(out, string(r)...)
		}
	}
	return out
}
