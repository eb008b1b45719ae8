package rules

import (
	"lagwise/lint"
	"lagwise/lint/document"
	"lagwise/lint/evidence"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

// eachReadable visits the records whose file could be read: of the others
// only the trouble itself is told.
func eachReadable(q *lint.Inquiry, visit func(*request.Record, *evidence.Read)) {
	for i := range q.Reads {
		read := &q.Reads[i]
		if rec := recordNamed(q.Manifest, read.Record); rec != nil && read.Trouble == nil {
			visit(rec, read)
		}
	}
}

// eachSeries visits the series whose column was found.
func eachSeries(q *lint.Inquiry, visit func(*request.Record, *evidence.SeriesRead)) {
	eachReadable(q, func(rec *request.Record, read *evidence.Read) {
		for i := range read.Series {
			if read.Series[i].Trouble == nil {
				visit(rec, &read.Series[i])
			}
		}
	})
}

// eachTroubled visits the records whose file could not be read.
func eachTroubled(q *lint.Inquiry, visit func(*request.Record, *evidence.Read)) {
	for i := range q.Reads {
		read := &q.Reads[i]
		if rec := recordNamed(q.Manifest, read.Record); rec != nil && read.Trouble != nil {
			visit(rec, read)
		}
	}
}

// fromTrouble is the run of a rule that tells one kind of trouble with the
// file of a record.
func fromTrouble(kind evidence.TroubleKind) func(*lint.Inquiry) {
	return func(q *lint.Inquiry) {
		eachTroubled(q, func(rec *request.Record, read *evidence.Read) {
			if read.Trouble.Kind == kind {
				q.Report(unread(q, rec, read))
			}
		})
	}
}

// unread is the finding about a file that was not read, at its name.
func unread(q *lint.Inquiry, rec *request.Record, read *evidence.Read) finding.Finding {
	return finding.Finding{
		At:      filePlace(rec),
		Series:  seriesOf(q.Manifest, rec),
		Message: read.Trouble.Message,
	}
}

func recordNamed(m *request.Manifest, name string) *request.Record {
	if m == nil {
		return nil
	}
	for _, rec := range m.Records {
		if rec.Name == name {
			return rec
		}
	}
	return nil
}

// declared returns the series of a record as the manifest declares it, or nil
// when it was made from a header.
func declared(m *request.Manifest, rec *request.Record, name string) *request.Series {
	for _, s := range m.Series {
		if s.Name == name && !s.Implicit && (s.Record == "" || s.Record == rec.Name) {
			return s
		}
	}
	return nil
}

// seriesOf lists the declared series of a record, in the manifest's order.
func seriesOf(m *request.Manifest, rec *request.Record) []string {
	var names []string
	for _, s := range m.Series {
		if s.Record == rec.Name || s.Record == "" && len(m.Records) == 1 {
			names = append(names, s.Name)
		}
	}
	return names
}

// seriesRead lists the series that were read from a record.
func seriesRead(read *evidence.Read) []string {
	var names []string
	for _, s := range read.Series {
		names = append(names, s.Name)
	}
	return names
}

// filePlace is where a record names its file.
func filePlace(rec *request.Record) document.Span {
	if p, ok := rec.Keys["file"]; ok {
		return p.Value
	}
	return rec.Header
}

// axisPlace is where a record says something of its axis: the key asked for,
// else the axis, else the file whose axis was found.
func axisPlace(rec *request.Record, key string) document.Span {
	if rec.Along != nil {
		if p, ok := rec.Along.Keys[key]; ok {
			return p.Value
		}
	}
	if p, ok := rec.Keys["along"]; ok {
		return p.Value
	}
	return filePlace(rec)
}

// seriesPlace is where a series is declared: the key asked for when it is
// written, else the header, else the file whose column made it.
func seriesPlace(q *lint.Inquiry, rec *request.Record, name, key string) document.Span {
	s := declared(q.Manifest, rec, name)
	if s == nil {
		return filePlace(rec)
	}
	if p, ok := s.Keys[key]; ok {
		return p.Value
	}
	return s.Header
}
