package evidence

import (
	"context"
	"errors"

	"lagwise/lint/dataset"
	"lagwise/lint/request"
)

// Reads returns what reading each record of a manifest showed, in its order.
func (s *Store) Reads(ctx context.Context, m *request.Manifest, roots *dataset.Roots) []Read {
	folder := manifestFolder(roots.Root(), m)
	var all []Read
	for _, rec := range m.Records {
		read := Read{Record: rec.Name, File: rec.File}
		record, err := s.data.Record(ctx, roots, folder, rec)
		switch {
		case err == nil:
			read.fill(record, rec)
			for _, decl := range s.declared(m, rec, record) {
				read.Series = append(read.Series, seriesRead(record, decl, rec))
			}
		case passing(err):
			return all
		default:
			read.Trouble, read.SplitBy = troubleFrom(err)
		}
		all = append(all, read)
	}
	return all
}

func troubleFrom(err error) (trouble *Trouble, splitBy string) {
	var t *dataset.Trouble
	if errors.As(err, &t) {
		words := troubleOf(t)
		return &words, t.SplitBy
	}
	return &Trouble{Kind: UnreadableRecord, Message: err.Error()}, ""
}

func (r *Read) fill(record *dataset.Record, rec *request.Record) {
	seen := record.Seen(rec)
	a := seen.Axis
	r.Rows, r.Columns, r.SplitBy = seen.Rows, seen.Columns, seen.SplitBy
	r.Axis = AxisSeen{Column: a.Column, Kind: string(a.Kind), Declared: seen.Declared, Step: a.StepText, Even: a.Even, Gaps: a.Gaps,
		First: a.First(), Last: a.Last(), Backward: a.Backward, Unsorted: a.Unsorted, Repeated: a.Repeated,
		FirstRepeated: a.FirstRepeated, RepeatedLine: a.RepeatedLine,
		Unparsed: a.Unparsed, UnparsedLine: a.UnparsedLine, UnparsedText: a.UnparsedText, Ambiguous: a.Ambiguous}
}

func seriesRead(record *dataset.Record, decl *request.Series, rec *request.Record) SeriesRead {
	out := SeriesRead{Name: decl.Name, Column: columnName(decl), DeclaredSeries: !decl.Implicit}
	seen := record.SeenOf(decl, rec)
	if seen.Trouble != nil {
		trouble := troubleOf(seen.Trouble)
		out.Trouble = &trouble
		return out
	}
	c := seen.Column
	out.N, out.Missing, out.Unparsed, out.UnparsedLine, out.UnparsedText = c.N, c.Missing, c.Unparsed, c.UnparsedLine, c.UnparsedText
	out.Constant, out.Value, out.Suspect, out.SuspectCount = seen.Constant, seen.Value, c.Suspect, c.SuspectCount
	out.Measured = c.N + c.Censored
	out.Censored, out.HeaderUnit, out.Unit = seen.Censored, c.HeaderUnit, seen.Unit
	return out
}

func columnName(decl *request.Series) string {
	if decl.Column == "" {
		return decl.Name
	}
	return decl.Column
}
