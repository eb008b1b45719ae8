package evidence

import (
	"sync"

	"lagwise/lint/dataset"
)

// rows is a frame with the digests of its columns, made once however often
// the columns are asked about. It is shared: never modify it.
type rows struct {
	*dataset.Frame

	mu   sync.Mutex // guards keys
	keys []*key
}

func rowsOf(f *dataset.Frame) *rows {
	if f == nil {
		return nil
	}
	return &rows{Frame: f, keys: make([]*key, len(f.Columns))}
}

// key digests the values of a column and where they stand.
func (r *rows) key(i int) key {
	r.mu.Lock()
	defer r.mu.Unlock()
	if r.keys[i] == nil {
		k := keyOf("column", r.Columns[i], r.Step, r.Runs, r.Season, r.Removed, r.order(i))
		r.keys[i] = &k
	}
	return *r.keys[i]
}

// order is the order of the autoregression that was taken off a column.
func (r *rows) order(i int) int {
	if r.Orders == nil {
		return 0
	}
	return r.Orders[i]
}

// column is a column as a profile is asked about it.
func (r *rows) column(i int) column {
	return column{values: r.Columns[i], at: r.Step, runs: r.Runs, season: r.Season, fitted: r.order(i), digest: r.key(i)}
}
