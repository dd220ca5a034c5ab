package sparse

import (
	"context"
	"errors"
	"math"

	"loopwright/solver/wide"
)

const (
	// refinementSteps bounds the number of solutions with the same factors.
	refinementSteps = 20
	// settledChange is the expected next change, relative to a value, from which on the value counts as settled. The
	// changes shrink in proportion, so it is the last change times the rate at which they shrink.
	settledChange = 0x1p-80
	// negligible is how small a value must be against the largest, or against the right side, to be nothing but what other
	// values leave when they cancel. It is not asked to settle.
	negligible = 0x1p-100
	// stalledChange and stalledNegligible are what is accepted instead when the changes no longer shrink, because the
	// remainder itself has been rounded.
	stalledChange     = 0x1p-44
	stalledNegligible = 0x1p-66
	// stalledRate is the least reduction of the largest change from step to step.
	stalledRate = 0.25
)

// SolveSystem factorises a matrix and refines the solution with what refine does, until that converges: first with the
// pivots of the matrix before, then with lenient and at last with strict pivoting. It reports false when none does: the
// matrix is singular to rounding. The error is that of ctx.
//
// Where a pivot may be nothing but what rounding has left of zero, the right side may still happen to fit. Then another
// right side must converge too.
func (f *LU[T]) SolveSystem(ctx context.Context, a *Matrix[T], refine func() Refinement) (bool, error) {
	if f.Refactor(a) && refine().Converged && f.sound(a) {
		return true, nil
	}
	for _, threshold := range [2]float64{Lenient, Strict} {
		var singular *Singular
		err := f.Factor(ctx, a, threshold)
		if err == nil && refine().Converged && f.sound(a) {
			return true, nil
		}
		if err != nil && !errors.As(err, &singular) {
			return false, err
		}
	}
	return false, nil
}

// sound reports whether no pivot is in doubt, or a right side that fits no special matrix converges all the same.
func (f *LU[T]) sound(a *Matrix[T]) bool {
	if !f.doubtful {
		return true
	}
	x, b := make([]wide.Number[T], a.N), make([]T, a.N)
	unruly(b)
	return f.SolveRefined(a, x, b).Converged
}

// unruly fills a vector with values between 1 and 2 that follow no pattern, from a linear congruential generator.
func unruly[T Scalar](b []T) {
	var one T = 1
	state := uint64(1)
	for i := range b {
		state = state*6364136223846793005 + 1442695040888963407
		b[i] = Scaled(one, 1+float64(state>>11)/(1<<53))
	}
}

// Refinement says how an iterative refinement went.
type Refinement struct {
	Steps     int
	Converged bool    // every value has settled
	Size      float64 // the largest of the values and of what the right side is made of
	Error     float64 // estimate of what the values are still off by at most: a multiple of the rounding of the remainder
}

// SolveRefined solves A·x = b to the last digit of x and beyond: see Refine.
func (f *LU[T]) SolveRefined(a *Matrix[T], x []wide.Number[T], b []T) Refinement {
	if f.sum == nil {
		f.sum = make([]wide.Number[T], f.symbolic.Pattern.N)
	}
	size := 0.0
	for _, bi := range b {
		size = max(size, Magnitude(bi))
	}
	return f.Refine(x, size, func(r []T) { a.residual(r, b, x, f.sum) })
}

// Refine solves a system whose matrix is nearly that of the factors and whose right side is made of terms up to size.
// residual must write what the right side has over the left at the present x, computed with twice the digits and then
// rounded; Refine adds the solution for that remainder to x, beginning with x = 0, until x has settled. Then x is the solution of the system as it is
// stored, not only of one nearby, however far apart its entries are: Demmel, Hida, Kahan, Li, Mukherjee and Riedy, "Error
// bounds from extra-precise iterative refinement", ACM Transactions on Mathematical Software 32 (2006). It does not
// converge when the matrix is singular to rounding or the factors are bad.
func (f *LU[T]) Refine(x []wide.Number[T], size float64, residual func(r []T)) Refinement {
	if f.remainder == nil {
		f.remainder = make([]T, f.symbolic.Pattern.N)
	}
	r := f.remainder
	clear(x)
	before := math.Inf(1)
	for step := 1; step <= refinementSteps; step++ {
		residual(r)
		f.Solve(r, r)
		change, largest := 0.0, size
		for i, ri := range r {
			x[i] = x[i].Add(ri)
			change = max(change, Magnitude(ri))
			largest = max(largest, Magnitude(x[i].Value))
		}
		if change <= negligible*largest {
			return Refinement{Steps: step, Converged: !math.IsInf(largest, 0), Size: largest, Error: change}
		}
		if step > 1 {
			rate := change / before
			if !(rate <= stalledRate) {
				converged := settled(x, r, stalledChange, stalledNegligible*largest)
				return Refinement{Steps: step, Converged: converged, Size: largest, Error: change}
			}
			if settled(x, r, settledChange/rate, negligible*largest) {
				return Refinement{Steps: step, Converged: true, Size: largest, Error: rate * change}
			}
		}
		before = change
	}
	return Refinement{Steps: refinementSteps, Size: math.Inf(1), Error: before}
}

// settled reports whether every value has last changed by no more than a part of itself, or by next to nothing.
func settled[T Scalar](x []wide.Number[T], change []T, part, nothing float64) bool {
	for i := range x {
		if !(Magnitude(change[i]) <= max(part*Magnitude(x[i].Value), nothing)) {
			return false
		}
	}
	return true
}

// residual writes b − A·x to r. sum is scratch.
func (a *Matrix[T]) residual(r, b []T, x, sum []wide.Number[T]) {
	for i, bi := range b {
		sum[i] = wide.Of(bi)
	}
	for j := range x {
		xj := x[j]
		if xj.Value == 0 {
			continue
		}
		for p := a.Start[j]; p < a.Start[j+1]; p++ {
			if value := a.Value[p]; value != 0 {
				i := a.Row[p]
				sum[i] = sum[i].Minus(xj.Times(value))
			}
		}
	}
	for i := range sum {
		r[i] = sum[i].Round()
	}
}

// BackwardError gives the componentwise backward error
//
//	ω = max |b − A·x|_i / (|A|·|x| + |b|)_i
//
// x solves a system whose entries differ from those of A and b by no more than the relative amount ω (Oettli and Prager,
// "Compatibility of approximate solution of linear equations", Numerische Mathematik 6, 1964).
func (a *Matrix[T]) BackwardError(x, b []T) float64 {
	if len(x) != a.N || len(b) != a.N {
		panic(errLength)
	}
	r, scale := make([]T, a.N), make([]float64, a.N)
	for i, bi := range b {
		r[i], scale[i] = bi, Magnitude(bi)
	}
	for j, xj := range x {
		for p := a.Start[j]; p < a.Start[j+1]; p++ {
			i := a.Row[p]
			r[i] -= a.Value[p] * xj
			scale[i] += Magnitude(a.Value[p]) * Magnitude(xj)
		}
	}
	omega := 0.0
	for i, ri := range r {
		if size := Magnitude(ri); size > 0 {
			omega = max(omega, size/scale[i])
		}
	}
	return omega
}
