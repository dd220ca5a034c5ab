// Package recent holds a map of bounded weight that forgets first what has not been used for the longest time.
package recent

import (
	"container/list"
	"sync"
)

// Map remembers values up to a total weight. It may be used from several goroutines at once; each call costs O(1), and
// one more for every entry that it forgets. Make one with New.
type Map[K comparable, V any] struct {
	mutex   sync.Mutex
	limit   int
	weight  int
	order   list.List // of *entry[K, V], the newest use first
	entries map[K]*list.Element
}

type entry[K comparable, V any] struct {
	key    K
	value  V
	weight int
}

// New makes an empty map whose entries together weigh at most limit.
func New[K comparable, V any](limit int) *Map[K, V] {
	return &Map[K, V]{limit: limit, entries: make(map[K]*list.Element)}
}

// Get gives what was put under the key, unless it has been forgotten.
func (m *Map[K, V]) Get(key K) (V, bool) {
	m.mutex.Lock()
	defer m.mutex.Unlock()
	element, ok := m.entries[key]
	if !ok {
		var none V
		return none, false
	}
	m.order.MoveToFront(element)
	return element.Value.(*entry[K, V]).value, true
}

// Put remembers a value in the place of what the key held before. The weight is counted against the limit of the map; a
// value that is heavier than the limit is not remembered at all.
func (m *Map[K, V]) Put(key K, value V, weight int) {
	m.mutex.Lock()
	defer m.mutex.Unlock()
	m.remove(m.entries[key])
	m.entries[key] = m.order.PushFront(&entry[K, V]{key, value, weight})
	m.weight += weight
	for m.weight > m.limit {
		m.remove(m.order.Back())
	}
}

// Forget removes what the key holds.
func (m *Map[K, V]) Forget(key K) {
	m.mutex.Lock()
	defer m.mutex.Unlock()
	m.remove(m.entries[key])
}

func (m *Map[K, V]) remove(element *list.Element) {
	if element == nil {
		return
	}
	gone := m.order.Remove(element).(*entry[K, V])
	delete(m.entries, gone.key)
	m.weight -= gone.weight
}
