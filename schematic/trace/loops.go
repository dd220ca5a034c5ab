package trace

import (
	"cmp"
	"slices"
)

// shortestLoops finds, for each branch, a shortest loop through it, by breadth-first search with the branch left out.
// They come shortest first, and in order of the branches where they are equally long.
func (d *Drawing) shortestLoops() [][]Step {
	graph := d.graph()
	var loops [][]Step
	for b, branch := range d.Branches {
		if back := graph.way(branch.To, branch.From, b, nil); back != nil {
			loops = append(loops, append([]Step{{b, 1}}, back...))
		}
	}
	slices.SortStableFunc(loops, func(a, b []Step) int { return cmp.Compare(len(a), len(b)) })
	return loops
}

// treeLoops are the loops that each branch outside of a spanning forest closes through it; they are always complete.
func (d *Drawing) treeLoops() [][]Step {
	graph := d.graph()
	sets := newSets(len(d.Potentials))
	inTree := make([]bool, len(d.Branches))
	var chords []int
	for b, branch := range d.Branches {
		if inTree[b] = sets.union(branch.From, branch.To); !inTree[b] {
			chords = append(chords, b)
		}
	}
	loops := make([][]Step, 0, len(chords))
	for _, b := range chords {
		back := graph.way(d.Branches[b].To, d.Branches[b].From, b, inTree)
		loops = append(loops, append([]Step{{b, 1}}, back...))
	}
	return loops
}

// graph lists the steps that leave each potential, in the order of branches.
type graph struct {
	leaving [][]Step
	to      func(Step) int
}

func (d *Drawing) graph() *graph {
	g := &graph{leaving: make([][]Step, len(d.Potentials))}
	for b, branch := range d.Branches {
		g.leaving[branch.From] = append(g.leaving[branch.From], Step{b, 1})
		g.leaving[branch.To] = append(g.leaving[branch.To], Step{b, -1})
	}
	g.to = func(step Step) int {
		if step.Sense > 0 {
			return d.Branches[step.Branch].To
		}
		return d.Branches[step.Branch].From
	}
	return g
}

// way is a shortest way between two potentials that leaves out one branch, and all branches outside of a choice unless
// that is nil. It is empty and not nil when the potentials are the same, and nil when there is no way.
func (g *graph) way(from, to, without int, choice []bool) []Step {
	reached := map[int]Step{}
	before := map[int]int{from: -1}
	queue := []int{from}
	for len(queue) > 0 && !has(before, to) {
		at := queue[0]
		queue = queue[1:]
		for _, step := range g.leaving[at] {
			next := g.to(step)
			if step.Branch == without || (choice != nil && !choice[step.Branch]) || has(before, next) {
				continue
			}
			reached[next], before[next] = step, at
			queue = append(queue, next)
		}
	}
	if !has(before, to) {
		return nil
	}
	way := []Step{}
	for at := to; at != from; at = before[at] {
		way = append(way, reached[at])
	}
	slices.Reverse(way)
	return way
}
