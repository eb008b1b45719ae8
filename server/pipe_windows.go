package server

import (
	"context"
	"io"
	"os"
)

func openPipe(_ context.Context, name string) (io.ReadWriteCloser, error) {
	return os.OpenFile(name, os.O_RDWR, 0)
}
