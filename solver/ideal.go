package solver

import "slices"

// idealGraph is the part of a network that has no impedance: ideal voltage sources, and resistances of zero.
type idealGraph[T Scalar] struct {
	network  *Network[T]
	laws     []Law[T]
	branches []int // ideal branches, ascending
	cyclic   bool
}

func newIdealGraph[T Scalar](n *Network[T], laws []Law[T]) *idealGraph[T] {
	g := &idealGraph[T]{network: n, laws: laws}
	for b := range laws {
		if laws[b].ideal() {
			g.branches = append(g.branches, b)
		}
	}
	if len(g.branches) == 0 {
		return g
	}
	joined := newGroups(n.Nodes)
	for _, b := range g.branches {
		if !joined.join(n.Branches[b].From, n.Branches[b].To) {
			g.cyclic = true
		}
	}
	return g
}

// emf is the voltage that an ideal branch sets.
func (g *idealGraph[T]) emf(b int) T { return g.laws[b].Gamma / g.laws[b].Beta }

// shorted finds the source that the fewest branches of zero resistance short-circuit.
func (g *idealGraph[T]) shorted() *Problem {
	if !g.cyclic {
		return nil
	}
	plain := newGroups(g.network.Nodes)
	var wires, sources []int
	for _, b := range g.branches {
		if g.emf(b) == 0 {
			wires = append(wires, b)
			plain.join(g.network.Branches[b].From, g.network.Branches[b].To)
		} else {
			sources = append(sources, b)
		}
	}
	tree := newSpread(g.network, wires)
	var best []Step
	for _, b := range sources {
		branch := g.network.Branches[b]
		if plain.of(branch.From) != plain.of(branch.To) {
			continue
		}
		tree.from(branch.To)
		loop := append([]Step{{b, 1}}, tree.pathTo(branch.From)...)
		if best == nil || len(loop) < len(best) {
			best = loop
		}
	}
	if best == nil {
		return nil
	}
	return g.problem(ShortedSource, best)
}

// conflict finds the shortest loop of ideal branches whose voltages do not add up to zero.
func (g *idealGraph[T]) conflict() *Problem {
	if !g.cyclic {
		return nil
	}
	loop := g.shortest(func(sum T, total float64) bool { return !balanced(sum, total) })
	if loop == nil {
		return nil
	}
	return g.problem(SourceLoop, loop)
}

// undetermined finds the shortest loop of ideal branches: any current could circulate in it.
func (g *idealGraph[T]) undetermined() *Problem {
	if !g.cyclic {
		return nil
	}
	return g.problem(Undetermined, g.shortest(func(T, float64) bool { return true }))
}

// problem states the loop in the sense in which its sum is positive, in AC: has a positive real part.
func (g *idealGraph[T]) problem(code Code, loop []Step) *Problem {
	sum, total := g.around(loop)
	if balanced(sum, total) {
		sum = 0
	}
	if real(asComplex(sum)) < 0 {
		sum = -sum
		slices.Reverse(loop)
		for k := range loop {
			loop[k].Sense = -loop[k].Sense
		}
	}
	branches := make([]int, len(loop))
	for k, step := range loop {
		branches[k] = step.Branch
	}
	return &Problem{Code: code, Branches: sortedUnique(branches), Loop: loop, Sum: asComplex(sum)}
}

// around adds up the voltages of a loop, and their magnitudes.
func (g *idealGraph[T]) around(loop []Step) (sum T, total float64) {
	for _, step := range loop {
		sum += signed(step.Sense, g.emf(step.Branch))
		total += magnitude(g.emf(step.Branch))
	}
	return sum, total
}

// shortest gives the shortest loop whose sum of voltages is accepted. Among the loops that consist of two shortest paths
// from one node and a branch between their ends is a shortest loop that is not a combination of rejected ones (Horton, "A
// polynomial-time algorithm to find the shortest cycle basis of a graph", SIAM Journal on Computing 16, 1987).
func (g *idealGraph[T]) shortest(accept func(sum T, total float64) bool) []Step {
	tree := newSpread(g.network, g.branches)
	potential := make([]T, g.network.Nodes)
	total := make([]float64, g.network.Nodes)
	bestLength, bestRoot, bestBranch := 0, -1, -1
	for root := range g.network.Nodes {
		if !tree.touches(root) {
			continue
		}
		tree.from(root)
		for _, node := range tree.reached {
			if step := tree.step[node]; node != root {
				before, _ := g.network.ends(step)
				potential[node] = potential[before] - signed(step.Sense, g.emf(step.Branch))
				total[node] = total[before] + magnitude(g.emf(step.Branch))
			} else {
				potential[node], total[node] = 0, 0
			}
		}
		for _, b := range g.branches {
			from, to := g.network.Branches[b].From, g.network.Branches[b].To
			if !tree.has(from) || tree.step[from].Branch == b || tree.step[to].Branch == b {
				continue
			}
			length := tree.depth[from] + tree.depth[to] + 1
			sum := g.emf(b) - potential[from] + potential[to]
			if (bestRoot < 0 || length < bestLength) && accept(sum, total[from]+total[to]+magnitude(g.emf(b))) {
				bestLength, bestRoot, bestBranch = length, root, b
			}
		}
	}
	if bestRoot < 0 {
		return nil
	}
	return g.close(tree, bestRoot, bestBranch)
}

// close gives the loop of a branch and the paths from the root to its ends.
func (g *idealGraph[T]) close(tree *spread[T], root, b int) []Step {
	tree.from(root)
	there := tree.pathTo(g.network.Branches[b].From)
	back := tree.pathTo(g.network.Branches[b].To)
	for len(there) > 0 && len(back) > 0 && there[0] == back[0] {
		there, back = there[1:], back[1:]
	}
	loop := append(slices.Clone(there), Step{b, 1})
	for k := len(back) - 1; k >= 0; k-- {
		loop = append(loop, Step{back[k].Branch, -back[k].Sense})
	}
	return loop
}

func sortedUnique(branches []int) []int {
	slices.Sort(branches)
	return slices.Compact(branches)
}
