package server

import (
	"slices"
	"testing"

	"go.lsp.dev/protocol"

	"lagwise/lint/engine"
)

// Clients have named their folders in three fields, of which the newest that
// is there counts (specification, initialize).
func TestFoldersOfEveryKindOfClient(t *testing.T) {
	for params, want := range map[string][]string{
		`{"rootUri":null,"workspaceFolders":[{"uri":"file:///a","name":"a"},{"uri":"untitled:b","name":"b"}]}`: {"/a"},
		`{"rootUri":"file:///old","workspaceFolders":[{"uri":"file:///a%20b","name":"a"}]}`:                    {"/a b"},
		`{"rootUri":"file:///old","workspaceFolders":null,"rootPath":"/older"}`:                                {"/old"},
		`{"rootUri":null,"rootPath":"/older"}`:                                                                 {"/older"},
		`{"rootUri":null,"rootPath":null}`:                                                                     nil,
		`{}`:                                                                                                   nil,
	} {
		var p protocol.InitializeParams
		if err := protocol.Unmarshal([]byte(params), &p); err != nil {
			t.Fatal(err)
		}
		if got := foldersOf(&p); !slices.Equal(got, want) {
			t.Errorf("%s: %q, want %q", params, got, want)
		}
	}
}

func TestFoldersChange(t *testing.T) {
	c, made := servingSession(t, realClock)
	c.call("initialize", object{"processId": nil, "rootUri": nil, "capabilities": object{},
		"workspaceFolders": []object{{"uri": "file:///a", "name": "a"}, {"uri": "file:///b", "name": "b"}}}, nil)
	s := made()
	c.notify("workspace/didChangeWorkspaceFolders", object{"event": object{
		"added": []object{{"uri": "file:///c", "name": "c"}, {"uri": "file:///b", "name": "b"}}, "removed": []object{{"uri": "file:///a", "name": "a"}}}})
	c.call("textDocument/hover", object{"textDocument": textDocument("/x"), "position": position(0, 0)}, nil)
	if got := s.folders.list(); !slices.Equal(got, []string{"/b", "/c"}) {
		t.Errorf("folders %q, want /b and /c", got)
	}
}

// Folders outside the root are a user's choice: they come with the options
// that the client starts the server with, on top of those of the command line.
func TestDataRoots(t *testing.T) {
	s := &session{options: Options{Engine: engine.New(engine.Options{DataRoots: []string{"/flag"}})}, logger: (&lockedBuffer{}).logger()}
	for options, want := range map[string][]string{
		``:                                   {"/flag"},
		`null`:                               {"/flag"},
		`{"dataRoots":["/srv"]}`:             {"/flag", "/srv"},
		`{"lagwise":{"dataRoots":["/srv"]}}`: {"/flag", "/srv"},
		`{"dataRoots":7}`:                    {"/flag"},
		`[]`:                                 {"/flag"},
	} {
		if got := s.configured(protocol.LSPAny(options)).Options().DataRoots; !slices.Equal(got, want) {
			t.Errorf("%s: %q, want %q", options, got, want)
		}
	}
}
