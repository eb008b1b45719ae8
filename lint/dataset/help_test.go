package dataset

import (
	"context"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"lagwise/lint/request"
)

func tryRead(rec *request.Record, text string) (*Record, *Trouble) {
	if rec.File == "" {
		rec.File = "shore.csv"
	}
	return readRecord(context.Background(), strings.NewReader(text), int64(len(text)), rec, DefaultLimits())
}

func mustRead(t *testing.T, rec *request.Record, text string) *Record {
	t.Helper()
	r, trouble := tryRead(rec, text)
	if trouble != nil {
		t.Fatalf("%s", trouble.Message)
	}
	return r
}

// plain reads a text with one header line and nothing declared.
func plainRead(t *testing.T, text string) *Record {
	t.Helper()
	return mustRead(t, &request.Record{HeaderRows: 1}, text)
}

func along(column string, kind request.AxisKind, set ...func(*request.Along)) *request.Record {
	a := &request.Along{Column: column, Kind: kind}
	for _, s := range set {
		s(a)
	}
	return &request.Record{HeaderRows: 1, Along: a}
}

func column(t *testing.T, r *Record, name string) *Column {
	t.Helper()
	c, trouble := r.Column(name)
	if trouble != nil {
		t.Fatalf("%s", trouble.Message)
	}
	return c
}

func one(t *testing.T, r *Record, name string) *Series {
	t.Helper()
	s, trouble := r.Series(&request.Series{Name: name}, &request.Record{})
	if trouble != nil {
		t.Fatalf("%s", trouble.Message)
	}
	return s
}

func correlation(names ...string) *request.Request {
	return &request.Request{Kind: request.Correlation, Between: names, LeastShare: 0.8, Groups: "within"}
}

func align(t *testing.T, req *request.Request, all ...*Series) *Frame {
	t.Helper()
	f, err := Align(context.Background(), all, req)
	if err != nil {
		t.Fatal(err)
	}
	return f
}

// equal compares numbers bit by bit, NaN equal to NaN.
func equal(a, b []float64) bool {
	if len(a) != len(b) {
		return false
	}
	for i := range a {
		if a[i] != b[i] && !(math.IsNaN(a[i]) && math.IsNaN(b[i])) {
			return false
		}
	}
	return true
}

func near(a, b []float64, tolerance float64) bool {
	if len(a) != len(b) {
		return false
	}
	for i := range a {
		if !(math.Abs(a[i]-b[i]) <= tolerance) {
			return false
		}
	}
	return true
}

func write(t *testing.T, path, text string) string {
	t.Helper()
	if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	return path
}

func wantMessage(t *testing.T, err error, parts ...string) {
	t.Helper()
	if err == nil {
		t.Fatalf("no error; want one with %q", parts)
	}
	for _, p := range parts {
		if !strings.Contains(err.Error(), p) {
			t.Errorf("message %q lacks %q", err, p)
		}
	}
}
