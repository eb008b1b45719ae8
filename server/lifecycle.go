package server

import (
	"context"
	"slices"

	"go.lsp.dev/protocol"

	"lagwise/lint/document"
)

// abilities is what the client said it can do, as far as it matters here.
type abilities struct {
	encoding        document.Encoding
	pull            bool // asks for findings itself; nothing is pushed to it
	refreshPull     bool
	related         bool // shows related places of a finding
	markdown        bool
	documentChanges bool
	actionLiterals  bool
	resolveEdit     bool // asks for the edit of an action later
	watchFiles      bool
	workProgress    bool
}

func is(b *bool) bool { return b != nil && *b }

// abilitiesOf reads the client's capabilities; all of them may be absent.
func abilitiesOf(c *protocol.ClientCapabilities) abilities {
	a := abilities{encoding: document.UTF16}
	if g := c.General; g != nil {
		a.encoding = encodingOf(g.PositionEncodings)
	}
	if d := c.TextDocument; d != nil {
		a.pull = d.Diagnostic != nil
		if d.Diagnostic != nil {
			a.related = is(d.Diagnostic.RelatedInformation)
		} else if d.PublishDiagnostics != nil {
			a.related = is(d.PublishDiagnostics.RelatedInformation)
		}
		if d.Hover != nil {
			a.markdown = len(d.Hover.ContentFormat) > 0 && d.Hover.ContentFormat[0] == protocol.MarkupKindMarkdown
		}
		if d.CodeAction != nil {
			a.actionLiterals = len(d.CodeAction.CodeActionLiteralSupport.CodeActionKind.ValueSet) > 0
			a.resolveEdit = is(d.CodeAction.DataSupport) && slices.Contains(d.CodeAction.ResolveSupport.Properties, "edit")
		}
	}
	if w := c.Workspace; w != nil {
		a.refreshPull = w.Diagnostics != nil && is(w.Diagnostics.RefreshSupport)
		a.documentChanges = w.WorkspaceEdit != nil && is(w.WorkspaceEdit.DocumentChanges)
		a.watchFiles = w.DidChangeWatchedFiles != nil && is(w.DidChangeWatchedFiles.DynamicRegistration)
	}
	if w := c.Window; w != nil {
		a.workProgress = is(w.WorkDoneProgress)
	}
	return a
}

// encodingOf chooses how characters are counted: bytes if the client can, as
// nothing has to be converted then; UTF-32 only where nothing else is offered.
func encodingOf(offered []protocol.PositionEncodingKind) document.Encoding {
	switch {
	case slices.Contains(offered, protocol.PositionEncodingKindUTF8):
		return document.UTF8
	case len(offered) == 1 && offered[0] == protocol.PositionEncodingKindUTF32:
		return document.UTF32
	}
	return document.UTF16
}

// requests are the methods that are answered; any other is unknown whatever
// its parameters are.
var requests = map[string]bool{
	protocol.MethodTextDocumentHover:      true,
	protocol.MethodTextDocumentCodeAction: true,
	protocol.MethodCodeActionResolve:      true,
	protocol.MethodTextDocumentDiagnostic: true,
	methodFindings:                        true,
}

func (s *session) answers(method string) bool { return requests[method] }

// Initialize takes in what the client can do and says what the server does.
func (s *session) Initialize(_ context.Context, p *protocol.InitializeParams) (*protocol.InitializeResult, error) {
	s.able = abilitiesOf(&p.Capabilities)
	s.folders.set(foldersOf(p))
	s.workspace = s.configured(p.InitializationOptions).Workspace(s.folders.list()...)
	if p.ProcessID != nil && *p.ProcessID > 0 && s.options.ParentPID == 0 {
		s.followParent(int(*p.ProcessID))
	}
	return &protocol.InitializeResult{
		Capabilities: s.capabilities(),
		ServerInfo:   protocol.ServerInfo{Name: "lagwise", Version: protocol.NewOptional(s.options.Version)},
	}, nil
}

// capabilities is what the server offers this client.
func (s *session) capabilities() protocol.ServerCapabilities {
	yes, incremental := true, protocol.TextDocumentSyncKindIncremental
	c := protocol.ServerCapabilities{
		PositionEncoding: encodingKinds[s.able.encoding],
		TextDocumentSync: &protocol.TextDocumentSyncOptions{OpenClose: &yes, Change: &incremental, Save: &protocol.SaveOptions{}},
		HoverProvider:    protocol.Boolean(true),
		Workspace: &protocol.WorkspaceOptions{WorkspaceFolders: &protocol.WorkspaceFoldersServerCapabilities{
			Supported: &yes, ChangeNotifications: protocol.Boolean(true)}},
	}
	if s.able.actionLiterals {
		c.CodeActionProvider = &protocol.CodeActionOptions{
			CodeActionKinds: []protocol.CodeActionKind{protocol.CodeActionKindQuickFix, fixAll},
			ResolveProvider: &s.able.resolveEdit,
		}
	}
	if s.able.pull {
		c.DiagnosticProvider = &protocol.DiagnosticOptions{InterFileDependencies: true}
	}
	return c
}

var encodingKinds = map[document.Encoding]protocol.PositionEncodingKind{
	document.UTF8:  protocol.PositionEncodingKindUTF8,
	document.UTF16: protocol.PositionEncodingKindUTF16,
	document.UTF32: protocol.PositionEncodingKindUTF32,
}

// Shutdown stops the work in hand; the process ends with exit.
func (s *session) Shutdown(context.Context) error {
	s.publisher.close()
	return nil
}

// Exit ends the session; the transport knows with which status.
func (s *session) Exit(context.Context) error {
	s.stop()
	return nil
}
