package server

import (
	"bytes"
	"context"
	"errors"
	"io"
	"log"
	"strconv"
)

// Limits of one message, checked before anything is allocated for it.
const (
	maxHeaderLine = 4 << 10
	maxBody       = 64 << 20
)

var (
	errHeaderLine = errors.New("a header line over 4 kB")
	errBody       = errors.New("a message over 64 MB")
)

// frameReader passes a stream of framed messages through and ends it at the
// first header line or body that is over its limit. What else is wrong with a
// frame is left to the library, which ends the session too.
type frameReader struct {
	in   io.Reader
	line []byte // the header line read so far
	body int    // bytes of the body still to come; the declared length while in a header
	read bool   // whether the body is being read
	err  error
}

func newFrameReader(in io.Reader) *frameReader { return &frameReader{in: in} }

func (r *frameReader) Read(b []byte) (int, error) {
	if r.err != nil {
		return 0, r.err
	}
	n, err := r.in.Read(b)
	passed, bad := r.scan(b[:n])
	if bad != nil {
		r.err = bad
		return passed, bad
	}
	return n, err
}

// scan follows the frames through b and returns how much of it may pass.
func (r *frameReader) scan(b []byte) (int, error) {
	for at := 0; at < len(b); {
		if r.read {
			n := min(r.body, len(b)-at)
			at += n
			r.body -= n
			r.read = r.body > 0
			continue
		}
		end := bytes.IndexByte(b[at:], '\n')
		piece := b[at:]
		if end >= 0 {
			piece = b[at : at+end+1]
		}
		if len(r.line)+len(piece) > maxHeaderLine {
			return at, errHeaderLine
		}
		r.line = append(r.line, piece...)
		if end < 0 {
			return len(b), nil
		}
		if err := r.header(); err != nil {
			return at, err
		}
		at += len(piece)
	}
	return len(b), nil
}

// header takes in one whole header line.
func (r *frameReader) header() error {
	line := bytes.TrimRight(r.line, "\r\n")
	r.line = r.line[:0]
	if len(line) == 0 {
		r.read = r.body > 0
		return nil
	}
	name, value, _ := bytes.Cut(line, []byte(":"))
	if !bytes.EqualFold(name, []byte("content-length")) {
		return nil
	}
	n, err := strconv.ParseUint(string(bytes.Trim(value, " \t")), 10, 64)
	if n > maxBody { // also what ParseUint returns for a number out of range
		return errBody
	}
	if err == nil {
		r.body = int(n)
	}
	return nil
}

// endReader cancels the session when its input ends: the library does not,
// and a handler that waits would hold the process.
type endReader struct {
	in     io.Reader
	stop   context.CancelFunc
	logger *log.Logger
}

func (r *endReader) Read(b []byte) (int, error) {
	n, err := r.in.Read(b)
	if err != nil {
		if !errors.Is(err, io.EOF) {
			r.logger.Printf("input: %v", err)
		}
		r.stop()
	}
	return n, err
}
