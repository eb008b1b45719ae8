package dataset

import (
	"slices"

	"lagwise/lint/request"
)

// track is a series on its way into a frame: sorted positions with values,
// only where there is a value.
type track struct {
	name      string
	positions []float64
	values    []float64
	group     []int // index into labels; nil when the record has no groups
	labels    []string
	unit      AxisUnit
	kind      request.AxisKind
	step      float64
	even      bool
	season    int
	scale     scale
	axis      *Axis
	support   string
	filled    int
}

// newTrack cuts a series to the window and the groups of a request.
func newTrack(s *Series, req *request.Request) (*track, error) {
	a := s.Axis
	if a.Ambiguous {
		return nil, mismatch("the dates of %s, such as %q, can be read in two ways; say which in its manifest: along = { column = %q, kind = \"time\", format = \"%%d/%%m/%%Y\" }",
			s.Name, a.UnparsedText, a.Column)
	}
	if a.Repeated > 0 && req.Every == "" {
		return nil, mismatch("%s has %d rows at a position that stood before, first %s on line %d; correct the file, name the groups (group = …), or work at a coarser step (every = …)",
			s.Name, a.Repeated, a.FirstRepeated, a.RepeatedLine)
	}
	w, err := windowOf(a, req.From, req.Until)
	if err != nil {
		return nil, err
	}
	t := &track{name: s.Name, unit: a.Unit, kind: a.Kind, step: a.Step, even: a.Even, season: s.Season, scale: a.scale(),
		axis: a, support: s.Support, labels: a.labels}
	for i, v := range s.Values {
		if v != v || !w.holds(a.Positions[i]) {
			continue
		}
		if a.groups != nil {
			if len(req.GroupList) > 0 && !slices.Contains(req.GroupList, a.labels[a.groups[i]]) {
				continue
			}
			t.group = append(t.group, int(a.groups[i]))
		}
		t.positions = append(t.positions, a.Positions[i])
		t.values = append(t.values, v)
	}
	return t, nil
}

// groupAt returns the group of a row, 0 without groups.
func (t *track) groupAt(i int) int {
	if t.group == nil {
		return 0
	}
	return t.group[i]
}

// shifted returns the track moved by whole steps, later for positive ones.
func (t *track) shifted(steps int) (*track, error) {
	if steps == 0 {
		return t, nil
	}
	if !t.even || t.step <= 0 {
		return nil, mismatch("a lag counts whole steps, but the axis of %s is uneven; work at a coarser even step (every = …)", t.name)
	}
	moved := *t
	moved.positions = make([]float64, len(t.positions))
	for i, p := range t.positions {
		moved.positions[i] = p + float64(steps)*t.step
	}
	return &moved, nil
}
