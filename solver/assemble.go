package solver

import (
	"loopwright/solver/sparse"
	"loopwright/solver/wide"
)

// solution turns the unknowns into currents and voltages.
func (p *Plan[T]) solution(s *meshSystem[T], laws []Law[T], split *pieces) *Solution[T] {
	n := p.network
	solution := &Solution[T]{
		Mesh:    make([]T, len(n.Meshes)),
		Current: make([]T, len(laws)), Voltage: make([]T, len(laws)), Node: make([]T, n.Nodes),
		FloatingNode: make([]bool, n.Nodes), FloatingBranch: split.cut, Piece: split.of,
		Laws: laws,
	}
	for m := range solution.Mesh {
		solution.Mesh[m] = scaled(orZero(s.x[m].Round(), s.zero), 1/s.ohms)
	}
	for b := range laws {
		solution.Current[b], solution.Voltage[b] = s.branch(b, &laws[b])
		if split.cut[b] {
			solution.Current[b], solution.Voltage[b] = 0, 0
		}
	}
	p.nodeVoltages(solution, split)
	for _, values := range [][]T{solution.Mesh, solution.Current, solution.Voltage, solution.Node} {
		dropSignOfZero(values)
	}
	solution.Supermeshes = supermeshes(n, p.through, laws)
	return solution
}

// negligible is how small a sum must be against its terms to be zero, nothing how small a value must be against the
// largest of the case. Both lie far above the rounding of the refined solution, and far below any current or voltage
// that could be real.
const (
	negligible = 0x1p-80
	nothing    = 0x1p-90
)

// zeroBelow is the magnitude below which values of a case are nothing but rounding.
func zeroBelow(refinement sparse.Refinement) float64 {
	return max(nothing*refinement.Size, 16*refinement.Error)
}

// currentOrZero is the current of a branch in units of 1 V / ohms, and the sum of the magnitudes that it is made of.
func (s *meshSystem[T]) currentOrZero(b int) (j T, total float64) {
	through, _ := s.through.of(b)
	for _, m := range through {
		total += magnitude(s.x[m].Value)
	}
	return orZero(s.current(b).Round(), max(negligible*total, s.zero)), total
}

// differenceOnly is how small a current must be against its mesh currents to be taken from the voltage instead, where the
// law allows that.
const differenceOnly = 0x1p-50

// branch gives current and voltage of a branch. What its law gives directly is taken from there.
func (s *meshSystem[T]) branch(b int, law *Law[T]) (j, u T) {
	j, total := s.currentOrZero(b)
	u = orZero(s.voltage(b, law).Round(), s.zero)
	small := magnitude(j) <= differenceOnly*total
	j = scaled(j, 1/s.ohms)
	switch {
	case law.controlled():
	case law.Beta == 0:
		j = law.Gamma / law.Alpha
	case law.Alpha == 0:
		u = law.Gamma / law.Beta
	case s.row[b] < 0 && j == 0:
		u = law.Gamma
	case s.row[b] >= 0 && small:
		left := wide.Of(law.Gamma).Minus(s.voltage(b, law).Times(law.Beta)).Round()
		j = orZero(left, max(negligible*magnitude(law.Gamma), magnitude(law.Beta)*s.zero)) / law.Alpha
	}
	return j, u
}

// nodeVoltages finds the voltages of the nodes that have a reference.
func (p *Plan[T]) nodeVoltages(solution *Solution[T], split *pieces) {
	for node := range solution.FloatingNode {
		solution.FloatingNode[node] = split.floating(node)
	}
	p.walk.without = split.cut
	p.addUp(solution.Node, solution.Voltage)
}

// addUp walks from the reference through all that conducts and subtracts the branch voltages on the way.
func (p *Plan[T]) addUp(node, voltage []T) {
	if p.network.Reference < 0 || p.network.Nodes == 0 {
		return
	}
	p.walk.from(p.network.Reference)
	for _, k := range p.walk.reached[1:] {
		step := p.walk.step[k]
		before, _ := p.network.ends(step)
		node[k] = node[before] - signed(step.Sense, voltage[step.Branch])
	}
}

// supermeshes groups the meshes between which branches set the current.
func supermeshes[T Scalar](n *Network[T], through *membership, laws []Law[T]) []Supermesh {
	fused := newGroups(len(n.Meshes))
	var between []int
	for b := range laws {
		if meshes, _ := through.of(b); laws[b].setsCurrent() && len(meshes) > 1 {
			between = append(between, b)
			for _, m := range meshes[1:] {
				fused.join(meshes[0], m)
			}
		}
	}
	if len(between) == 0 {
		return nil
	}
	index := map[int]int{}
	var list []Supermesh
	for m := range n.Meshes {
		root := fused.of(m)
		if fused.size[root] == 1 {
			continue
		}
		if _, known := index[root]; !known {
			index[root] = len(list)
			list = append(list, Supermesh{})
		}
		list[index[root]].Meshes = append(list[index[root]].Meshes, m)
	}
	for _, b := range between {
		meshes, _ := through.of(b)
		if k, known := index[fused.of(meshes[0])]; known {
			list[k].Through = append(list[k].Through, b)
		}
	}
	return list
}
