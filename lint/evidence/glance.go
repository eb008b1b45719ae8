package evidence

import (
	"context"
	"sync"

	"lagwise/lint/dataset"
	"lagwise/lint/request"
)

// Glance is one look at the data: within it a file is read, or found
// unchanged, once, however many requests use it, and all of them see the same
// state of it. A judgement makes one and drops it at its end.
type Glance struct {
	mu      sync.Mutex // guards the maps
	records map[*request.Record]*once[*dataset.Record]
	series  map[*request.Series]*once[*dataset.Series]
}

// once is a value that is made by whoever asks first.
type once[T any] struct {
	sync.Once
	value T
	err   error
}

// NewGlance returns a glance that has seen nothing.
func NewGlance() *Glance {
	return &Glance{records: map[*request.Record]*once[*dataset.Record]{}, series: map[*request.Series]*once[*dataset.Series]{}}
}

// slot returns what a map holds under a key, made empty when it holds nothing.
func slot[K comparable, T any](g *Glance, of map[K]*once[T], k K) *once[T] {
	g.mu.Lock()
	defer g.mu.Unlock()
	if of[k] == nil {
		of[k] = &once[T]{}
	}
	return of[k]
}

// glimpsed returns a series with its values as the glance has them.
func (s *Store) glimpsed(ctx context.Context, b Bound, one BoundSeries) (*dataset.Series, error) {
	g := b.Glance
	if g == nil {
		g = NewGlance()
	}
	record := slot(g, g.records, one.Record)
	record.Do(func() { record.value, record.err = s.data.Record(ctx, b.Roots, one.Folder, one.Record) })
	if record.err != nil {
		return nil, record.err
	}
	got := slot(g, g.series, one.Series)
	got.Do(func() {
		series, trouble := record.value.Series(one.Series, one.Record)
		if got.value = series; trouble != nil {
			got.err = trouble
		}
	})
	return got.value, got.err
}
