package solver

// spread walks a network breadth first through some of its branches, so that paths have the fewest steps. Branches are
// taken in the order in which they were given: the same network always gives the same paths.
type spread[T Scalar] struct {
	network *Network[T]
	start   []int // the branches at a node are at[start[node]:start[node+1]]
	at      []int

	reached []int  // nodes in the order in which the walk came to them
	step    []Step // the step by which the walk came to a node; Branch −1 at its root
	depth   []int
	seen    []int
	stamp   int
	without []bool // branches that are not taken; nil for none
}

func newSpread[T Scalar](n *Network[T], branches []int) *spread[T] {
	nodes := n.Nodes
	block := make([]int, 5*nodes+1+2*len(branches))
	part := func(length int) []int {
		taken := block[:length:length]
		block = block[length:]
		return taken
	}
	s := &spread[T]{
		network: n, start: part(nodes + 1), at: part(2 * len(branches)),
		step: make([]Step, nodes), depth: part(nodes), seen: part(nodes), reached: part(nodes)[:0],
	}
	for _, b := range branches {
		s.start[n.Branches[b].From+1]++
		s.start[n.Branches[b].To+1]++
	}
	for node := range n.Nodes {
		s.start[node+1] += s.start[node]
	}
	next := part(nodes)
	copy(next, s.start)
	for _, b := range branches {
		for _, node := range [2]int{n.Branches[b].From, n.Branches[b].To} {
			s.at[next[node]] = b
			next[node]++
		}
	}
	return s
}

// fork is a walk through the same branches with memory of its own.
func (s *spread[T]) fork() *spread[T] {
	fork := *s
	nodes := s.network.Nodes
	fork.step, fork.depth, fork.seen = make([]Step, nodes), make([]int, nodes), make([]int, nodes)
	fork.reached, fork.stamp, fork.without = nil, 0, nil
	return &fork
}

// touches reports whether any of the branches ends at the node.
func (s *spread[T]) touches(node int) bool { return s.start[node] < s.start[node+1] }

// has reports whether the last walk came to the node.
func (s *spread[T]) has(node int) bool { return s.seen[node] == s.stamp }

// from walks from a root to every node that can be reached.
func (s *spread[T]) from(root int) {
	s.stamp++
	s.reached = append(s.reached[:0], root)
	s.seen[root], s.depth[root], s.step[root] = s.stamp, 0, Step{Branch: -1}
	s.drain(0)
}

// more starts another walk, which keeps what the earlier ones have reached, from a node that none has reached.
func (s *spread[T]) more(root int) {
	first := len(s.reached)
	s.reached = append(s.reached, root)
	s.seen[root], s.depth[root], s.step[root] = s.stamp, 0, Step{Branch: -1}
	s.drain(first)
}

func (s *spread[T]) drain(first int) {
	for k := first; k < len(s.reached); k++ {
		node := s.reached[k]
		for _, b := range s.at[s.start[node]:s.start[node+1]] {
			next, sense := s.network.Branches[b].To, 1
			if next == node {
				next, sense = s.network.Branches[b].From, -1
			}
			if s.seen[next] == s.stamp || (s.without != nil && s.without[b]) {
				continue
			}
			s.seen[next], s.depth[next], s.step[next] = s.stamp, s.depth[node]+1, Step{b, sense}
			s.reached = append(s.reached, next)
		}
	}
}

// pathTo gives the steps of the last walk from its root to the node.
func (s *spread[T]) pathTo(node int) []Step {
	path := make([]Step, s.depth[node])
	for k := len(path) - 1; k >= 0; k-- {
		path[k] = s.step[node]
		node, _ = s.network.ends(path[k])
	}
	return path
}

// fewest walks from a root so that the path to each node holds as few of the costly branches as possible.
func (s *spread[T]) fewest(root int, costly func(branch int) bool) {
	s.stamp++
	s.reached = s.reached[:0]
	type arrival struct {
		node, depth int
		step        Step
	}
	layer := []arrival{{node: root, step: Step{Branch: -1}}}
	for len(layer) > 0 {
		var later []arrival
		for len(layer) > 0 {
			now := layer[0]
			layer = layer[1:]
			if s.has(now.node) {
				continue
			}
			s.seen[now.node], s.depth[now.node], s.step[now.node] = s.stamp, now.depth, now.step
			s.reached = append(s.reached, now.node)
			for _, b := range s.at[s.start[now.node]:s.start[now.node+1]] {
				next := arrival{s.network.Branches[b].To, now.depth + 1, Step{b, 1}}
				if next.node == now.node {
					next.node, next.step.Sense = s.network.Branches[b].From, -1
				}
				if costly(b) {
					later = append(later, next)
				} else {
					layer = append(layer, next)
				}
			}
		}
		layer = later
	}
}
