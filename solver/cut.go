package solver

// cutGraph is a network seen from its current sources: without them it falls into lumps, and what the sources drive into
// a lump must flow out of it again. Controlled sources are left in: whether they fit is a question of numbers.
type cutGraph[T Scalar] struct {
	network *Network[T]
	laws    []Law[T]
	lump    *groups         // nil when no source drives anything
	sum     map[int]T       // current driven out of a lump by the sources that leave it, by representative
	total   map[int]float64 // sum of their magnitudes
	sources map[int]int     // their number, without those of 0 A
}

func newCutGraph[T Scalar](n *Network[T], laws []Law[T]) *cutGraph[T] {
	g := &cutGraph[T]{network: n, laws: laws}
	for b := range laws {
		if g.source(b) && laws[b].Gamma != 0 {
			g.add()
			break
		}
	}
	return g
}

// add finds the lumps and sums what the sources that leave each of them drive out of it.
func (g *cutGraph[T]) add() {
	g.lump = newGroups(g.network.Nodes)
	for b := range g.laws {
		if !g.source(b) {
			g.lump.join(g.network.Branches[b].From, g.network.Branches[b].To)
		}
	}
	g.sum, g.total, g.sources = map[int]T{}, map[int]float64{}, map[int]int{}
	for b := range g.laws {
		from, to, crosses := g.crosses(b)
		if !crosses || g.laws[b].Gamma == 0 {
			continue
		}
		j := g.current(b)
		g.sum[from] += j
		g.sum[to] -= j
		for _, lump := range [2]int{from, to} {
			g.total[lump] += magnitude(j)
			g.sources[lump]++
		}
	}
}

// source reports whether the branch sets its current without regard to others.
func (g *cutGraph[T]) source(b int) bool { return g.laws[b].Beta == 0 && !g.laws[b].controlled() }

func (g *cutGraph[T]) current(b int) T { return g.laws[b].Gamma / g.laws[b].Alpha }

// crosses gives the lumps between which a source runs, and whether they are two.
func (g *cutGraph[T]) crosses(b int) (from, to int, crosses bool) {
	if !g.source(b) {
		return 0, 0, false
	}
	from, to = g.lump.of(g.network.Branches[b].From), g.lump.of(g.network.Branches[b].To)
	return from, to, from != to
}

// conflict finds the lump with the fewest sources whose currents do not add up to zero.
func (g *cutGraph[T]) conflict() *Problem {
	return g.smallest(NoReturnPath, func(lump int) bool { return !balanced(g.sum[lump], g.total[lump]) })
}

// undetermined finds the lump with the fewest sources: the voltages across them can be anything.
func (g *cutGraph[T]) undetermined() *Problem {
	return g.smallest(Undetermined, func(int) bool { return true })
}

func (g *cutGraph[T]) smallest(code Code, accept func(lump int) bool) *Problem {
	if g.lump == nil {
		return nil
	}
	best := -1
	for node := range g.network.Nodes {
		lump := g.lump.of(node)
		if lump != node || g.sources[lump] == 0 || !accept(lump) {
			continue
		}
		if best < 0 || g.sources[lump] < g.sources[best] {
			best = lump
		}
	}
	if best < 0 {
		return nil
	}
	problem := &Problem{Code: code}
	strongest, inward := -1, false
	for b := range g.laws {
		from, to, crosses := g.crosses(b)
		if !crosses || g.laws[b].Gamma == 0 || (from != best && to != best) {
			continue
		}
		problem.Branches = append(problem.Branches, b)
		if strongest < 0 || magnitude(g.current(b)) > magnitude(g.current(strongest)) {
			strongest, inward = b, to == best
		}
	}
	if code == NoReturnPath {
		sum := g.sum[best]
		if inward {
			sum = -sum
		}
		problem.Sum = asComplex(sum)
		problem.Open, _ = g.wayBack(strongest)
	}
	return problem
}

// wayBack gives the fewest open branches that, once closed, let the current of a source return; none is needed when it
// can return already. It reports false when closing contacts is not enough.
func (g *cutGraph[T]) wayBack(source int) (open []int, possible bool) {
	var conducting []int
	for b := range g.laws {
		if b != source && (!g.source(b) || g.laws[b].Gamma == 0) {
			conducting = append(conducting, b)
		}
	}
	walk := newSpread(g.network, conducting)
	walk.fewest(g.network.Branches[source].To, func(b int) bool { return g.laws[b].open() })
	if !walk.has(g.network.Branches[source].From) {
		return nil, false
	}
	for _, step := range walk.pathTo(g.network.Branches[source].From) {
		if g.laws[step.Branch].open() {
			open = append(open, step.Branch)
		}
	}
	return sortedUnique(open), true
}
