package solver

import (
	"errors"
	"slices"

	"loopwright/solver/wide"
)

// Response is how the values of a solved network change with Gamma of one branch: the derivatives of all currents and
// voltages, in the units that follow from those of the law. Floating values have none and stand as 0.
type Response[T Scalar] struct {
	Mesh, Current, Voltage, Node []T
}

var errNotSolved = errors.New("there is no solution to start from: solve the network with this plan first")

// Respond gives the response to Gamma of a branch around the plan's last solution, with the factors of that solution.
// It costs about as much as solving triangular systems twice. The error says that the last solve failed.
func (p *Plan[T]) Respond(b int) (*Response[T], error) {
	if p.last == nil {
		return nil, errNotSolved
	}
	s := p.last
	right := make([]T, len(s.x))
	if r := s.row[b]; r >= 0 {
		row := len(p.network.Meshes) + r
		right[row] = scalar[T](s.scale[row])
	} else {
		through, senses := s.through.of(b)
		for k, m := range through {
			right[m] -= scalar[T](float64(senses[k]) * s.scale[m])
		}
	}
	x := make([]wide.Number[T], len(right))
	refinement := s.factor.SolveRefined(s.matrix, x, right)
	solved, zero := s.x, s.zero
	s.x, s.zero = x, zeroBelow(refinement)
	response := p.response(s, b)
	s.x, s.zero = solved, zero
	return response, nil
}

// response turns the change of the unknowns into that of all values.
func (p *Plan[T]) response(s *meshSystem[T], b int) *Response[T] {
	n := p.network
	response := &Response[T]{
		Mesh: make([]T, len(n.Meshes)), Current: make([]T, len(s.row)), Voltage: make([]T, len(s.row)), Node: make([]T, n.Nodes),
	}
	for m := range response.Mesh {
		response.Mesh[m] = scaled(orZero(s.x[m].Round(), s.zero), 1/s.ohms)
	}
	for k := range s.row {
		if p.split.cut[k] {
			continue
		}
		j, _ := s.currentOrZero(k)
		response.Current[k] = scaled(j, 1/s.ohms)
		if r := s.row[k]; r >= 0 {
			response.Voltage[k] = orZero(s.x[len(n.Meshes)+r].Round(), s.zero)
		} else {
			response.Voltage[k] = -p.laws[k].Alpha * response.Current[k]
		}
	}
	if s.row[b] < 0 {
		response.Voltage[b] += 1
	}
	p.walk.without = p.split.cut
	p.addUp(response.Node, response.Voltage)
	return response
}

// Reading is what a meter would show: the current of a branch from From to To, the voltage of a branch, or the voltage of
// one node against another.
type Reading struct {
	Quantity Quantity
	Branch   int // of BranchCurrent and BranchVoltage
	From, To int // nodes, of NodeVoltage: v(From) − v(To)
}

// Quantity tells what is read.
type Quantity int

// The quantities.
const (
	BranchCurrent Quantity = iota // A
	BranchVoltage                 // V
	NodeVoltage                   // V
)

// Gradient gives the derivatives of one reading with respect to Gamma of every branch, around the plan's last solution, by
// one solution of the transposed system: the adjoint method (Director and Rohrer, "The generalized adjoint network and
// network sensitivities", IEEE Transactions on Circuit Theory 16, 1969). With g the derivative for a branch, j its
// current and u its voltage, the reading changes with the other parts of the branch's law by
//
//	∂/∂Alpha = −g·j,   ∂/∂Beta = −g·u,
//
// so that for u − Z·j = E the derivative with respect to Z is g·j. A reading that floats has the gradient zero.
func (p *Plan[T]) Gradient(reading Reading) ([]T, error) {
	if p.last == nil {
		return nil, errNotSolved
	}
	s := p.last
	weight := make([]T, len(s.x))
	gradient := make([]T, len(s.row))
	switch reading.Quantity {
	case BranchCurrent:
		s.weighCurrent(weight, reading.Branch, 1)
	case BranchVoltage:
		p.weighVoltage(weight, gradient, reading.Branch, 1)
	default:
		for _, step := range p.pathBetween(reading.From, reading.To) {
			p.weighVoltage(weight, gradient, step.Branch, scalar[T](float64(step.Sense)))
		}
	}
	s.factor.SolveTransposed(weight, weight)
	for b := range gradient {
		switch r := s.row[b]; {
		case p.split.gauge[b]:
		case r >= 0:
			row := len(p.network.Meshes) + r
			gradient[b] += scaled(weight[row], s.scale[row])
		default:
			through, senses := s.through.of(b)
			for k, m := range through {
				gradient[b] -= scaled(weight[m], float64(senses[k])*s.scale[m])
			}
		}
	}
	return gradient, nil
}

// weighCurrent adds factor times the current of a branch to a linear form of the unknowns.
func (s *meshSystem[T]) weighCurrent(weight []T, b int, factor T) {
	through, senses := s.through.of(b)
	for k, m := range through {
		weight[m] += scaled(factor, float64(senses[k])/s.ohms)
	}
}

// weighVoltage adds factor times the voltage of a branch; what depends on Gamma directly goes to gradient.
func (p *Plan[T]) weighVoltage(weight, gradient []T, b int, factor T) {
	s := p.last
	if p.split.cut[b] {
		return
	}
	if r := s.row[b]; r >= 0 {
		weight[len(p.network.Meshes)+r] += factor
		return
	}
	s.weighCurrent(weight, b, -factor*p.laws[b].Alpha)
	gradient[b] += factor
}

// pathBetween gives the steps from one node to another through what conducts, none when they are in different pieces.
func (p *Plan[T]) pathBetween(from, to int) []Step {
	if p.split.of[from] != p.split.of[to] {
		return nil
	}
	p.walk.without = p.split.cut
	p.walk.from(from)
	return p.walk.pathTo(to)
}

// lostDigits is how far the terms of a sum may cancel before WithLaw does not trust it.
const lostDigits = 1e-9

// WithLaw gives the solution of the network in which one branch has another law, without Terms, from the plan's last
// solution and the response to that branch: a change of rank one (Sherman and Morrison, Annals of Mathematical Statistics
// 21, 1950; Householder, "Principles of Numerical Analysis", 1953). It reports false where that is not possible because the
// change joins or separates pieces of the network, leaves it without unique solution, or would lose too many digits: then
// SolveUnaudited says what is the matter. The solution is not audited.
func (p *Plan[T]) WithLaw(last *Solution[T], b int, law Law[T], response *Response[T]) (*Solution[T], bool) {
	if p.last == nil || law.controlled() || p.split.cut[b] {
		return nil, false
	}
	laws := slices.Clone(last.Laws)
	laws[b] = law
	split := findPieces(p.network, laws)
	if split.count != p.split.count || findProblem(p.network, laws, split) != nil {
		return nil, false
	}
	alpha, beta := law.Alpha*response.Current[b], law.Beta*response.Voltage[b]
	if magnitude(alpha+beta) <= lostDigits*(magnitude(alpha)+magnitude(beta)) {
		return nil, false
	}
	change := (law.Gamma - law.Alpha*last.Current[b] - law.Beta*last.Voltage[b]) / (alpha + beta)
	next := *last
	next.Mesh = moved(last.Mesh, response.Mesh, change)
	next.Current = moved(last.Current, response.Current, change)
	next.Voltage = moved(last.Voltage, response.Voltage, change)
	next.Node = moved(last.Node, response.Node, change)
	next.Laws = laws
	next.Supermeshes = supermeshes(p.network, p.through, next.Laws)
	next.Audit, next.Timing = Audit{}, Timing{}
	return &next, true
}

// moved is from + by·direction; what cancels to rounding is zero.
func moved[T Scalar](from, direction []T, by T) []T {
	to := make([]T, len(from))
	for k := range to {
		step := by * direction[k]
		to[k] = orZero(from[k]+step, 64*epsilon*magnitude(step))
	}
	return to
}
