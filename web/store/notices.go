package store

import "sync"

// notices tells those who listen to a sheet that it has a new revision.
type notices struct {
	mutex     sync.Mutex
	listeners map[ID]map[chan int]bool
}

// Subscribe gives a channel on which each new revision of a sheet comes once it is durable. Whoever reads slowly gets
// only the newest. The second result ends the subscription and must be called.
func (s *Store) Subscribe(id ID) (<-chan int, func()) {
	n := &s.notices
	listener := make(chan int, 1)
	n.mutex.Lock()
	defer n.mutex.Unlock()
	if n.listeners == nil {
		n.listeners = make(map[ID]map[chan int]bool)
	}
	if n.listeners[id] == nil {
		n.listeners[id] = make(map[chan int]bool)
	}
	n.listeners[id][listener] = true
	return listener, func() {
		n.mutex.Lock()
		defer n.mutex.Unlock()
		delete(n.listeners[id], listener)
		if len(n.listeners[id]) == 0 {
			delete(n.listeners, id)
		}
	}
}

// tell puts a revision before all who listen; one that they have not read yet gives way to it.
func (n *notices) tell(id ID, revision int) {
	n.mutex.Lock()
	defer n.mutex.Unlock()
	for listener := range n.listeners[id] {
		select {
		case <-listener:
		default:
		}
		listener <- revision
	}
}
