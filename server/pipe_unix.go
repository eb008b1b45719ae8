//go:build !windows

package server

import (
	"context"
	"io"
	"net"
)

func openPipe(ctx context.Context, name string) (io.ReadWriteCloser, error) {
	var d net.Dialer
	return d.DialContext(ctx, "unix", name)
}
