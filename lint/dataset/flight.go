package dataset

import "context"

// flight is one reading that several may wait for. It is cancelled when the
// last of them leaves.
type flight struct {
	key     recordKey
	done    chan struct{} // closed when parsed and err are there
	parsed  *parsed
	err     error
	waiting int // guarded by the store's lock
	cancel  context.CancelFunc
}

// run reads and remembers. What failed, was cancelled or panicked is not
// remembered.
func (f *flight) run(ctx context.Context, s *Store, read func(context.Context) (*parsed, error)) {
	defer func() {
		if r := recover(); r != nil {
			f.parsed, f.err = nil, unreadable("reading broke down: %v", r)
		}
		s.mu.Lock()
		if s.flying[f.key] == f {
			delete(s.flying, f.key)
		}
		if f.err == nil {
			s.remember(f.key, f.parsed)
		}
		s.mu.Unlock()
		f.cancel()
		close(f.done)
	}()
	f.parsed, f.err = read(ctx)
}

// wait returns the outcome, or leaves when ctx ends first.
func (f *flight) wait(ctx context.Context, s *Store) (*Record, error) {
	select {
	case <-f.done:
		if f.err != nil {
			return nil, f.err
		}
		return f.parsed.record, nil
	case <-ctx.Done():
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	if f.waiting--; f.waiting == 0 {
		f.cancel()
		if s.flying[f.key] == f {
			delete(s.flying, f.key) // whoever comes next starts afresh
		}
	}
	return nil, ctx.Err()
}
