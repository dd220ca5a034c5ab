package solver

import "strconv"

// FundamentalLoops gives a complete basis of independent meshes for callers that have no drawing: one loop for each branch
// outside a spanning forest, which begins with that branch and returns through the forest. The forest is grown breadth
// first from the lowest node of each component, so the same network always gives the same loops. They are named m1, m2, …
// in the order of those branches.
func FundamentalLoops[T Scalar](nodes int, branches []Branch[T]) []Mesh {
	network := &Network[T]{Nodes: nodes, Branches: branches}
	all := make([]int, len(branches))
	for b := range all {
		all[b] = b
	}
	tree := newSpread(network, all)
	tree.stamp++
	for node := range nodes {
		if !tree.has(node) {
			tree.more(node)
		}
	}
	var meshes []Mesh
	for b, branch := range branches {
		if tree.step[branch.From].Branch == b || tree.step[branch.To].Branch == b {
			continue
		}
		name := "m" + strconv.Itoa(len(meshes)+1)
		meshes = append(meshes, Mesh{Name: name, Path: append([]Step{{b, 1}}, tree.between(branch.To, branch.From)...)})
	}
	return meshes
}

// between gives the steps from one node to another through the tree of the last walk.
func (s *spread[T]) between(from, to int) []Step {
	var up, down []Step
	for from != to {
		if s.depth[from] >= s.depth[to] {
			step := s.step[from]
			from, _ = s.network.ends(step)
			up = append(up, Step{step.Branch, -step.Sense})
		} else {
			step := s.step[to]
			to, _ = s.network.ends(step)
			down = append(down, step)
		}
	}
	for k := len(down) - 1; k >= 0; k-- {
		up = append(up, down[k])
	}
	return up
}
