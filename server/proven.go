package server

import (
	"bytes"
	"context"
	"encoding/json"

	"go.lsp.dev/jsonrpc2"
	"go.lsp.dev/protocol"

	"lagwise/lint/present"
)

// methodFindings is a request of our own: the findings of a document once
// every rule has spoken and every candidate is proven, in the form that
// `lagwise review --as json` gives them. Its parameters are
// {"textDocument": {"uri": …}}, its result is an array.
const methodFindings = "lagwise/findings"

// Request answers the requests that the protocol does not know.
func (s *session) Request(ctx context.Context, method string, params any) (any, error) {
	if method != methodFindings {
		return nil, jsonrpc2.ErrMethodNotFound
	}
	var p struct {
		TextDocument protocol.TextDocumentIdentifier `json:"textDocument"`
	}
	raw, _ := params.(protocol.LSPAny)
	if err := protocol.Unmarshal(raw, &p); err != nil {
		return nil, jsonrpc2.NewError(jsonrpc2.InvalidParams, err.Error())
	}
	path, ok := s.followed(p.TextDocument.URI)
	if !ok {
		return []any{}, nil
	}
	j, err := edition(ctx).Prove(ctx, path)
	if err != nil {
		return nil, err
	}
	var indented, compact bytes.Buffer
	if err := present.FindingsJSON(&indented, j.Findings); err != nil {
		return nil, err
	}
	if err := json.Compact(&compact, indented.Bytes()); err != nil {
		return nil, err
	}
	return jsonrpc2.RawMessage(compact.Bytes()), nil
}
