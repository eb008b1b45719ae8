package engine

import (
	"fmt"
	"slices"
	"strings"

	"lagwise/lint/document"
	"lagwise/lint/evidence"
	"lagwise/lint/request"
)

// bound is a request with its series found in manifests.
type bound struct {
	asked  *request.Asked
	series []evidence.BoundSeries // in the order of asked.Series()
	ready  bool                   // every series was found, in one place
}

// binder finds series by the names that requests write: plain, or
// manifest:series.
type binder struct {
	places map[string][]evidence.BoundSeries
	names  []string // every name that finds exactly one series, plain where it can be
	whole  bool     // every manifest is there, and all its series are known
}

func newBinder(sources []source, missing bool) *binder {
	b := &binder{places: map[string][]evidence.BoundSeries{}, whole: !missing}
	for _, src := range sources {
		b.whole = b.whole && src.whole
		for _, s := range src.series {
			place := evidence.BoundSeries{Manifest: src.manifest, Folder: src.folder(), Record: recordOf(src.manifest, s), Series: s}
			b.places[s.Name] = append(b.places[s.Name], place)
			b.places[qualified(place)] = append(b.places[qualified(place)], place)
		}
	}
	for _, src := range sources {
		for _, s := range src.series {
			name := s.Name
			if len(b.places[name]) > 1 {
				name = src.manifest.Name + ":" + s.Name
			}
			if len(b.places[name]) == 1 {
				b.names = append(b.names, name)
			}
		}
	}
	return b
}

func qualified(b evidence.BoundSeries) string { return b.Manifest.Name + ":" + b.Series.Name }

// bind finds every series of a request. A name that is not found is told only
// when all manifests could be read: what follows from a missing one is not
// said again.
func (b *binder) bind(asked *request.Asked) (bound, []request.Problem) {
	got := bound{asked: asked, ready: asked.Whole()}
	var problems []request.Problem
	for _, name := range asked.Series() {
		found := b.places[name]
		switch {
		case len(found) == 1 && found[0].Record != nil:
			place := found[0]
			place.Name = name
			got.series = append(got.series, place)
			continue
		case len(found) == 0 && b.whole:
			problems = append(problems, b.unknown(asked, name)...)
		case len(found) > 1:
			problems = append(problems, b.ambiguous(asked, name, found)...)
		}
		got.ready = false
	}
	return got, problems
}

// recordOf returns the record of a series: the one it names, else the only
// one; nil is told where the manifest is judged.
func recordOf(m *request.Manifest, s *request.Series) *request.Record {
	if s.Record == "" {
		if len(m.Records) == 1 {
			return m.Records[0]
		}
		return nil
	}
	i := slices.IndexFunc(m.Records, func(r *request.Record) bool { return r.Name == s.Record })
	if i < 0 {
		return nil
	}
	return m.Records[i]
}

func (b *binder) unknown(asked *request.Asked, name string) []request.Problem {
	near := request.Nearest(name, b.names)
	message := fmt.Sprintf("No manifest has a series %q.", name)
	if near != "" {
		message += fmt.Sprintf(" The nearest is %q.", near)
	} else {
		message += " " + b.listed()
	}
	return atNames(asked, name, func(at document.Span) request.Problem {
		p := request.Problem{Rule: "unknown-series", At: at, Message: message, Request: asked.Name}
		if near != "" {
			p.Nearest = &document.Edit{At: at, Text: document.Quote(near)}
		}
		return p
	})
}

// listed says which series there are, as far as a sentence holds them.
func (b *binder) listed() string {
	const most = 8
	names := b.names
	switch {
	case len(names) == 0:
		return "The manifests hold no series."
	case len(names) > most:
		return fmt.Sprintf("There are %s and %d more.", strings.Join(names[:most], ", "), len(names)-most)
	}
	return fmt.Sprintf("There are %s.", strings.Join(names, ", "))
}

func (b *binder) ambiguous(asked *request.Asked, name string, found []evidence.BoundSeries) []request.Problem {
	var long []string
	var related []request.RelatedPlace
	for _, f := range found {
		long = append(long, fmt.Sprintf("%q", qualified(f)))
		related = append(related, request.RelatedPlace{File: f.Manifest.File, At: f.Series.Header, Message: "one series of that name"})
	}
	message := fmt.Sprintf("%q names %d series. Write %s.", name, len(found), strings.Join(long, " or "))
	if len(b.places[qualified(found[0])]) > 1 {
		message = fmt.Sprintf("%q names %d series of manifests with the same name. Rename one of the manifests, or list only one in `manifests`.", name, len(found))
	}
	return atNames(asked, name, func(at document.Span) request.Problem {
		return request.Problem{Rule: "ambiguous-series", At: at, Message: message, Request: asked.Name, Related: related}
	})
}

// atNames makes one problem for every place where a request names a series.
func atNames(asked *request.Asked, name string, problem func(at document.Span) request.Problem) []request.Problem {
	places := asked.Names[name]
	if len(places) == 0 {
		places = []document.Span{asked.Header}
	}
	var all []request.Problem
	for _, at := range places {
		all = append(all, problem(at))
	}
	return all
}
