package dataset

import (
	"container/list"
	"context"
	"crypto/sha256"
	"fmt"
	"io"
	"sync"
	"time"

	"lagwise/lint/request"
)

// Store remembers parsed records by the identity of their file and how they
// are read. However many ask for one at a time, it is parsed once; an
// unchanged file costs a stat. It is safe for concurrent use.
type Store struct {
	limits Limits
	mu     sync.Mutex // guards all below
	known  map[recordKey]*list.Element
	recent *list.List // of *kept, most recently used first
	bytes  int64
	flying map[recordKey]*flight
	now    func() time.Time
}

// recordKey tells one reading of one state of a file.
type recordKey struct {
	identity Identity
	options  [32]byte
}

// parsed is a record as it was read.
type parsed struct {
	record      *Record
	settled     bool     // the identity of the file vouches for its bytes
	bytesDigest [32]byte // of the file, when it does not
}

type kept struct {
	parsed
	key   recordKey
	bytes int64
}

// NewStore returns an empty store.
func NewStore(limits Limits) *Store {
	return &Store{limits: limits, known: map[recordKey]*list.Element{}, recent: list.New(), flying: map[recordKey]*flight{}, now: time.Now}
}

// Record returns the record that a manifest in manifestDir names. The error
// is a *Trouble, or that of the context.
func (s *Store) Record(ctx context.Context, roots *Roots, manifestDir string, rec *request.Record) (*Record, error) {
	if err := ctx.Err(); err != nil {
		return nil, err
	}
	if trouble := refusedByName(rec.File); trouble != nil {
		return nil, trouble
	}
	identity, err := roots.stat(manifestDir, rec.File, s.limits.FileBytes)
	if err != nil {
		return nil, troubleOf(err)
	}
	key := recordKey{identity, readingOptions(rec)}
	if k := s.recall(key); k != nil {
		if k.settled || s.vouched(key, k, roots, manifestDir, rec.File) {
			return k.record, nil
		}
	}
	return s.join(ctx, key, func(ctx context.Context) (*parsed, error) {
		return s.read(ctx, roots, manifestDir, rec)
	}).wait(ctx, s)
}

// recall returns what is remembered under a key.
func (s *Store) recall(key recordKey) *kept {
	s.mu.Lock()
	defer s.mu.Unlock()
	at := s.known[key]
	if at == nil {
		return nil
	}
	s.recent.MoveToFront(at)
	k := *at.Value.(*kept)
	return &k
}

// vouched reports whether a file that was read too soon after its last change
// still has the same bytes.
func (s *Store) vouched(key recordKey, k *kept, roots *Roots, dir, file string) bool {
	settled := key.identity.settled(s.now())
	f, id, err := roots.open(dir, file, s.limits.FileBytes)
	if err != nil {
		return false
	}
	defer f.Close()
	h := sha256.New()
	if _, err := io.Copy(h, f); err != nil || id != key.identity || [32]byte(h.Sum(nil)) != k.bytesDigest {
		return false
	}
	if settled {
		s.mu.Lock()
		defer s.mu.Unlock()
		if at := s.known[key]; at != nil {
			at.Value.(*kept).settled = true
		}
	}
	return true
}

// join returns the flight that reads the key, started if there is none.
func (s *Store) join(ctx context.Context, key recordKey, read func(context.Context) (*parsed, error)) *flight {
	s.mu.Lock()
	defer s.mu.Unlock()
	f := s.flying[key]
	if f == nil {
		inner, cancel := context.WithCancel(context.WithoutCancel(ctx))
		f = &flight{key: key, done: make(chan struct{}), cancel: cancel}
		s.flying[key] = f
		go f.run(inner, s, read)
	}
	f.waiting++
	return f
}

// remember keeps a record and drops the least recently used beyond the bound.
// Called with the lock held.
func (s *Store) remember(key recordKey, p *parsed) {
	if at := s.known[key]; at != nil {
		s.forget(at)
	}
	bytes := p.record.bytes()
	if bytes > s.limits.StoredBytes {
		return
	}
	s.known[key] = s.recent.PushFront(&kept{*p, key, bytes})
	s.bytes += bytes
	for s.bytes > s.limits.StoredBytes {
		s.forget(s.recent.Back())
	}
}

func (s *Store) forget(at *list.Element) {
	k := s.recent.Remove(at).(*kept)
	delete(s.known, k.key)
	s.bytes -= k.bytes
}

func (r *Record) bytes() int64 {
	n := int64(4096)
	for _, c := range r.Columns {
		n += 8*int64(len(c.Values)) + 256
	}
	return n + 8*int64(len(r.Axis.Positions)) + 4*int64(len(r.Axis.groups)) + 16*int64(len(r.table.shifts))
}

// read opens and parses a file; when it changes meanwhile it is read again,
// twice.
func (s *Store) read(ctx context.Context, roots *Roots, dir string, rec *request.Record) (*parsed, error) {
	for range 3 {
		f, before, err := roots.open(dir, rec.File, s.limits.FileBytes)
		if err != nil {
			return nil, troubleOf(err)
		}
		p := &parsed{settled: before.settled(s.now())}
		var raw io.Reader = f
		h := sha256.New()
		if !p.settled {
			raw = io.TeeReader(f, h)
		}
		record, trouble := readRecord(ctx, raw, before.Size, rec, s.limits)
		info, err := f.Stat()
		f.Close()
		if ctx.Err() != nil {
			return nil, ctx.Err()
		}
		if err != nil || identityOf(before.Path, info) != before {
			continue
		}
		if trouble != nil {
			return nil, trouble
		}
		p.record, p.bytesDigest = record, [32]byte(h.Sum(nil))
		return p, nil
	}
	return nil, unreadable("%q kept changing while it was read; review again when it is complete", rec.File)
}

// troubleOf words a refusal as the trouble of a record.
func troubleOf(err error) error {
	if refused, ok := err.(*Refused); ok {
		return &Trouble{Kind: refused.Kind, Message: refused.Message}
	}
	return err
}

// readingOptions digests the fields of a record that bear on its reading.
func readingOptions(rec *request.Record) [32]byte {
	h := sha256.New()
	put := func(values ...any) {
		for _, v := range values {
			fmt.Fprintf(h, "%#v\x00", v)
		}
	}
	put(rec.File, rec.Delimiter, rec.Decimal, rec.Thousands, rec.Encoding, rec.Comment, rec.HeaderRows,
		rec.Missing, rec.MissingOnly, rec.Group, rec.At != nil)
	if a := rec.Along; a != nil {
		put(a.Column, a.Kind, a.Step, a.Unit, a.Format)
	}
	return [32]byte(h.Sum(nil))
}
