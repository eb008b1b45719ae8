package server

import (
	"context"
	"crypto/sha256"
	"encoding/hex"
	"encoding/json"
	"errors"
	"path/filepath"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"

	"lagwise/lint/engine"
	"lagwise/lint/finding"
)

// Diagnostic answers a client that asks for findings itself: once every rule
// has spoken, or with "unchanged" when it has them already.
func (s *session) Diagnostic(ctx context.Context, p *protocol.DocumentDiagnosticParams) (protocol.DocumentDiagnosticReport, error) {
	path, ok := s.followed(p.TextDocument.URI)
	if !ok {
		return fullReport(nil, ""), nil
	}
	ed := edition(ctx)
	j, err := working(ctx, s, p.WorkDoneToken, "Checking "+filepath.Base(path), func(ctx context.Context) (*engine.Judgement, error) {
		return whilePresent(ctx, s, ed, path, func(ctx context.Context) (*engine.Judgement, error) { return ed.Judge(ctx, path) })
	})
	if err != nil {
		return nil, retrigger(err)
	}
	items := s.diagnostics(ed, j)
	id := digest(encoded(items))
	if p.PreviousResultID != nil && *p.PreviousResultID == id {
		return &protocol.RelatedUnchangedDocumentDiagnosticReport{UnchangedDocumentDiagnosticReport: protocol.UnchangedDocumentDiagnosticReport{Kind: "unchanged", ResultID: id}}, nil
	}
	return fullReport(items, id), nil
}

func fullReport(items []protocol.Diagnostic, id string) protocol.DocumentDiagnosticReport {
	return &protocol.RelatedFullDocumentDiagnosticReport{FullDocumentDiagnosticReport: protocol.FullDocumentDiagnosticReport{Kind: "full", ResultID: &id, Items: items}}
}

// retrigger tells the client to ask again when it was a newer edit that ended
// the judging.
func retrigger(err error) error {
	if !errors.Is(err, errEdited) {
		return err
	}
	again := jsonrpc2.NewError(jsonrpc2.Code(protocol.LSPErrorCodesServerCancelled), "the document changed")
	again.Data = jsonrpc2.RawMessage(`{"retriggerRequest":true}`)
	return again
}

// diagnostics returns the findings of a document as the client shows them.
func (s *session) diagnostics(ed *engine.Edition, j *engine.Judgement) []protocol.Diagnostic {
	items := make([]protocol.Diagnostic, 0, len(j.Findings))
	text, err := ed.Text(j.Path)
	if err != nil {
		return items
	}
	at := s.places(text)
	for i := range j.Findings {
		items = append(items, s.diagnostic(ed, j, &j.Findings[i], at))
	}
	return items
}

func (s *session) diagnostic(ed *engine.Edition, j *engine.Judgement, f *finding.Finding, at places) protocol.Diagnostic {
	d := protocol.Diagnostic{
		Range:    at.rangeOf(f.At),
		Severity: severities[f.Severity],
		Code:     protocol.String(f.Rule),
		Source:   protocol.NewOptional("lagwise"),
		Message:  protocol.String(f.Message),
	}
	if f.Deviation != nil {
		// Answered: shown, but no longer something to act on.
		d.Severity = protocol.DiagnosticSeverityInformation
		d.Message = protocol.String(underDeviation(f) + f.Message)
	}
	d.Data, _ = json.Marshal(map[string]string{"fingerprint": f.Fingerprint})
	if s.able.related {
		d.RelatedInformation = s.related(ed, j, f)
	}
	return d
}

func underDeviation(f *finding.Finding) string {
	if f.Deviation.Until == "" {
		return "Under a deviation: "
	}
	return "Under a deviation until " + f.Deviation.Until + ": "
}

// severities of the protocol; it has none for "none".
var severities = map[finding.Severity]protocol.DiagnosticSeverity{
	finding.Error:       protocol.DiagnosticSeverityError,
	finding.Warning:     protocol.DiagnosticSeverityWarning,
	finding.Information: protocol.DiagnosticSeverityInformation,
	finding.Hint:        protocol.DiagnosticSeverityHint,
	finding.None:        protocol.DiagnosticSeverityHint,
}

// related converts the other places of a finding, each in its own text.
func (s *session) related(ed *engine.Edition, j *engine.Judgement, f *finding.Finding) []protocol.DiagnosticRelatedInformation {
	var all []protocol.DiagnosticRelatedInformation
	for _, r := range f.Related {
		path := filepath.Join(j.Root, filepath.FromSlash(r.File))
		text, err := ed.Text(path)
		if err != nil {
			continue
		}
		all = append(all, protocol.DiagnosticRelatedInformation{
			Location: protocol.Location{URI: s.uriOf(path), Range: s.places(text).rangeOf(r.At)},
			Message:  r.Message,
		})
	}
	return all
}

// encoded returns the findings as bytes, to tell whether they changed.
func encoded(items []protocol.Diagnostic) []byte {
	var all []byte
	for i := range items {
		b, err := protocol.Marshal(&items[i])
		if err != nil {
			continue
		}
		all = append(append(all, b...), '\n')
	}
	return all
}

func digest(b []byte) string {
	sum := sha256.Sum256(b)
	return hex.EncodeToString(sum[:8])
}
