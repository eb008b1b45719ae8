package dataset

import (
	"crypto/sha256"
	"encoding/binary"
	"hash"
	"math"
	"sync"
)

// onceDigest is a digest that is made when it is first asked for.
type onceDigest struct {
	once sync.Once
	sum  [32]byte
}

func (o *onceDigest) get(write func(h hash.Hash)) [32]byte {
	o.once.Do(func() {
		h := sha256.New()
		write(h)
		h.Sum(o.sum[:0])
	})
	return o.sum
}

// hashFloats writes values as their bits, all kinds of NaN alike.
func hashFloats(h hash.Hash, values []float64) {
	var buf [4096]byte
	n := 0
	for _, v := range values {
		bits := math.Float64bits(v)
		if v != v {
			bits = 0x7FF8000000000001
		}
		binary.LittleEndian.PutUint64(buf[n:], bits)
		if n += 8; n == len(buf) {
			h.Write(buf[:])
			n = 0
		}
	}
	h.Write(buf[:n])
}

func hashInts[T int | int32](h hash.Hash, values []T) {
	var buf [8]byte
	for _, v := range values {
		binary.LittleEndian.PutUint64(buf[:], uint64(int64(v)))
		h.Write(buf[:])
	}
}

// Digest is over what the axis says: unit, positions and groups.
func (a *Axis) Digest() [32]byte {
	return a.digest.get(func(h hash.Hash) {
		h.Write([]byte{byte(a.Unit)})
		hashFloats(h, a.Positions)
		for _, l := range a.labels {
			h.Write([]byte(l))
			h.Write([]byte{0})
		}
		hashInts(h, a.groups)
	})
}

func (c *Column) valueDigest() [32]byte {
	return c.digest.get(func(h hash.Hash) { hashFloats(h, c.Values) })
}

// Digest is over the axis and all numeric columns: the parsed data, not the
// bytes of the file.
func (r *Record) Digest() [32]byte {
	h := sha256.New()
	axis := r.Axis.Digest()
	h.Write(axis[:])
	for _, c := range r.Columns {
		if c.Numeric {
			sum := c.valueDigest()
			h.Write([]byte(c.Name))
			h.Write(sum[:])
		}
	}
	return [32]byte(h.Sum(nil))
}
