package solver

import (
	"context"

	"loopwright/solver/sparse"
	"loopwright/solver/wide"
)

// meshSystem is the mesh equations of a network for a choice of row branches. Unknowns 0 … M−1 are the mesh currents, the
// others the voltages of the row branches; equations 0 … M−1 are Kirchhoff's voltage law around the meshes, the others
// the laws of the row branches.
type meshSystem[T Scalar] struct {
	network *Network[T]
	through *membership
	rows    []int // the row branches, ascending
	row     []int // index in rows of each branch, or −1

	symbolic *sparse.Symbolic
	slot     []int // where each term of the equations belongs, in the order in which terms gives them
	matrix   *sparse.Matrix[T]
	factor   *sparse.LU[T]
	ohms     float64          // mesh currents are unknowns in units of 1 V / ohms
	scale    []float64        // what each equation is multiplied by
	x        []wide.Number[T] // the unknowns, with twice the digits
	zero     float64          // what is nothing but rounding, V
	sum      []wide.Number[T] // what is left of each equation
}

// newMeshSystem lays out the equations with the given row branches, and orders their elimination.
func newMeshSystem[T Scalar](ctx context.Context, n *Network[T], through *membership, laws []Law[T], isRow func(b int) bool) (*meshSystem[T], error) {
	s := &meshSystem[T]{network: n, through: through, row: make([]int, len(laws)), rows: make([]int, 0, len(laws))}
	for b := range laws {
		s.row[b] = -1
		if isRow(b) {
			s.row[b] = len(s.rows)
			s.rows = append(s.rows, b)
		}
	}
	size := s.size()
	places := s.places(laws)
	equations, unknowns := make([]int, 0, places), make([]int, 0, places)
	s.ohms = 1
	s.terms(laws, nil, func(equation, unknown int, _ T) {
		equations, unknowns = append(equations, equation), append(unknowns, unknown)
	})
	pattern, slot := sparse.NewPattern(size, equations, unknowns)
	symbolic, err := sparse.Analyze(ctx, pattern, s.waiting(laws))
	if err != nil {
		return nil, err
	}
	s.slot, s.symbolic = slot, symbolic
	s.allocate()
	return s, nil
}

// size is the number of equations.
func (s *meshSystem[T]) size() int { return len(s.network.Meshes) + len(s.rows) }

// allocate gives the system memory of its own.
func (s *meshSystem[T]) allocate() {
	size := s.size()
	numbers := make([]wide.Number[T], 2*size)
	s.matrix, s.factor = sparse.NewMatrix[T](s.symbolic.Pattern), sparse.NewLU[T](s.symbolic)
	s.scale, s.x, s.sum = make([]float64, size), numbers[:size:size], numbers[size:]
}

// fork is a system of the same layout with memory of its own.
func (s *meshSystem[T]) fork() *meshSystem[T] {
	fork := *s
	fork.allocate()
	return &fork
}

// waiting marks the unknowns that have no coefficient of their own in their equation, or may have none: the voltages of
// branches that may open, and the currents of meshes whose branches all have rows.
func (s *meshSystem[T]) waiting(laws []Law[T]) []bool {
	meshes := len(s.network.Meshes)
	waiting := make([]bool, meshes+len(s.rows))
	for m := range meshes {
		waiting[m] = true
	}
	for b := range laws {
		if r := s.row[b]; r >= 0 {
			waiting[meshes+r] = true
		} else if laws[b].Alpha != 0 {
			through, _ := s.through.of(b)
			for _, m := range through {
				waiting[m] = false
			}
		}
	}
	return waiting
}

// places is the number of terms of the equations.
func (s *meshSystem[T]) places(laws []Law[T]) int {
	count := 0
	for b := range laws {
		through := s.through.start[b+1] - s.through.start[b]
		if s.row[b] < 0 {
			count += through * through
			continue
		}
		count += 2*through + 1
		for _, term := range laws[b].Terms {
			count += 1 + s.through.start[term.Branch+1] - s.through.start[term.Branch]
		}
	}
	return count
}

// holds reports whether the system has a row for each law that needs one.
func (s *meshSystem[T]) holds(laws []Law[T]) bool {
	for b := range laws {
		if s.row[b] < 0 && laws[b].needsRow() {
			return false
		}
	}
	return true
}
