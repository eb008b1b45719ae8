package request

import (
	"fmt"

	"lagwise/lint/document"
)

// BindManifest reads a manifest out of a tree. file is its path relative to
// the root. A series takes from its record's defaults what it does not say
// itself. The problems are in the order in which they were found: those of
// the text, then table by table.
func BindManifest(file string, t *document.Tree) (*Manifest, []Problem) {
	c := newChecker(t)
	c.table(t.Root, ManifestDoc.String(), document.Span{})
	r := c.read(t.Root)
	m := &Manifest{File: file, Name: documentName(file), Title: r.text("title", ""), Tree: t}
	for _, member := range named(r.table("record")) {
		m.Records = append(m.Records, c.record(member))
	}
	for _, member := range named(r.table("series")) {
		m.Series = append(m.Series, c.series(member, m.Records))
	}
	return m, c.problems
}

// named lists the tables by name that stand in a table.
func named(n *document.Node) []*document.Member {
	if n == nil {
		return nil
	}
	var tables []*document.Member
	for _, m := range n.Members {
		if m.Value.IsTable() {
			tables = append(tables, m)
		}
	}
	return tables
}

func (c *checker) record(m *document.Member) *Record {
	r := c.read(m.Value)
	rec := &Record{
		Name:        m.Key.Text,
		File:        r.text("file", ""),
		Delimiter:   r.text("delimiter", ""),
		Decimal:     r.text("decimal", ""),
		Thousands:   r.text("thousands", ""),
		Encoding:    r.text("encoding", ""),
		Comment:     r.text("comment", ""),
		HeaderRows:  r.integer("header-rows", 1),
		Sheet:       r.text("sheet", ""),
		Range:       r.text("range", ""),
		Table:       r.text("table", ""),
		Query:       r.text("query", ""),
		Missing:     r.list("missing"),
		MissingOnly: r.list("missing-only"),
		Group:       r.text("group", ""),
		Along:       c.along(r.table("along")),
		At:          c.sites(r.table("at")),
		Deviations:  r.deviations(),
		Header:      headOf(m),
		Keys:        r.places(),
	}
	if defaults := r.table("defaults"); defaults != nil {
		rec.Defaults = map[string]string{}
		d := c.read(defaults)
		for _, k := range schemaTables["defaults"] {
			if text := d.text(k.Name, ""); text != "" {
				rec.Defaults[k.Name] = text
			}
		}
		rec.DefaultUnit = rec.Defaults["unit"]
	}
	c.recordContradictions(r)
	return rec
}

// recordContradictions reports what cannot hold at once.
func (c *checker) recordContradictions(r reader) {
	decimal, delimiter := r.text("decimal", "."), r.text("delimiter", "")
	if decimal == delimiter {
		c.wrong(r.node("delimiter"), "The comma is the decimal sign here, so it cannot be the delimiter too; write delimiter = \";\" or leave it out.")
	}
	if thousands := r.node("thousands"); thousands != nil && scalar(thousands) == decimal {
		c.wrong(thousands, "thousands and decimal are the same sign.")
	}
	if at := r.n.Get("at"); at != nil && r.node("along") != nil {
		c.add(Problem{Rule: "wrong-value", At: at.Key.At, Message: "A record has an axis (along) or sites in the plane (at), not both."})
	}
	if query := r.node("query"); query != nil && r.node("table") != nil {
		c.wrong(query, "A record takes a table or a query, not both.")
	}
}

// along binds an axis. A kind that is not written follows from what is: a
// duration or a format is time, before is age; else it is found in the data.
func (c *checker) along(n *document.Node) *Along {
	if n == nil {
		return nil
	}
	r := c.read(n)
	a := &Along{
		Column: r.text("column", ""),
		Kind:   AxisKind(r.text("kind", "")),
		Step:   r.text("step", ""),
		Unit:   r.text("unit", ""),
		Format: r.text("format", ""),
		Before: r.number("before"),
		Keys:   r.places(),
	}
	step := r.node("step")
	period := step != nil && step.Kind == document.String
	if a.Kind == "" {
		switch {
		case period || a.Format != "":
			a.Kind = Time
		case a.Before != nil:
			a.Kind = Age
		}
	}
	switch {
	case step != nil && a.Kind == Time && !period:
		c.wrong(step, "The step of a time axis is a duration, like \"P1Y\" or \"P1M\".")
		a.Step = ""
	case period && a.Kind != Time:
		c.wrong(step, "The step of %s is a number in its unit; a duration belongs to time.", axisWords(a.Kind))
		a.Step = ""
	}
	if before := r.node("before"); before != nil && a.Kind != Age && a.Kind != "" {
		c.wrong(before, "before ties ages to the calendar; this axis is %s.", a.Kind)
		a.Before = nil
	}
	return a
}

func axisWords(k AxisKind) string {
	if k == Age {
		return "an age axis"
	}
	return fmt.Sprintf("a %s axis", k)
}

func (c *checker) sites(n *document.Node) *Sites {
	if n == nil {
		return nil
	}
	r := c.read(n)
	return &Sites{X: r.text("x", ""), Y: r.text("y", ""), Unit: r.text("unit", "")}
}

func (c *checker) series(m *document.Member, records []*Record) *Series {
	r := c.read(m.Value)
	s := &Series{
		Name:           m.Key.Text,
		Record:         r.text("record", ""),
		Column:         r.text("column", ""),
		Title:          r.text("title", ""),
		Unit:           r.text("unit", ""),
		Measures:       r.text("measures", ""),
		Support:        r.text("support", ""),
		Season:         r.text("season", ""),
		Smoothed:       r.text("smoothed", ""),
		DerivedFrom:    r.list("derived-from"),
		DetectionLimit: r.number("detection-limit"),
		MeasurementSD:  r.number("measurement-sd"),
		AgeModel:       r.text("age-model", ""),
		MethodChanged:  r.list("method-changed"),
		Deviations:     r.deviations(),
		Header:         headOf(m),
		Keys:           r.places(),
	}
	s.fill(c.recordOf(s, r, records))
	return s
}

// recordOf finds the record of a series, and reports that there is none.
func (c *checker) recordOf(s *Series, r reader, records []*Record) *Record {
	var all []string
	for _, rec := range records {
		if rec.Name == s.Record || s.Record == "" && len(records) == 1 {
			return rec
		}
		all = append(all, rec.Name)
	}
	n := r.node("record")
	switch {
	case len(all) == 0:
		if c.tree.Valid() {
			c.add(Problem{Rule: "absent-field", At: s.Header,
				Message: fmt.Sprintf("The series %s has no record: write [record.NAME] with the file that holds it.", shown(s.Name))})
		}
	case n != nil:
		c.wrongWord(n, s.Record, all, fmt.Sprintf("No record of this manifest is named %s; there are %s.", shown(s.Record), firstOf(all)))
	case r.n.Get("record") == nil && !c.broken(r.n):
		c.add(Problem{Rule: "absent-field", At: s.Header,
			Message: fmt.Sprintf("The series %s does not say which record holds it; there are %s.", shown(s.Name), firstOf(all))})
	}
	return nil
}

// firstOf lists the first few names.
func firstOf(names []string) string {
	const few = 6
	var quoted []string
	for _, n := range names[:min(few, len(names))] {
		quoted = append(quoted, shown(n))
	}
	if more := len(names) - few; more > 0 {
		return fmt.Sprintf("%s and %d more", oneOf(quoted), more)
	}
	return oneOf(quoted)
}
