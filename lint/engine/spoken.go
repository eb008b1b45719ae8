package engine

import (
	"slices"

	"lagwise/lint/document"
)

// spoken is what was said of one text, with the places it had then.
type spoken struct {
	said
	start   int      // where the request began
	changed []string // data of deviations that have changed
}

// recall says what was said of the same text before.
func (a *asking) recall() {
	if !a.computable {
		return
	}
	before, known := a.ed.engine.spoken.get(a.textKey())
	a.complete = known
	a.replay(before)
}

// replay says again what was said of the same text.
func (a *asking) replay(before spoken) {
	a.said = before.moved(a.file.file, a.asked.At.Start)
	for _, d := range a.own {
		d.changed = slices.Contains(before.changed, d.Data)
	}
	a.weigh(a.findings, a.own)
}

// textKey digests the text of the request and all documents that bear on it.
func (a *asking) textKey() key {
	at := a.asked.At
	return digest("request", a.file.path, a.asked.Name, string(a.file.text[at.Start:at.End]), a.around)
}

// moved returns what was said, with the places of the file shifted to where
// the request begins now. The text of the request is the same, so every place
// in it keeps its distance from its beginning.
func (s spoken) moved(file string, start int) said {
	by := start - s.start
	shift := func(f string, at document.Span) document.Span {
		if f != file {
			return at
		}
		return document.Span{Start: at.Start + by, End: at.End + by}
	}
	out := s.clone()
	for i := range out.findings {
		f := &out.findings[i]
		f.At = shift(f.File, f.At)
		f.Related = slices.Clone(f.Related)
		for k := range f.Related {
			f.Related[k].At = shift(f.Related[k].File, f.Related[k].At)
		}
	}
	return out
}

func (s said) clone() said {
	return said{findings: slices.Clone(s.findings), broken: slices.Clone(s.broken)}
}
