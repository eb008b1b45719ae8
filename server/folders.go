package server

import (
	"context"
	"slices"
	"sync"

	"go.lsp.dev/protocol"
	"go.lsp.dev/uri"

	"lagwise/lint/engine"
)

// folders is the list of workspace folders, as paths.
type folders struct {
	mu    sync.Mutex
	paths []string
}

func (f *folders) set(paths []string) {
	f.mu.Lock()
	defer f.mu.Unlock()
	f.paths = paths
}

func (f *folders) list() []string {
	f.mu.Lock()
	defer f.mu.Unlock()
	return slices.Clone(f.paths)
}

// foldersOf reads the folders from whichever of the three fields that the
// protocol has had for them the client filled in.
func foldersOf(p *protocol.InitializeParams) []string {
	if list, ok := p.WorkspaceFolders.Get(); ok {
		return pathsOf(list)
	}
	if p.RootURI != nil {
		if path, ok := pathOf(*p.RootURI); ok {
			return []string{path}
		}
	}
	if path, ok := p.RootPath.Get(); ok && path != "" {
		return []string{path}
	}
	return nil
}

func pathsOf(list []protocol.WorkspaceFolder) []string {
	var paths []string
	for _, f := range list {
		if path, ok := pathOf(uri.URI(f.URI)); ok {
			paths = append(paths, path)
		}
	}
	return paths
}

// DidChangeWorkspaceFolders adds and removes folders and judges everything
// that is open again: a document's root may be another one now.
func (s *session) DidChangeWorkspaceFolders(_ context.Context, p *protocol.DidChangeWorkspaceFoldersParams) error {
	removed := pathsOf(p.Event.Removed)
	kept := slices.DeleteFunc(s.folders.list(), func(path string) bool { return slices.Contains(removed, path) })
	for _, path := range pathsOf(p.Event.Added) {
		if !slices.Contains(kept, path) {
			kept = append(kept, path)
		}
	}
	s.folders.set(kept)
	s.workspace.SetFolders(kept...)
	s.publisher.again(s.documents.paths()...)
	return nil
}

// settings are what a user may set. They name folders outside the workspace,
// so they are taken from the options that the client starts the server with
// and never from a workspace's settings.
type settings struct {
	DataRoots []string `json:"dataRoots"`
}

// configured returns the engine with what the options say that the client
// started the server with, either bare or under the name of the tool.
func (s *session) configured(options protocol.LSPAny) *engine.Engine {
	if len(options) == 0 {
		return s.options.Engine
	}
	var given struct {
		DataRoots []string `json:"dataRoots"`
		Lagwise   settings `json:"lagwise"`
	}
	if err := protocol.Unmarshal(options, &given); err != nil {
		s.logger.Printf("initializationOptions: %v", err)
		return s.options.Engine
	}
	roots := append(given.DataRoots, given.Lagwise.DataRoots...)
	if len(roots) == 0 {
		return s.options.Engine
	}
	o := s.options.Engine.Options()
	o.DataRoots = append(slices.Clone(o.DataRoots), roots...)
	return engine.New(o)
}
