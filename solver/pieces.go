package solver

// pieces is how a network falls apart where its contacts are open.
type pieces struct {
	count int
	of    []int  // piece of each node; that of the reference is 0
	cut   []bool // branches that are open between two pieces: their voltage is not defined
	gauge []bool // cut branches that join the pieces to a tree: their row gives u = 0 instead of j = 0
	bound bool   // there is a reference
}

// findPieces splits the graph without open branches. In each connected component, one row j = 0 for every piece but one
// follows from the others, since what flows into a piece flows out of it. Those are the rows of the gauge branches.
func findPieces[T Scalar](n *Network[T], laws []Law[T]) *pieces {
	together := newGroups(n.Nodes)
	for b := range laws {
		if !laws[b].open() {
			together.join(n.Branches[b].From, n.Branches[b].To)
		}
	}
	p := &pieces{of: make([]int, n.Nodes), cut: make([]bool, len(laws)), gauge: make([]bool, len(laws)), bound: n.Reference >= 0}
	number := make([]int, n.Nodes) // of the piece of a representative, counted from 1
	if p.bound && n.Nodes > 0 {
		p.count = 1
		number[together.of(n.Reference)] = 1
	}
	for node := range n.Nodes {
		root := together.of(node)
		if number[root] == 0 {
			p.count++
			number[root] = p.count
		}
		p.of[node] = number[root] - 1
	}
	for b := range laws {
		from, to := n.Branches[b].From, n.Branches[b].To
		if laws[b].open() && p.of[from] != p.of[to] {
			p.cut[b] = true
			p.gauge[b] = together.join(from, to)
		}
	}
	return p
}

// floating reports whether the node's voltage has no reference.
func (p *pieces) floating(node int) bool { return !p.bound || p.of[node] != 0 }
