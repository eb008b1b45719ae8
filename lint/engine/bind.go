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

// binder finds series by the names that requests write.
type binder struct {
	sources []source
	whole   bool // every manifest is there, and all its series are known
}

func newBinder(sources []source, missing bool) binder {
	b := binder{sources: sources, whole: !missing}
	for _, s := range sources {
		b.whole = b.whole && s.whole
	}
	return b
}

// bind finds every series of a request. A name that is not found is told only
// when all manifests could be read: what follows from a missing one is not
// said again.
func (b binder) bind(asked *request.Asked) (bound, []request.Problem) {
	got := bound{asked: asked, ready: true}
	var problems []request.Problem
	for _, name := range asked.Series() {
		found := b.find(name)
		switch {
		case len(found) == 1 && found[0].Record != nil:
			got.series = append(got.series, found[0])
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

// find returns every place where a series of that name is declared.
func (b binder) find(name string) []evidence.BoundSeries {
	found := b.named("", name, name)
	if manifest, series, qualified := strings.Cut(name, ":"); len(found) == 0 && qualified {
		found = b.named(manifest, series, name)
	}
	return found
}

func (b binder) named(manifest, series, written string) []evidence.BoundSeries {
	var found []evidence.BoundSeries
	for _, src := range b.sources {
		if manifest != "" && src.manifest.Name != manifest {
			continue
		}
		for _, s := range src.series {
			if s.Name == series {
				found = append(found, evidence.BoundSeries{Name: written, Manifest: src.manifest,
					Folder: src.folder(), Record: recordOf(src.manifest, s), Series: s})
			}
		}
	}
	return found
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

func (b binder) unknown(asked *request.Asked, name string) []request.Problem {
	near := request.Nearest(name, b.names())
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

// names returns every name that would find exactly one series.
func (b binder) names() []string {
	var all []string
	for _, src := range b.sources {
		for _, s := range src.series {
			if len(b.find(s.Name)) == 1 {
				all = append(all, s.Name)
			} else if long := src.manifest.Name + ":" + s.Name; len(b.find(long)) == 1 {
				all = append(all, long)
			}
		}
	}
	return all
}

// listed says which series there are, as far as a sentence holds them.
func (b binder) listed() string {
	const most = 8
	names := b.names()
	switch {
	case len(names) == 0:
		return "The manifests hold no series."
	case len(names) > most:
		return fmt.Sprintf("There are %s and %d more.", strings.Join(names[:most], ", "), len(names)-most)
	}
	return fmt.Sprintf("There are %s.", strings.Join(names, ", "))
}

func (b binder) ambiguous(asked *request.Asked, name string, found []evidence.BoundSeries) []request.Problem {
	var long []string
	var related []request.RelatedPlace
	for _, f := range found {
		long = append(long, fmt.Sprintf("%q", f.Manifest.Name+":"+f.Series.Name))
		related = append(related, request.RelatedPlace{File: f.Manifest.File, At: f.Series.Header, Message: "one series of that name"})
	}
	message := fmt.Sprintf("%q names %d series. Write %s.", name, len(found), strings.Join(long, " or "))
	if slices.Compact(slices.Sorted(slices.Values(long)))[0] == long[len(long)-1] {
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
