package solver

import (
	"context"
	"math"

	"loopwright/solver/sparse"
	"loopwright/solver/wide"
)

// nodalSystem is the second method: node analysis with the current of every branch as a further unknown. Equation k < N
// is Kirchhoff's current law at node k, with the node voltage k as its unknown; equation N+b is the law of branch b with
// its current as unknown. One node of each piece that hangs together by more than current sources is set to 0 V instead
// of its current law, which follows from those of the others.
//
// Currents stay unknowns of their own, since eliminating the current of a closed contact loses as many digits as its
// resistance is smaller than that of its neighbours.
type nodalSystem[T Scalar] struct {
	network  *Network[T]
	branches int
	symbolic *sparse.Symbolic
	slot     []int
	matrix   *sparse.Matrix[T]
	factor   *sparse.LU[T]
	right    []T
	x        []wide.Number[T]
	current  []T
	zero     float64 // what is nothing but rounding, V
	ground   []bool
}

func newNodalSystem[T Scalar](ctx context.Context, n *Network[T], laws []Law[T]) (*nodalSystem[T], error) {
	s := &nodalSystem[T]{network: n, branches: len(laws)}
	s.allocate()
	places := n.Nodes + 5*len(laws)
	for b := range laws {
		places += 3 * len(laws[b].Terms)
	}
	rows, columns := make([]int, 0, places), make([]int, 0, places)
	s.stamp(laws, 1, func(row, column int, _ T) {
		rows, columns = append(rows, row), append(columns, column)
	})
	// A node voltage has no coefficient in its current law before the current of a branch is eliminated, and the current of
	// an ideal source none in its law before a node voltage is.
	waiting := make([]bool, n.Nodes+len(laws))
	for k := range waiting {
		waiting[k] = k < n.Nodes || laws[k-n.Nodes].Alpha == 0
	}
	pattern, slot := sparse.NewPattern(n.Nodes+len(laws), rows, columns)
	symbolic, err := sparse.Analyze(ctx, pattern, waiting)
	if err != nil {
		return nil, err
	}
	s.slot, s.symbolic = slot, symbolic
	s.matrix, s.factor = sparse.NewMatrix[T](pattern), sparse.NewLU[T](symbolic)
	return s, nil
}

// allocate gives the system memory of its own for all but the matrix.
func (s *nodalSystem[T]) allocate() {
	size := s.network.Nodes + s.branches
	s.right, s.x = make([]T, size), make([]wide.Number[T], size)
	s.ground, s.current = make([]bool, s.network.Nodes), make([]T, s.branches)
}

// fork is a system of the same layout with memory of its own.
func (s *nodalSystem[T]) fork() *nodalSystem[T] {
	fork := *s
	fork.allocate()
	fork.matrix, fork.factor = sparse.NewMatrix[T](s.symbolic.Pattern), sparse.NewLU[T](s.symbolic)
	return &fork
}

// chooseGrounds marks the lowest node of each piece of the graph without independent current sources.
func (s *nodalSystem[T]) chooseGrounds(laws []Law[T]) {
	parent := make([]int, s.network.Nodes)
	for node := range parent {
		parent[node] = node
	}
	find := func(node int) int {
		for parent[node] != node {
			parent[node] = parent[parent[node]]
			node = parent[node]
		}
		return node
	}
	for b, law := range laws {
		if law.Beta == 0 && !law.controlled() {
			continue
		}
		from, to := find(s.network.Branches[b].From), find(s.network.Branches[b].To)
		parent[max(from, to)] = min(from, to)
	}
	for node := range parent {
		s.ground[node] = parent[node] == node
	}
}

// stamp gives the entries of the matrix, with currents in units of 1 V / ohms.
func (s *nodalSystem[T]) stamp(laws []Law[T], ohms float64, put func(row, column int, value T)) {
	nodes := s.network.Nodes
	for node, ground := range s.ground {
		if ground {
			put(node, node, 1)
		} else {
			put(node, node, 0)
		}
	}
	for b := range laws {
		law, row := &laws[b], nodes+b
		from, to := s.network.Branches[b].From, s.network.Branches[b].To
		put(from, row, s.flow(from, 1))
		put(to, row, s.flow(to, -1))
		largest := max(magnitude(law.Alpha)/ohms, magnitude(law.Beta))
		for _, term := range law.Terms {
			largest = max(largest, magnitude(term.Alpha)/ohms, magnitude(term.Beta))
		}
		scale := math.Ldexp(1, -exponent(largest))
		s.stampLaw(row, b, scaled(law.Alpha, scale/ohms), scaled(law.Beta, scale), put)
		for _, term := range law.Terms {
			s.stampLaw(row, term.Branch, scaled(term.Alpha, scale/ohms), scaled(term.Beta, scale), put)
		}
		s.right[row] = scaled(law.Gamma, scale)
	}
}

func (s *nodalSystem[T]) flow(node int, sign float64) T {
	if s.ground[node] {
		return 0
	}
	return scalar[T](sign)
}

// stampLaw puts alpha·j + beta·u of a branch into a row.
func (s *nodalSystem[T]) stampLaw(row, b int, alpha, beta T, put func(row, column int, value T)) {
	put(row, s.network.Nodes+b, alpha)
	put(row, s.network.Branches[b].From, beta)
	put(row, s.network.Branches[b].To, -beta)
}

// solve finds the node voltages, with 0 V somewhere in each piece, and the branch currents. It reports false when the
// equations are singular to rounding. The error is that of ctx.
func (s *nodalSystem[T]) solve(ctx context.Context, laws []Law[T]) (bool, error) {
	ohms := typicalImpedance(laws)
	s.chooseGrounds(laws)
	s.matrix.Zero()
	next := 0
	s.stamp(laws, ohms, func(_, _ int, value T) {
		s.matrix.Value[s.slot[next]] += value
		next++
	})
	solved, err := s.factor.SolveSystem(ctx, s.matrix, func() sparse.Refinement {
		refinement := s.factor.SolveRefined(s.matrix, s.x, s.right)
		s.zero = zeroBelow(refinement)
		return refinement
	})
	for b := range s.current {
		s.current[b] = scaled(orZero(s.x[s.network.Nodes+b].Round(), s.zero), 1/ohms)
	}
	return solved, err
}

// voltage is the voltage between two nodes.
func (s *nodalSystem[T]) voltage(from, to int) T {
	total := magnitude(s.x[from].Value) + magnitude(s.x[to].Value)
	return orZero(s.x[from].Minus(s.x[to]).Round(), max(negligible*total, s.zero))
}
