// Package sparse solves square systems of linear equations whose matrices are mostly zero, over real and complex numbers.
//
// The work is split as the data changes: a Pattern is where entries may stand, Analyze orders it once, LU.Factor chooses
// pivots for a matrix, LU.Refactor does the same elimination again for other values without looking for pivots and
// without allocating. The methods are those of Davis, "Direct Methods for Sparse Linear Systems" (SIAM 2006), and of the
// papers named at each function; the code is our own.
//
// Letters, as in that book: A x = b is the system, L and U its factors with
//
//	L·U = P·A·Q,
//
// L with a unit diagonal that is not stored, p an index into the stored entries of a column, i a row, j and k columns.
// The numbers carry no units here.
//
// Wrong lengths are mistakes of the caller and panic; singular matrices are data and come back as *Singular.
package sparse

import "math"

// Scalar is the type of the entries.
type Scalar interface{ float64 | complex128 }

const errLength = "sparse: length does not match the matrix"

// Magnitude is |x| of a real number and |Re x| + |Im x| of a complex one: within √2 of |x|, and much cheaper.
func Magnitude[T Scalar](x T) float64 {
	switch x := any(x).(type) {
	case float64:
		return math.Abs(x)
	case complex128:
		return math.Abs(real(x)) + math.Abs(imag(x))
	}
	return 0
}

// Scaled is x times a real factor.
func Scaled[T Scalar](x T, factor float64) T {
	switch x := any(x).(type) {
	case float64:
		return any(x * factor).(T)
	case complex128:
		return any(complex(real(x)*factor, imag(x)*factor)).(T)
	}
	return x
}

// carve takes the next n numbers from a block, so that many slices cost one allocation.
func carve(block *[]int, n int) []int {
	part := (*block)[:n:n]
	*block = (*block)[n:]
	return part
}
