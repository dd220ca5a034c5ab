package solver

import (
	"context"
	"math"

	"loopwright/solver/sparse"
	"loopwright/solver/wide"
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
	block := make([]int, 2*steps+branches)
	m.mesh, m.sense = block[:steps:steps], block[steps:2*steps:2*steps]
	next := block[2*steps:]
	copy(next, m.start)
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
	ohms   float64          // mesh currents are unknowns in units of 1 V / ohms
	scale  []float64        // what each equation is multiplied by
	x      []wide.Number[T] // the unknowns, with twice the digits
	zero   float64          // what is nothing but rounding, V
	sum    []wide.Number[T] // what is left of each equation
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
	size := len(n.Meshes) + len(s.rows)
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
	s.slot, s.matrix, s.factor = slot, sparse.NewMatrix[T](pattern), sparse.NewLU[T](symbolic)
	numbers := make([]wide.Number[T], 2*size)
	s.scale, s.x, s.sum = make([]float64, size), numbers[:size:size], numbers[size:]
	return s, nil
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

// terms gives every term of the left side. The order and the places are the same for all laws of one layout. A branch
// without row has the law u − Z·j = E, so its Alpha is −Z and its Gamma is E.
func (s *meshSystem[T]) terms(laws []Law[T], gauge []bool, emit func(equation, unknown int, value T)) {
	meshes := len(s.network.Meshes)
	for b := range laws {
		law := &laws[b]
		if s.row[b] < 0 {
			s.voltageDrop(b, scaled(law.Alpha, -1/s.ohms), emit)
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
			emit(row, m, scaled(alpha, float64(senses[k])/s.ohms))
		}
		emit(row, row, beta)
		for k := range law.Terms {
			s.control(row, &law.Terms[k], &laws[law.Terms[k].Branch], emit)
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
func (s *meshSystem[T]) control(row int, term *Term[T], law *Law[T], emit func(equation, unknown int, value T)) {
	alpha := term.Alpha
	if r := s.row[term.Branch]; r >= 0 {
		emit(row, len(s.network.Meshes)+r, term.Beta)
	} else {
		alpha -= term.Beta * law.Alpha
	}
	through, senses := s.through.of(term.Branch)
	for k, m := range through {
		emit(row, m, scaled(alpha, float64(senses[k])/s.ohms))
	}
}

// solve assembles, factorises and solves the equations. It reports false when the equations are singular, to rounding, in
// this layout. The error is that of ctx.
func (s *meshSystem[T]) solve(ctx context.Context, laws []Law[T], gauge []bool) (bool, error) {
	s.ohms = typicalImpedance(laws)
	s.matrix.Zero()
	next := 0
	s.terms(laws, gauge, func(_, _ int, value T) {
		s.matrix.Value[s.slot[next]] += value
		next++
	})
	s.matrix.Equilibrate(s.scale)
	size := drivingVoltage(laws, s.ohms)
	residual := func(r []T) { s.residual(r, laws, gauge) }
	solved, err := s.factor.SolveSystem(ctx, s.matrix, func() sparse.Refinement {
		refinement := s.factor.Refine(s.x, size, residual)
		s.zero = zeroBelow(refinement)
		return refinement
	})
	return solved, err
}

// residual writes what each equation has left at the present unknowns. It goes back to the laws of the branches instead of
// the matrix, whose entries are sums that have been rounded: small impedances beside large ones keep all their digits.
func (s *meshSystem[T]) residual(r []T, laws []Law[T], gauge []bool) {
	meshes := len(s.network.Meshes)
	clear(s.sum)
	for b := range laws {
		law := &laws[b]
		u := s.voltage(b, law)
		through, senses := s.through.of(b)
		for k, m := range through {
			s.sum[m] = s.sum[m].Minus(u.Signed(senses[k]))
		}
		if s.row[b] < 0 {
			continue
		}
		row := meshes + s.row[b]
		if gauge[b] {
			s.sum[row] = wide.Of[T](0).Minus(u)
			continue
		}
		left := s.current(b).Times(scaled(law.Alpha, 1/s.ohms)).Plus(u.Times(law.Beta))
		for _, term := range law.Terms {
			left = left.Plus(s.current(term.Branch).Times(scaled(term.Alpha, 1/s.ohms)))
			left = left.Plus(s.voltage(term.Branch, &laws[term.Branch]).Times(term.Beta))
		}
		s.sum[row] = wide.Of(law.Gamma).Minus(left)
	}
	for i := range s.sum {
		r[i] = scaled(s.sum[i].Round(), s.scale[i])
	}
}

// current is the current of a branch, in units of 1 V / ohms.
func (s *meshSystem[T]) current(b int) wide.Number[T] {
	var j wide.Number[T]
	through, senses := s.through.of(b)
	for k, m := range through {
		j = j.Plus(s.x[m].Signed(senses[k]))
	}
	return j
}

// voltage is the voltage of a branch, in volts.
func (s *meshSystem[T]) voltage(b int, law *Law[T]) wide.Number[T] {
	if r := s.row[b]; r >= 0 {
		return s.x[len(s.network.Meshes)+r]
	}
	return wide.Of(law.Gamma).Minus(s.current(b).Times(scaled(law.Alpha, 1/s.ohms)))
}

// drivingVoltage is the largest voltage that a law sets, and the largest that the currents which laws set would cause.
func drivingVoltage[T Scalar](laws []Law[T], ohms float64) float64 {
	largest := 0.0
	for b := range laws {
		law := &laws[b]
		switch {
		case law.Gamma == 0:
		case law.Beta != 0:
			largest = max(largest, magnitude(law.Gamma)/magnitude(law.Beta))
		case law.Alpha != 0:
			largest = max(largest, magnitude(law.Gamma)/magnitude(law.Alpha)*ohms)
		}
	}
	return largest
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
