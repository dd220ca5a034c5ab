package trace

// findBlocks splits the drawing into its blocks: the largest groups of lines of which every two lie on a common closed
// way. A circuit that hangs within a mesh of another by one place is a block of its own, so that neither disturbs the
// meshes of the other. Lines on no closed way belong to no block.
//
// The method is the depth-first search of Hopcroft and Tarjan ("Algorithm 447: efficient algorithms for graph
// manipulation", Communications of the ACM 16, 1973), without recursion. Its cost is that of reading the graph once.
func (g *plane) findBlocks() {
	s := blockSearch{
		plane: g, depth: make([]int, len(g.places)), low: make([]int, len(g.places)),
		next: append([]int(nil), g.start[:len(g.places)]...), seen: make([]bool, len(g.edges)),
	}
	for p := range g.places {
		if s.depth[p] == 0 {
			s.from(p)
		}
	}
}

type blockSearch struct {
	*plane
	depth  []int // of each place in the tree of the search, from 1; 0 for one that is not reached yet
	low    []int // the least depth that is reached from a place and what lies beyond it
	next   []int // where to go on in leaving
	seen   []bool
	way    []int // half edges from the root of the search to where it is
	stack  []int // edges that have not been given their block
	blocks int
}

func (s *blockSearch) from(root int) {
	s.depth[root], s.low[root] = 1, 1
	at := root
	for {
		if s.next[at] < s.start[at+1] {
			half := s.leaving[s.next[at]]
			s.next[at]++
			at = s.step(at, half)
			continue
		}
		if len(s.way) == 0 {
			return
		}
		at = s.back()
	}
}

// step takes one half edge and gives the place where the search goes on.
func (s *blockSearch) step(at, half int) int {
	if s.seen[half/2] {
		return at
	}
	s.seen[half/2] = true
	s.stack = append(s.stack, half/2)
	_, to := s.ends(half)
	if s.depth[to] > 0 {
		s.low[at] = min(s.low[at], s.depth[to])
		return at
	}
	s.way = append(s.way, half)
	s.depth[to] = len(s.way) + 1
	s.low[to] = s.depth[to]
	return to
}

// back goes back along the last half edge, and closes the block beyond it when nothing there reaches further back.
func (s *blockSearch) back() int {
	last := s.way[len(s.way)-1]
	s.way = s.way[:len(s.way)-1]
	from, to := s.ends(last)
	s.low[from] = min(s.low[from], s.low[to])
	if s.low[to] < s.depth[from] {
		return from
	}
	first := len(s.stack) - 1
	for s.stack[first] != last/2 {
		first--
	}
	block := -1
	if first < len(s.stack)-1 {
		block = s.blocks
		s.blocks++
	}
	for _, e := range s.stack[first:] {
		s.edges[e].block = block
	}
	s.stack = s.stack[:first]
	return from
}
