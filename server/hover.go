package server

import (
	"context"
	"slices"
	"strings"

	"go.lsp.dev/protocol"

	"lagwise/lint/document"
	"lagwise/lint/engine"
	"lagwise/lint/finding"
	"lagwise/lint/present"
	"lagwise/lint/request"
	"lagwise/lint/result"
)

// Hover shows what stands under the cursor: the meaning of a key, and the
// evidence of the request or the screening of the series around it.
func (s *session) Hover(ctx context.Context, p *protocol.HoverParams) (*protocol.Hover, error) {
	path, ok := s.followed(p.TextDocument.URI)
	if !ok {
		return nil, nil
	}
	ed := edition(ctx)
	text, err := ed.Text(path)
	if err != nil {
		return nil, nil
	}
	at := s.places(text)
	offset := at.offset(p.Position)
	var said []string
	var span document.Span
	if key, place, ok := keyAt(ed.Tree(path), request.DocumentKind(path), offset); ok {
		said, span = append(said, s.meaning(key)), place
	}
	about, place, err := s.about(ctx, ed, path, offset, p.WorkDoneToken)
	if ctx.Err() != nil {
		return nil, ctx.Err()
	}
	if err != nil { // what is known of the key is still worth showing
		s.logFailure("hover", err)
	}
	if about != "" {
		said = append(said, about)
		if span.Empty() {
			span = place
		}
	}
	if len(said) == 0 {
		return nil, nil
	}
	return s.hover(strings.Join(said, "\n\n"), at.rangeOf(span)), nil
}

func (s *session) hover(words string, r protocol.Range) *protocol.Hover {
	kind := protocol.MarkupKindPlainText
	if s.able.markdown {
		kind = protocol.MarkupKindMarkdown
	}
	return &protocol.Hover{Contents: &protocol.MarkupContent{Kind: kind, Value: words}, Range: &r}
}

// about renders what is known of the request or series around the offset.
func (s *session) about(ctx context.Context, ed *engine.Edition, path string, offset int, token protocol.ProgressToken) (string, document.Span, error) {
	if asked := requestAt(ed.Requests(path), offset); asked != nil {
		words, err := working(ctx, s, token, "Computing "+asked.Name, func(ctx context.Context) (string, error) {
			return s.evidence(ctx, ed, path, asked)
		})
		return words, asked.Header, err
	}
	if series := seriesAt(ed.Manifest(path), offset); series != nil {
		words, err := working(ctx, s, token, "Screening "+series.Name, func(ctx context.Context) (string, error) {
			return s.screening(ctx, ed, path, series.Name)
		})
		return words, series.Header, err
	}
	return "", document.Span{}, nil
}

// evidence renders a request with its findings.
func (s *session) evidence(ctx context.Context, ed *engine.Edition, path string, asked *request.Asked) (string, error) {
	judged, err := ed.Judge(ctx, path)
	if err != nil {
		return "", err
	}
	explained, err := ed.Explain(ctx, path, asked.Index)
	if err != nil {
		return "", err
	}
	about := slices.DeleteFunc(slices.Clone(judged.Findings), func(f finding.Finding) bool { return f.Request != asked.Name })
	return present.Hover(explained, about, s.able.markdown), nil
}

// screening renders what is known of one series of a manifest.
func (s *session) screening(ctx context.Context, ed *engine.Edition, path, name string) (string, error) {
	all, err := ed.Screen(ctx, path)
	if err != nil {
		return "", err
	}
	i := slices.IndexFunc(all, func(r result.Screened) bool { return r.Name == name })
	if i < 0 {
		return "", nil
	}
	return present.HoverSeries(&all[i], s.able.markdown), nil
}

// meaning renders what the schema says of a key.
func (s *session) meaning(k request.Key) string {
	words := []string{k.Meaning}
	name := k.Name
	if s.able.markdown {
		name = "**" + name + "**"
	}
	if len(k.Values) > 0 {
		words = append(words, "Allowed: "+strings.Join(k.Values, ", ")+".")
	}
	if k.Default != "" {
		words = append(words, "Default: "+strings.TrimSuffix(k.Default, ".")+".")
	}
	return name + ": " + strings.Join(words, " ")
}

// keyAt returns the schema's entry for the key under an offset.
func keyAt(t *document.Tree, kind request.Doc, offset int) (request.Key, document.Span, bool) {
	at := t.At(offset)
	keys := at.Keys
	if at.In == document.InValue {
		keys = nil
		for _, m := range at.Members {
			keys = append(keys, m.Key)
		}
	}
	if at.In == document.InHeader {
		return request.Key{}, document.Span{}, false
	}
	path := slices.Clone(at.Names)
	for _, k := range keys {
		if k.At.Contains(offset) {
			table, ok := request.TableAt(kind, path...)
			if !ok {
				break
			}
			entry, ok := request.Lookup(table, k.Text)
			return entry, k.At, ok && entry.Name != request.Any
		}
		path = append(path, k.Text)
	}
	return request.Key{}, document.Span{}, false
}

func requestAt(all []*request.Asked, offset int) *request.Asked {
	for _, a := range all {
		if a.At.Contains(offset) {
			return a
		}
	}
	return nil
}

// seriesAt returns the declared series in whose table the offset lies.
func seriesAt(m *request.Manifest, offset int) *request.Series {
	if m == nil {
		return nil
	}
	for _, one := range m.Series {
		if one.Implicit {
			continue
		}
		if one.Header.Contains(offset) {
			return one
		}
		for _, k := range one.Keys {
			if k.Statement.Contains(offset) {
				return one
			}
		}
	}
	return nil
}
