package evidence

import (
	"path/filepath"

	"lagwise/lint/dataset"
	"lagwise/lint/request"
)

// Store remembers what was computed, for as long as the engine lives.
type Store struct {
	data    *dataset.Store
	derived *memory
}

// NewStore returns a store that keeps derived evidence in at most memory
// bytes and reads records through data.
func NewStore(data *dataset.Store, memory int64) *Store {
	return &Store{data: data, derived: newMemory(memory)}
}

// Bound is a request whose series were found in manifests.
type Bound struct {
	Asked    *request.Asked
	Series   []BoundSeries // in the order of Asked.Series()
	Roots    *dataset.Roots
	Settings Settings
	Glance   *Glance // nil: every case looks at the data for itself
}

// BoundSeries is one series of a request and where it was found.
type BoundSeries struct {
	Name     string // as the request writes it
	Manifest *request.Manifest
	// Folder of the manifest, absolute.
	Folder string
	Record *request.Record
	Series *request.Series
}

// manifestFolder returns the absolute folder of a manifest below a root.
func manifestFolder(root string, m *request.Manifest) string {
	return filepath.Dir(filepath.Join(root, filepath.FromSlash(m.File)))
}
