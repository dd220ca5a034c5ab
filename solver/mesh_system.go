package solver

import (
	"context"
	"errors"
	"math"

	"loopwright/solver/sparse"
)

// membership lists the meshes that run through each branch, with the sense in which they do.
type membership struct {
	start []int // those of branch b are mesh[start[b]:start[b+1]]
	mesh  []int
	sense []int
}

func newMembership(branches int, meshes []Mesh) *membership {
	m := &membership{start: make([]int, branches+1)}
	steps := 0
	for _, mesh := range meshes {
		steps += len(mesh.Path)
		for _, step := range mesh.Path {
			m.start[step.Branch+1]++
		}
	}
	for b := range branches {
		m.start[b+1] += m.start[b]
	}
	m.mesh, m.sense = make([]int, steps), make([]int, steps)
	next := append([]int(nil), m.start[:branches]...)
	for k, mesh := range meshes {
		for _, step := range mesh.Path {
			m.mesh[next[step.Branch]], m.sense[next[step.Branch]] = k, step.Sense
			next[step.Branch]++
		}
	}
	return m
}

// of gives the meshes through a branch and their senses.
func (m *membership) of(b int) (meshes, senses []int) {
	from, to := m.start[b], m.start[b+1]
	return m.mesh[from:to], m.sense[from:to]
}

// meshSystem is the mesh equations of a network for a choice of row branches. Unknowns 0 … M−1 are the mesh currents, the
// others the voltages of the row branches; equations 0 … M−1 are Kirchhoff's voltage law around the meshes, the others
// the laws of the row branches.
type meshSystem[T Scalar] struct {
	network *Network[T]
	through *membership
	rows    []int // the row branches, ascending
	row     []int // index in rows of each branch, or −1

	slot   []int // where each term of the equations belongs, in the order in which terms gives them
	matrix *sparse.Matrix[T]
	factor *sparse.LU[T]
	right  []T
	x      []T
	size   []float64 // largest entry of each equation
}

// newMeshSystem lays out the equations with the given row branches, and orders their elimination.
func newMeshSystem[T Scalar](ctx context.Context, n *Network[T], through *membership, laws []Law[T], isRow func(b int) bool) (*meshSystem[T], error) {
	s := &meshSystem[T]{network: n, through: through, row: make([]int, len(laws))}
	for b := range laws {
		s.row[b] = -1
		if isRow(b) {
			s.row[b] = len(s.rows)
			s.rows = append(s.rows, b)
		}
	}
	size := len(n.Meshes) + len(s.rows)
	var equations, unknowns []int
	s.terms(laws, nil, 1, func(equation, unknown int, _ T) {
		equations, unknowns = append(equations, equation), append(unknowns, unknown)
	})
	pattern, slot := sparse.NewPattern(size, equations, unknowns)
	symbolic, err := sparse.Analyze(ctx, pattern)
	if err != nil {
		return nil, err
	}
	s.slot, s.matrix, s.factor = slot, sparse.NewMatrix[T](pattern), sparse.NewLU[T](symbolic)
	s.right, s.x, s.size = make([]T, size), make([]T, size), make([]float64, size)
	return s, nil
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

// impedance gives Z and E of a branch without row: u = E + Z·j.
func impedance[T Scalar](law *Law[T]) (z, e T) { return -law.Alpha / law.Beta, law.Gamma / law.Beta }

// terms gives every term of the left side. Mesh currents are unknowns in units of 1 V / ohms. The order and the places are
// the same for all laws of one layout.
func (s *meshSystem[T]) terms(laws []Law[T], gauge []bool, ohms float64, emit func(equation, unknown int, value T)) {
	meshes := len(s.network.Meshes)
	for b := range laws {
		law := &laws[b]
		if s.row[b] < 0 {
			z, _ := impedance(law)
			s.voltageDrop(b, scaled(z, 1/ohms), emit)
			continue
		}
		row := meshes + s.row[b]
		alpha, beta := law.Alpha, law.Beta
		if gauge != nil && gauge[b] {
			alpha, beta = 0, 1
		}
		through, senses := s.through.of(b)
		for k, m := range through {
			emit(m, row, scalar[T](float64(senses[k])))
			emit(row, m, scaled(alpha, float64(senses[k])/ohms))
		}
		emit(row, row, beta)
		for k := range law.Terms {
			s.control(row, &law.Terms[k], &laws[law.Terms[k].Branch], ohms, emit)
		}
	}
}

// voltageDrop gives the terms of Z·j in the meshes through a branch.
func (s *meshSystem[T]) voltageDrop(b int, z T, emit func(equation, unknown int, value T)) {
	through, senses := s.through.of(b)
	for k, equation := range through {
		for l, unknown := range through {
			emit(equation, unknown, signed(senses[k]*senses[l], z))
		}
	}
}

// control gives the terms of a controlled source in its row.
func (s *meshSystem[T]) control(row int, term *Term[T], law *Law[T], ohms float64, emit func(equation, unknown int, value T)) {
	alpha := term.Alpha
	if r := s.row[term.Branch]; r >= 0 {
		emit(row, len(s.network.Meshes)+r, term.Beta)
	} else {
		z, _ := impedance(law)
		alpha += term.Beta * z
	}
	through, senses := s.through.of(term.Branch)
	for k, m := range through {
		emit(row, m, scaled(alpha, float64(senses[k])/ohms))
	}
}

// rightSide fills in what does not depend on the unknowns.
func (s *meshSystem[T]) rightSide(laws []Law[T], gauge []bool) {
	clear(s.right)
	for b := range laws {
		law := &laws[b]
		if s.row[b] < 0 {
			_, e := impedance(law)
			through, senses := s.through.of(b)
			for k, m := range through {
				s.right[m] -= signed(senses[k], e)
			}
			continue
		}
		row := len(s.network.Meshes) + s.row[b]
		if gauge[b] {
			continue
		}
		s.right[row] = law.Gamma
		for _, term := range law.Terms {
			if s.row[term.Branch] < 0 {
				_, e := impedance(&laws[term.Branch])
				s.right[row] -= term.Beta * e
			}
		}
	}
}

// solve assembles, factorises and solves the equations. The error is *sparse.Singular or that of ctx.
func (s *meshSystem[T]) solve(ctx context.Context, laws []Law[T], gauge []bool) error {
	ohms := typicalImpedance(laws)
	s.matrix.Zero()
	next := 0
	s.terms(laws, gauge, ohms, func(_, _ int, value T) {
		s.matrix.Value[s.slot[next]] += value
		next++
	})
	s.rightSide(laws, gauge)
	s.equilibrate()
	if !s.factor.Refactor(s.matrix) {
		if err := s.factor.Factor(ctx, s.matrix); err != nil {
			return err
		}
	}
	s.factor.SolveRefined(s.matrix, s.x, s.right)
	for m := range s.network.Meshes {
		s.x[m] = scaled(s.x[m], 1/ohms)
	}
	for _, x := range s.x {
		if !finite(x) {
			return errOverflow
		}
	}
	return nil
}

var errOverflow = errors.New("the values of the network are so large or so small that the solution overflows")

// equilibrate scales each equation by a power of two so that its largest entry is between 1 and 2.
func (s *meshSystem[T]) equilibrate() {
	clear(s.size)
	for p, i := range s.matrix.Row {
		s.size[i] = max(s.size[i], magnitude(s.matrix.Value[p]))
	}
	for i, size := range s.size {
		if size == 0 {
			s.size[i] = 1
			continue
		}
		s.size[i] = math.Ldexp(1, -exponent(size))
		s.right[i] = scaled(s.right[i], s.size[i])
	}
	for p, i := range s.matrix.Row {
		s.matrix.Value[p] = scaled(s.matrix.Value[p], s.size[i])
	}
}

// typicalImpedance is a power of two near the geometric mean of the impedances: with voltages in volts and currents in
// volts per typical impedance, small and large impedances are equally far from 1.
func typicalImpedance[T Scalar](laws []Law[T]) float64 {
	sum, count := 0, 0
	for b := range laws {
		if laws[b].Alpha != 0 && laws[b].Beta != 0 {
			sum += exponent(laws[b].Alpha) - exponent(laws[b].Beta)
			count++
		}
	}
	if count == 0 {
		return 1
	}
	return math.Ldexp(1, sum/count)
}
