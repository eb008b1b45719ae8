package evidence

import (
	"container/list"
	"context"
	"crypto/sha256"
	"encoding/binary"
	"fmt"
	"math"
	"runtime/debug"
	"sync"
)

// key is the digest of everything that bears on a remembered value.
type key [sha256.Size]byte

// keyOf digests the parts in their order. Each part is written with its
// length, so that no two lists of parts run together.
func keyOf(parts ...any) key {
	h := sha256.New()
	var word [8]byte
	put := func(b []byte) {
		binary.LittleEndian.PutUint64(word[:], uint64(len(b)))
		h.Write(word[:])
		h.Write(b)
	}
	for _, p := range parts {
		switch v := p.(type) {
		case string:
			put([]byte(v))
		case key:
			put(v[:])
		case [32]byte:
			put(v[:])
		case []float64:
			put(wordBytes(v, math.Float64bits))
		case []int:
			put(wordBytes(v, func(i int) uint64 { return uint64(i) }))
		case int:
			binary.LittleEndian.PutUint64(word[:], uint64(v))
			h.Write(word[:])
		case float64:
			binary.LittleEndian.PutUint64(word[:], math.Float64bits(v))
			h.Write(word[:])
		default:
			put(fmt.Appendf(nil, "%#v", v))
		}
	}
	return key(h.Sum(nil))
}

func wordBytes[T any](x []T, bits func(T) uint64) []byte {
	b := make([]byte, 8*len(x))
	for i, v := range x {
		binary.LittleEndian.PutUint64(b[8*i:], bits(v))
	}
	return b
}

// memory remembers values by key: one computation per key, however many wait;
// cancelled when the last waiter leaves; least recently used goes first when
// the bytes exceed the limit. A cancelled or panicking computation is never
// remembered.
type memory struct {
	mu      sync.Mutex // guards everything below
	entries map[key]*entry
	recent  *list.List // of *entry, most recent first
	bytes   int64
	limit   int64
}

type entry struct {
	key     key
	done    chan struct{}
	value   any
	err     error
	cost    int64
	waiters int
	cancel  context.CancelFunc
	place   *list.Element // nil while computing
}

func newMemory(limit int64) *memory {
	return &memory{entries: map[key]*entry{}, recent: list.New(), limit: limit}
}

// Broken is the error of a computation that panicked.
type Broken struct {
	Cause any
	Stack string
}

func (b *Broken) Error() string { return fmt.Sprintf("a computation broke down: %v", b.Cause) }

// remember returns the value of the key, computing it at most once at a time.
// An error that the data bring about is remembered like a value.
func remember[T any](ctx context.Context, m *memory, k key, compute func(context.Context) (T, int64, error)) (T, error) {
	var zero T
	if err := ctx.Err(); err != nil {
		return zero, err
	}
	m.mu.Lock()
	e, found := m.entries[k]
	if found && e.place != nil {
		m.recent.MoveToFront(e.place)
		m.mu.Unlock()
		return typed[T](e)
	}
	if !found {
		e = m.start(k, func(ctx context.Context) (any, int64, error) { return compute(ctx) })
	}
	e.waiters++
	m.mu.Unlock()
	select {
	case <-e.done:
		m.leave(e)
		return typed[T](e)
	case <-ctx.Done():
		m.leave(e)
		return zero, ctx.Err()
	}
}

func typed[T any](e *entry) (T, error) {
	v, _ := e.value.(T)
	return v, e.err
}

// start begins the computation of an entry; the caller holds the mutex.
func (m *memory) start(k key, compute func(context.Context) (any, int64, error)) *entry {
	ctx, cancel := context.WithCancel(context.Background())
	e := &entry{key: k, done: make(chan struct{}), cancel: cancel}
	m.entries[k] = e
	go func() {
		defer cancel()
		value, cost, err := guarded(ctx, compute)
		m.finish(ctx, e, value, cost, err)
	}()
	return e
}

func guarded(ctx context.Context, compute func(context.Context) (any, int64, error)) (value any, cost int64, err error) {
	defer func() {
		if cause := recover(); cause != nil {
			err = &Broken{Cause: cause, Stack: string(debug.Stack())}
		}
	}()
	return compute(ctx)
}

func (m *memory) finish(ctx context.Context, e *entry, value any, cost int64, err error) {
	m.mu.Lock()
	defer m.mu.Unlock()
	e.value, e.err = value, err
	if ctx.Err() != nil || passing(err) {
		if m.entries[e.key] == e {
			delete(m.entries, e.key)
		}
	} else {
		e.cost = cost + 256
		e.place = m.recent.PushFront(e)
		m.bytes += e.cost
		m.evict()
	}
	close(e.done)
}

// evict drops the least recently used values; the caller holds the mutex.
func (m *memory) evict() {
	for m.bytes > m.limit && m.recent.Len() > 1 {
		last := m.recent.Remove(m.recent.Back()).(*entry)
		delete(m.entries, last.key)
		m.bytes -= last.cost
	}
}

// leave counts a waiter off; the last one cancels a computation that still
// runs, and makes room for a fresh start of it.
func (m *memory) leave(e *entry) {
	m.mu.Lock()
	defer m.mu.Unlock()
	e.waiters--
	if e.waiters > 0 {
		return
	}
	select {
	case <-e.done:
	default:
		e.cancel()
		if m.entries[e.key] == e {
			delete(m.entries, e.key)
		}
	}
}
