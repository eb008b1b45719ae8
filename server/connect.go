package server

import (
	"context"
	"fmt"
	"io"
	"net"
	"strconv"
)

// ConnectPort connects to the port of this machine on which a client waits.
func ConnectPort(ctx context.Context, port int) (io.ReadWriteCloser, error) {
	if port < 1 || port > 65535 {
		return nil, fmt.Errorf("%d is not a port: a port is a number from 1 to 65535", port)
	}
	var d net.Dialer
	conn, err := d.DialContext(ctx, "tcp", net.JoinHostPort("127.0.0.1", strconv.Itoa(port)))
	if err != nil {
		return nil, fmt.Errorf("no client waits on port %d of this machine: %w", port, err)
	}
	return conn, nil
}

// ConnectPipe connects to the pipe on which a client waits: a socket file, or
// on Windows a named pipe.
func ConnectPipe(ctx context.Context, name string) (io.ReadWriteCloser, error) {
	conn, err := openPipe(ctx, name)
	if err != nil {
		return nil, fmt.Errorf("no client waits on the pipe %s: %w", name, err)
	}
	return conn, nil
}
