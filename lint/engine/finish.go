package engine

import (
	"crypto/sha256"
	"encoding/hex"
	"path/filepath"
	"slices"
	"strings"

	"lagwise/lint/document"
	"lagwise/lint/finding"
)

// finish orders the findings of a judgement, drops what was said twice, and
// fills in lines, columns and fingerprints.
func (ed *Edition) finish(j *Judgement) {
	slices.SortStableFunc(j.Findings, order)
	j.Findings = slices.CompactFunc(j.Findings, func(a, b finding.Finding) bool { return order(a, b) == 0 })
	for i := range j.Findings {
		f := &j.Findings[i]
		f.Range = ed.rangeOf(j.Root, f.File, f.At)
		f.Fingerprint = fingerprint(f)
		f.Related = slices.Clone(f.Related)
		for k := range f.Related {
			f.Related[k].Range = ed.rangeOf(j.Root, f.Related[k].File, f.Related[k].At)
		}
		f.Rewrites = ed.located(j.Root, f.Rewrites)
	}
}

// located fills in the lines and columns of the edits of rewrites.
func (ed *Edition) located(root string, rewrites []finding.Rewrite) []finding.Rewrite {
	rewrites = slices.Clone(rewrites)
	for i := range rewrites {
		edits := slices.Clone(rewrites[i].Edits)
		for k := range edits {
			edits[k].Range = ed.rangeOf(root, edits[k].File, edits[k].At)
		}
		rewrites[i].Edits = edits
	}
	return rewrites
}

func (ed *Edition) rangeOf(root, file string, at document.Span) document.Range {
	return ed.snapshot(filepath.Join(root, filepath.FromSlash(file))).lines().Range(at)
}

// fingerprint names a finding across versions of a document: by rule, file,
// request and series, not by place or numbers.
func fingerprint(f *finding.Finding) string {
	sum := sha256.Sum256([]byte(strings.Join([]string{f.Rule, f.File, f.Request, strings.Join(f.Series, "\x01")}, "\x00")))
	return hex.EncodeToString(sum[:16])
}
