package server

import (
	"context"
	"io"
	"net"
	"path/filepath"
	"runtime"
	"strings"
	"testing"
)

// answering accepts one connection and says hello.
func answering(t *testing.T, network, address string) net.Addr {
	t.Helper()
	l, err := net.Listen(network, address)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { l.Close() })
	go func() {
		conn, err := l.Accept()
		if err != nil {
			return
		}
		io.WriteString(conn, "hello")
		conn.Close()
	}()
	return l.Addr()
}

func TestTheServerConnectsToAClientThatWaits(t *testing.T) {
	ctx := context.Background()
	port := answering(t, "tcp", "127.0.0.1:0").(*net.TCPAddr).Port
	dials := map[string]func() (io.ReadWriteCloser, error){
		"port": func() (io.ReadWriteCloser, error) { return ConnectPort(ctx, port) },
	}
	if runtime.GOOS != "windows" { // where a pipe is no socket
		name := filepath.Join(t.TempDir(), "p")
		answering(t, "unix", name)
		dials["pipe"] = func() (io.ReadWriteCloser, error) { return ConnectPipe(ctx, name) }
	}
	for name, dial := range dials {
		conn, err := dial()
		if err != nil {
			t.Fatalf("%s: %v", name, err)
		}
		if said, err := io.ReadAll(conn); err != nil || string(said) != "hello" {
			t.Errorf("%s: heard %q, %v", name, said, err)
		}
		conn.Close()
	}
}

func TestNobodyWaits(t *testing.T) {
	ctx := context.Background()
	for _, port := range []int{-1, 0, 65536} {
		if _, err := ConnectPort(ctx, port); err == nil || !strings.Contains(err.Error(), "1 to 65535") {
			t.Errorf("port %d: %v", port, err)
		}
	}
	if _, err := ConnectPipe(ctx, filepath.Join(t.TempDir(), "none")); err == nil || !strings.Contains(err.Error(), "no client waits") {
		t.Errorf("a pipe that is not there: %v", err)
	}
}
