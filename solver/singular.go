package solver

import "errors"

// involved is how large the part of a branch in what is undetermined must be, against the largest, to name the branch.
const involved = 1e-6

// singular names what is at fault when the graph has shown nothing, but the equations have no unique solution: controls
// that contradict one another or leave something open, impedances that add up to zero around a loop.
func (p *Plan[T]) singular(s *meshSystem[T], laws []Law[T]) error {
	if !independent(p.network.Meshes) {
		return errors.New("the meshes are not independent: one of them is a combination of others")
	}
	cuts := newCutGraph(p.network, laws)
	for b := range laws {
		if laws[b].setsCurrent() && laws[b].controlled() {
			if open, possible := cuts.wayBack(b); !possible || len(open) > 0 {
				return &Problem{Code: NoReturnPath, Branches: []int{b}, Open: open}
			}
		}
	}
	problem := &Problem{Code: Undetermined}
	var controlled []int
	for _, b := range s.undetermined() {
		problem.Branches = append(problem.Branches, b)
		if laws[b].controlled() {
			controlled = append(controlled, b)
		}
	}
	if len(controlled) > 0 {
		problem.Code, problem.Branches = ControlLoop, controlled
	}
	return problem
}

// undetermined gives the branches whose current or voltage could change without any equation noticing.
func (s *meshSystem[T]) undetermined() []int {
	free := s.factor.NullVector()
	for i := range s.x {
		s.x[i].Value, s.x[i].Rest = free[i], 0
	}
	sizes := make([]float64, len(s.row))
	largest := 0.0
	for b := range sizes {
		sizes[b] = magnitude(s.current(b).Round())
		if r := s.row[b]; r >= 0 {
			sizes[b] = max(sizes[b], magnitude(free[len(s.network.Meshes)+r]))
		}
		largest = max(largest, sizes[b])
	}
	var branches []int
	for b, size := range sizes {
		if size > involved*largest {
			branches = append(branches, b)
		}
	}
	return branches
}
