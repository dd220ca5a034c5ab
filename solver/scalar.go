package solver

import (
	"math"
	"math/cmplx"

	"loopwright/solver/sparse"
)

// epsilon is the distance from 1 to the next larger float64.
const epsilon = 0x1p-52

// magnitude is |x| up to a factor of √2, for estimates.
func magnitude[T Scalar](x T) float64 { return sparse.Magnitude(x) }

// modulus is |x|.
func modulus[T Scalar](x T) float64 {
	switch x := any(x).(type) {
	case float64:
		return math.Abs(x)
	case complex128:
		return cmplx.Abs(x)
	}
	return 0
}

// conjugate is x with the sign of its imaginary part turned.
func conjugate[T Scalar](x T) T {
	if z, ok := any(x).(complex128); ok {
		return any(cmplx.Conj(z)).(T)
	}
	return x
}

// asComplex gives x as a complex number.
func asComplex[T Scalar](x T) complex128 {
	switch x := any(x).(type) {
	case float64:
		return complex(x, 0)
	case complex128:
		return x
	}
	return 0
}

// signed is x for a sense of +1 and −x for −1.
func signed[T Scalar](sense int, x T) T {
	if sense < 0 {
		return -x
	}
	return x
}

// exponent is the power of two next below |x|. x must not be zero.
func exponent[T Scalar](x T) int {
	_, e := math.Frexp(magnitude(x))
	return e - 1
}

// scalar gives a real number as T.
func scalar[T Scalar](x float64) T {
	var zero T
	switch any(zero).(type) {
	case float64:
		return any(x).(T)
	default:
		return any(complex(x, 0)).(T)
	}
}

// scaled is x times a real factor.
func scaled[T Scalar](x T, factor float64) T { return sparse.Scaled(x, factor) }

// orZero is x, or 0 when |x| is not above the limit.
func orZero[T Scalar](x T, limit float64) T {
	if magnitude(x) <= limit {
		return 0
	}
	return x
}

// dropSignOfZero turns −0 into 0, also in the parts of complex numbers, so that it is never printed.
func dropSignOfZero[T Scalar](values []T) {
	var zero T
	for k := range values {
		values[k] += zero
	}
}
