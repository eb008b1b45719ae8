package main

import (
	"fmt"
	"io"
	"os"
	"time"
)

// progress tells on standard error how far a run is: only to a terminal, and
// only once it has taken half a second.
type progress struct {
	w     io.Writer
	doing string
	all   int
	began time.Time
	told  bool
}

func newProgress(w io.Writer, doing string, all int, quiet bool) *progress {
	p := &progress{doing: doing, all: all, began: time.Now()}
	if f, ok := w.(*os.File); ok && !quiet {
		if info, err := f.Stat(); err == nil && info.Mode()&os.ModeCharDevice != 0 {
			p.w = w
		}
	}
	return p
}

func (p *progress) at(i int) {
	if p.w != nil && time.Since(p.began) > 500*time.Millisecond {
		fmt.Fprintf(p.w, "\r%s: %d of %d ", p.doing, i+1, p.all)
		p.told = true
	}
}

func (p *progress) end() {
	if p.told {
		fmt.Fprint(p.w, "\r\x1b[K")
	}
}
