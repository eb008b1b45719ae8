package evidence

import (
	"context"

	"lagwise/lint/dataset"
	"lagwise/lint/request"
	"lagwise/stats/association"
)

// Alone is what is known of one series of a manifest by itself, on all its
// rows.
type Alone struct {
	Series      *request.Series
	Record      *request.Record
	Column      string
	Unit        string
	Step        string // as measured
	Per         string // unit of a slope: year, month, day, …
	Missing     int
	Frame       *dataset.Frame
	Profile     *Profile
	Differences *Profile // of the first differences; nil when there are none
	Err         error
}

// EffectiveN is the number of independent values behind the mean of the
// series: the effective n of the series with itself.
func (a *Alone) EffectiveN() (float64, error) {
	x := a.Frame.Columns[0]
	return association.EffectiveN(x, x, a.Frame.Runs)
}

// Alone returns every series of a manifest, in its order. The error is that
// of the run alone; a series that cannot be read says so itself.
func (s *Store) Alone(ctx context.Context, m *request.Manifest, roots *dataset.Roots, set Settings) ([]Alone, error) {
	folder := manifestFolder(roots.Root(), m)
	var all []Alone
	for _, rec := range m.Records {
		record, err := s.data.Record(ctx, roots, folder, rec)
		if err != nil && passing(err) {
			return nil, err
		}
		for _, decl := range s.declared(m, rec, record) {
			one := Alone{Series: decl, Record: rec, Column: columnName(decl), Err: err}
			if err == nil {
				s.fillAlone(ctx, &one, record, set)
			}
			if one.Err != nil && passing(one.Err) {
				return nil, one.Err
			}
			all = append(all, one)
		}
	}
	return all, nil
}

func (s *Store) fillAlone(ctx context.Context, one *Alone, record *dataset.Record, set Settings) {
	got, trouble := record.Series(one.Series, one.Record)
	if trouble != nil {
		one.Err = trouble
		return
	}
	one.Unit, one.Step, one.Per = got.Unit, record.Axis.StepText, record.Axis.Per()
	req := request.Request{Kind: request.Correlation, Between: []string{got.Name}, Groups: "within", LeastShare: 0.8}
	rows, err := s.aligned(ctx, []*dataset.Series{got}, &req)
	if one.Err = err; err != nil {
		return
	}
	one.Frame = rows.Frame
	one.Missing = len(got.Values) - len(one.Frame.Positions)
	if one.Profile, one.Err = s.profile(ctx, rows.column(0), set); one.Err != nil {
		return
	}
	d, err := s.transformed(ctx, rows, nil, []request.Transform{{Name: request.FirstDifferences}}, nil)
	if err == nil {
		one.Differences, one.Err = s.profile(ctx, d.column(0), set)
	}
}

// declared returns the series of a manifest that stand in a record: those
// with a table of their own, or one for every numeric column when the
// manifest has no table of series.
func (s *Store) declared(m *request.Manifest, rec *request.Record, read *dataset.Record) []*request.Series {
	var all []*request.Series
	for _, decl := range m.Series {
		if decl.Record == rec.Name || decl.Record == "" && len(m.Records) == 1 {
			all = append(all, decl)
		}
	}
	if len(m.Series) > 0 || read == nil {
		return all
	}
	for _, col := range read.Columns {
		if col.Numeric && col.Name != read.Axis.Column {
			all = append(all, rec.Implicit(col.Name))
		}
	}
	return all
}
