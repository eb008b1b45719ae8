package engine

import "sync"

// memo makes a value once for each key, however many ask at a time.
type memo[V any] struct {
	mu   sync.Mutex // guards made
	made map[string]func() V
}

func (m *memo[V]) get(key string, build func() V) V {
	m.mu.Lock()
	if m.made == nil {
		m.made = map[string]func() V{}
	}
	once, ok := m.made[key]
	if !ok {
		once = sync.OnceValue(build)
		m.made[key] = once
	}
	m.mu.Unlock()
	return once()
}

// without fills an empty memo with everything of m but the keys to drop.
func (m *memo[V]) without(into *memo[V], drop map[string]bool) {
	m.mu.Lock()
	defer m.mu.Unlock()
	into.made = make(map[string]func() V, len(m.made))
	for key, once := range m.made {
		if !drop[key] {
			into.made[key] = once
		}
	}
}
