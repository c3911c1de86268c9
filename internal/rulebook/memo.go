package rulebook

import "sync"

// A Memo keeps what others work out from something that never changes, so that it is worked out once. The zero Memo is ready.
type Memo struct {
	mu   sync.Mutex
	kept map[any]func() any
}

// Keep gives what is kept under a key, or makes it. Makers of the same key run once.
func (m *Memo) Keep(key any, build func() any) any {
	m.mu.Lock()
	if m.kept == nil {
		m.kept = map[any]func() any{}
	}
	once, ok := m.kept[key]
	if !ok {
		once = sync.OnceValue(build)
		m.kept[key] = once
	}
	m.mu.Unlock()
	return once()
}
