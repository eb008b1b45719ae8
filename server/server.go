// Package server is the language server: it knows the protocol and no
// statistics.
//
// # Design
//
// A session has three layers. The transport (transport.go, frames.go) turns
// bytes into calls and keeps the promises of the wire: notifications are
// handled in order, on the read loop; a request takes its edition of the
// workspace before the next message is read and then runs beside it; nothing
// a client sends ends the session except what makes the stream unreadable;
// end of input ends everything. The session (session.go, sync.go, folders.go)
// holds what the client has open and hands texts to the engine. The features
// (findings.go, hover.go, actions.go, …) are one file each and have one
// shape: find the edition, ask the engine, convert.
//
// The read loop applies edits and nothing else. Everything that may take
// time or write to the client without being asked runs elsewhere: findings
// are published by one goroutine (publish.go), so that they go out in order
// and a client that does not read stalls only that goroutine.
//
// Inside, places are byte offsets; lines and characters in the encoding that
// the client chose exist only at this edge (places.go).
//
// What it does not do: it never listens on a port, runs no program, writes no
// file (rewrites are edits that the editor applies), and never both pushes
// findings and answers pulls for them.
package server

import (
	"context"
	"io"
	"log"

	"go.lsp.dev/protocol"

	"lagwise/lint/engine"
)

// Options is what a session needs to know from outside.
type Options struct {
	Engine    *engine.Engine
	Version   string
	Log       io.Writer // what went wrong; nil: nowhere
	ParentPID int       // the session ends when this process does; 0: none
}

// Serve answers one client until it exits, its input ends, its process ends
// or ctx is cancelled. It returns the exit status that the protocol asks for:
// 0 after an orderly shutdown, else 1. It closes neither in nor out; a read
// of in may still wait when it returns.
func Serve(ctx context.Context, in io.Reader, out io.Writer, o Options) (exitCode int) {
	return serve(ctx, in, out, o, realClock)
}

func serve(ctx context.Context, in io.Reader, out io.Writer, o Options, c clock) int {
	if o.Log == nil {
		o.Log = io.Discard
	}
	logger := log.New(o.Log, "lagwise: ", log.LstdFlags|log.Lmsgprefix)
	return converse(ctx, in, out, logger, func(base context.Context, stop context.CancelFunc, client protocol.Client) endpoint {
		return newSession(base, stop, client, o, logger, c)
	})
}
