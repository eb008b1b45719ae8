package main

import (
	"context"
	"io"

	"lagwise/server"
)

// attend serves the protocol. It takes the options that the protocol's
// recommendations name.
func attend(ctx context.Context, s streams, args []string) (int, error) {
	o := &options{}
	f := newFlags("attend", s, o, "text")
	_ = f.Bool("stdio", true, "speak on standard input and output")
	port := f.Int("port", 0, "connect to this port of this machine")
	socket := f.Int("socket", 0, "the same as --port")
	pipe := f.String("pipe", "", "connect to this pipe")
	parent := f.Int("clientProcessId", 0, "end when this process ends")
	if err := f.parse(args, o); err != nil {
		return exitFailed, err
	}
	if len(o.paths) > 0 {
		return exitFailed, &usageError{"attend takes no paths: the editor names the folders"}
	}
	e, err := o.engine()
	if err != nil {
		return exitFailed, err
	}
	in, out, err := channel(ctx, s, max(*port, *socket), *pipe)
	if err != nil {
		return exitFailed, err
	}
	return server.Serve(ctx, in, out, server.Options{Engine: e, Version: version, Log: s.err, ParentPID: *parent}), nil
}

// channel is where the client speaks.
func channel(ctx context.Context, s streams, port int, pipe string) (io.Reader, io.Writer, error) {
	switch {
	case pipe != "":
		c, err := server.ConnectPipe(ctx, pipe)
		return c, c, err
	case port != 0:
		c, err := server.ConnectPort(ctx, port)
		return c, c, err
	}
	return s.in, s.out, nil
}
