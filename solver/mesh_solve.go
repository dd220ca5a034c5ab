package solver

import (
	"context"
	"math"

	"loopwright/solver/sparse"
	"loopwright/solver/wide"
)

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
