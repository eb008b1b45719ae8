package engine

import (
	"fmt"
	"slices"
	"strings"
	"time"

	"lagwise/lint/document"
	"lagwise/lint/finding"
	"lagwise/lint/request"
)

// The rules about deviations.
const (
	idleDeviation       = "idle-deviation"
	incompleteDeviation = "incomplete-deviation"
	endedDeviation      = "ended-deviation"
	endingDeviation     = "ending-deviation"
)

// endingDays is how long ahead the end of a deviation is told.
const endingDays = 30

// deviation is one documented deviation and what it may answer.
type deviation struct {
	*request.Deviation
	request string        // name of the request it stands in, or empty
	index   int           // of that request; -1 in a manifest
	series  []string      // of a manifest: the series it is about
	area    document.Span // of a manifest: the table that it stands under
	changed bool          // the data that it was given for have changed
}

// deviations lists the deviations of a document in their order.
func (s *snapshot) deviations() []*deviation {
	var all []*deviation
	switch s.kind {
	case request.AnalysisDoc:
		for i, asked := range s.analysis().Requests {
			for k := range asked.Deviations {
				all = append(all, &deviation{Deviation: &asked.Deviations[k], request: asked.Name, index: i})
			}
		}
	case request.ManifestDoc:
		m := s.manifest().Manifest
		for _, series := range m.Series {
			for k := range series.Deviations {
				all = append(all, &deviation{Deviation: &series.Deviations[k], index: -1,
					series: []string{series.Name}, area: area(series.Header, series.Keys)})
			}
		}
		for _, rec := range m.Records {
			for k := range rec.Deviations {
				all = append(all, &deviation{Deviation: &rec.Deviations[k], index: -1,
					series: seriesOf(m, rec), area: area(rec.Header, rec.Keys)})
			}
		}
	}
	return all
}

// area is a table from its header to its last statement.
func area(header document.Span, keys map[string]request.Place) document.Span {
	for _, k := range keys {
		header.End = max(header.End, k.Statement.End)
	}
	return header
}

func seriesOf(m *request.Manifest, rec *request.Record) []string {
	var all []string
	for _, s := range m.Series {
		if recordOf(m, s) == rec {
			all = append(all, s.Name)
		}
	}
	return all
}

// deviationProblems is what the text and the day say against a deviation.
func (r *reading) deviationProblems(d *deviation) []request.Problem {
	tell := func(rule, message string) []request.Problem {
		return []request.Problem{{Rule: rule, At: d.place("from"), Message: message, Request: d.request}}
	}
	rule := r.ed.engine.byName[d.From]
	absent := r.absent(d)
	switch {
	case d.From == "":
		return nil // absent-field says it
	case rule == nil:
		p := r.ed.engine.unknownRule(d.From, d.place("from"), true)
		p.Request = d.request
		return []request.Problem{p}
	case rule.NoDeviation:
		return tell(idleDeviation, fmt.Sprintf("%s admits no deviation, so this one answers nothing. Take it out.", d.From))
	case len(absent) > 0:
		return tell(incompleteDeviation, fmt.Sprintf("This deviation takes no effect: the lab asks for %s as well.", strings.Join(absent, ", ")))
	case r.ended(d):
		return tell(endedDeviation, fmt.Sprintf("This deviation ended on %s. Renew it with a reason, or answer the finding.", d.Until))
	case r.tooLong(d):
		return tell(incompleteDeviation, fmt.Sprintf("This deviation takes no effect: the lab admits none beyond %s from now. Give an earlier `until`.", r.lab.merged.AskedFor.DeviationLongest))
	case r.endsSoon(d):
		return tell(endingDeviation, fmt.Sprintf("This deviation ends on %s.", d.Until))
	}
	return nil
}

// takesEffect reports whether a deviation answers findings at all.
func (r *reading) takesEffect(d *deviation) bool {
	rule := r.ed.engine.byName[d.From]
	return rule != nil && !rule.NoDeviation && d.Reason != "" && len(r.absent(d)) == 0 && !d.changed && !r.ended(d) && !r.tooLong(d)
}

// absent lists what the lab asks of a deviation and this one does not have.
func (r *reading) absent(d *deviation) []string {
	has := map[string]string{"from": d.From, "reason": d.Reason, "by": d.By, "accepted-by": d.AcceptedBy, "until": d.Until, "data": d.Data}
	var absent []string
	for _, field := range r.lab.merged.AskedFor.Deviation {
		if value, known := has[field]; known && value == "" {
			absent = append(absent, field)
		}
	}
	if r.lab.merged.AskedFor.DeviationLongest != "" && d.Until == "" && !slices.Contains(absent, "until") {
		absent = append(absent, "until")
	}
	return absent
}

// ended reports whether the last day of a deviation has passed. A day that
// cannot be read vouches for nothing.
func (r *reading) ended(d *deviation) bool {
	if d.Until == "" || r.ed.engine.options.OnDate == "" {
		return false
	}
	until, today, ok := r.days(d)
	return !ok || today.After(until)
}

func (r *reading) endsSoon(d *deviation) bool {
	until, today, ok := r.days(d)
	return ok && !until.After(today.AddDate(0, 0, endingDays))
}

func (r *reading) tooLong(d *deviation) bool {
	longest, err := request.ParsePeriod(r.lab.merged.AskedFor.DeviationLongest)
	until, today, ok := r.days(d)
	if err != nil || !ok {
		return false
	}
	return until.After(today.AddDate(0, longest.Months, longest.Days).Add(time.Duration(longest.Seconds * float64(time.Second))))
}

func (r *reading) days(d *deviation) (until, today time.Time, ok bool) {
	until, err := time.Parse(time.DateOnly, d.Until)
	today, wrong := time.Parse(time.DateOnly, r.ed.engine.options.OnDate)
	return until, today, err == nil && wrong == nil
}

// place is where a key of a deviation stands, else the deviation.
func (d *deviation) place(key string) document.Span {
	if p, ok := d.Keys[key]; ok {
		return p.Value
	}
	return d.At
}

// answer lets the first deviation that takes effect and speaks of a finding
// answer it.
func (r *reading) answer(f *finding.Finding, devs []*deviation) {
	for _, d := range devs {
		if d.speaksOf(f) && r.takesEffect(d) {
			f.Deviation = d.Deviation
			return
		}
	}
}

// speaksOf reports whether a deviation is about a finding. One that is
// narrowed to a pair is about a finding of that pair alone: what is said of
// further pairs still stands.
func (d *deviation) speaksOf(f *finding.Finding) bool {
	if d.From != f.Rule || d.request != f.Request {
		return false
	}
	if d.index < 0 {
		return inside(d.area, f.At) || slices.ContainsFunc(f.Series, func(s string) bool { return slices.Contains(d.series, s) })
	}
	if len(d.Pair) == 0 {
		return true
	}
	for _, p := range f.Pairs {
		if !samePair(d.Pair, p) {
			return false
		}
	}
	return len(f.Pairs) > 0
}

func samePair(a []string, b [2]string) bool {
	return len(a) == 2 && (a[0] == b[0] && a[1] == b[1] || a[0] == b[1] && a[1] == b[0])
}
