package solver

// accurate reports whether every branch without row has its voltage to rounding: the difference of large mesh currents
// through a large impedance may not have it.
func (s *meshSystem[T]) accurate(laws []Law[T]) bool {
	largest, worst := 0.0, 0.0
	for b := range laws {
		if s.row[b] >= 0 {
			largest = max(largest, magnitude(s.x[len(s.network.Meshes)+s.row[b]]))
			continue
		}
		z, e := impedance(&laws[b])
		var j T
		sum := 0.0
		through, senses := s.through.of(b)
		for k, m := range through {
			j += signed(senses[k], s.x[m])
			sum += magnitude(s.x[m])
		}
		largest = max(largest, magnitude(e+z*j))
		worst = max(worst, magnitude(z)*sum)
	}
	return worst <= spreadLimit*largest
}

// solution turns the unknowns into currents and voltages.
func (p *Plan[T]) solution(s *meshSystem[T], laws []Law[T], split *pieces) *Solution[T] {
	n := p.network
	solution := &Solution[T]{
		Mesh:    append([]T(nil), s.x[:len(n.Meshes)]...),
		Current: make([]T, len(laws)), Voltage: make([]T, len(laws)), Node: make([]T, n.Nodes),
		FloatingNode: make([]bool, n.Nodes), FloatingBranch: split.cut, Piece: split.of,
	}
	for b := range laws {
		solution.Current[b], solution.Voltage[b] = s.branch(b, &laws[b])
		if split.cut[b] {
			solution.Current[b], solution.Voltage[b] = 0, 0
		}
	}
	p.nodeVoltages(solution, split)
	solution.Supermeshes = supermeshes(n, p.through, laws)
	return solution
}

// branch gives current and voltage of a branch. Where the law gives one of them from the other, the one that has lost
// fewer digits is taken as given.
func (s *meshSystem[T]) branch(b int, law *Law[T]) (j, u T) {
	sum := 0.0
	through, senses := s.through.of(b)
	for k, m := range through {
		j += signed(senses[k], s.x[m])
		sum += magnitude(s.x[m])
	}
	if s.row[b] < 0 {
		z, e := impedance(law)
		return j, e + z*j
	}
	u = s.x[len(s.network.Meshes)+s.row[b]]
	switch {
	case len(law.Terms) > 0:
	case law.Beta == 0:
		j = law.Gamma / law.Alpha
	case law.Alpha == 0:
		u = law.Gamma / law.Beta
	case magnitude(law.Gamma)+magnitude(law.Beta*u) < magnitude(law.Alpha)*sum:
		j = (law.Gamma - law.Beta*u) / law.Alpha
	default:
		u = (law.Gamma - law.Alpha*j) / law.Beta
	}
	return j, u
}

// nodeVoltages walks from the reference through all that conducts and subtracts branch voltages on the way.
func (p *Plan[T]) nodeVoltages(solution *Solution[T], split *pieces) {
	for node := range solution.FloatingNode {
		solution.FloatingNode[node] = split.floating(node)
	}
	if !split.bound || p.network.Nodes == 0 {
		return
	}
	p.walk.without = split.cut
	p.walk.from(p.network.Reference)
	for _, node := range p.walk.reached[1:] {
		step := p.walk.step[node]
		before, _ := p.network.ends(step)
		solution.Node[node] = solution.Node[before] - signed(step.Sense, solution.Voltage[step.Branch])
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
