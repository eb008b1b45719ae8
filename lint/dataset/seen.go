package dataset

import "lagwise/lint/request"

// Seen is what reading a record showed, for the rules about data.
type Seen struct {
	Rows     int
	Columns  []string // headers as they stand in the file
	SplitBy  string
	Axis     *Axis
	Declared string // the step as declared, or empty
}

// Seen returns the facts of a record as its manifest declares it.
func (r *Record) Seen(rec *request.Record) Seen {
	s := Seen{Rows: r.Rows, Columns: r.Headers, SplitBy: r.SplitBy, Axis: r.Axis}
	if rec.Along != nil {
		s.Declared = rec.Along.Step
	}
	return s
}

// SeriesSeen is what reading one series showed.
type SeriesSeen struct {
	Trouble  *Trouble
	Column   *Column // nil with a trouble
	Unit     string  // in force, or empty
	Censored int     // by mark or declared limit
	Constant bool
	Value    float64 // of a constant series
	Support  string
	Season   int
}

// SeenOf returns the facts of one series of the record.
func (r *Record) SeenOf(decl *request.Series, rec *request.Record) SeriesSeen {
	s, trouble := r.Series(decl, rec)
	if trouble != nil {
		return SeriesSeen{Trouble: trouble}
	}
	name := decl.Column
	if name == "" {
		name = decl.Name
	}
	c, trouble := r.Column(name)
	if trouble != nil {
		return SeriesSeen{Trouble: trouble}
	}
	seen := SeriesSeen{Column: c, Unit: s.Unit, Censored: s.Censored, Support: s.Support, Season: s.Season, Constant: c.Constant}
	if low, _, any := bounds(c.Values); any && c.Constant {
		seen.Value = low
	}
	return seen
}
