package engine

import (
	"crypto/sha256"
	"encoding/binary"
	"sync"
)

// key is a digest of all that a remembered value depends on.
type key [sha256.Size]byte

// digest is over the parts in their order, each with its length.
func digest(parts ...string) key {
	h := sha256.New()
	for _, p := range parts {
		var length [8]byte
		binary.LittleEndian.PutUint64(length[:], uint64(len(p)))
		h.Write(length[:])
		h.Write([]byte(p))
	}
	return key(h.Sum(nil))
}

// remembered keeps small values for instant answers. It forgets all of them
// when there are too many: they are made again by the next judgement.
type remembered[V any] struct {
	mu   sync.Mutex // guards kept
	kept map[key]V
}

const mostRemembered = 10_000

func (r *remembered[V]) get(k key) (V, bool) {
	r.mu.Lock()
	defer r.mu.Unlock()
	v, ok := r.kept[k]
	return v, ok
}

func (r *remembered[V]) put(k key, v V) {
	r.mu.Lock()
	defer r.mu.Unlock()
	if r.kept == nil || len(r.kept) >= mostRemembered {
		r.kept = map[key]V{}
	}
	r.kept[k] = v
}
