// Package wide adds and multiplies with about twice the digits of float64, so that sums whose terms cancel keep theirs.
//
// A number is the unevaluated sum of two: its value rounded, and what the rounding left. The methods are those of Dekker,
// "A floating-point technique for extending the available precision", Numerische Mathematik 18 (1971), and Ogita, Rump
// and Oishi, "Accurate sum and dot product", SIAM Journal on Scientific Computing 26 (2005). Complex numbers are treated
// part by part. Results are wrong where parts overflow or underflow.
package wide

import "math"

// Scalar is the type that is doubled.
type Scalar interface{ float64 | complex128 }

// Number is Value + Rest, with Rest no larger than the rounding of Value.
type Number[T Scalar] struct{ Value, Rest T }

// Of gives x as a wide number.
func Of[T Scalar](x T) Number[T] { return Number[T]{Value: x} }

// Round gives the nearest single number, near enough.
func (a Number[T]) Round() T { return a.Value + a.Rest }

// Plus is a + b.
func (a Number[T]) Plus(b Number[T]) Number[T] {
	sum, rest := twoSum(a.Value, b.Value)
	return settle(sum, rest+(a.Rest+b.Rest))
}

// Minus is a − b.
func (a Number[T]) Minus(b Number[T]) Number[T] {
	return a.Plus(b.Signed(-1))
}

// Signed is a for a sense that is not negative, and −a for one that is.
func (a Number[T]) Signed(sense int) Number[T] {
	if sense < 0 {
		return Number[T]{-a.Value, -a.Rest}
	}
	return a
}

// Add is a + x.
func (a Number[T]) Add(x T) Number[T] {
	sum, rest := twoSum(a.Value, x)
	return settle(sum, rest+a.Rest)
}

// Times is a·x.
func (a Number[T]) Times(x T) Number[T] {
	product := Product(a.Value, x)
	return settle(product.Value, product.Rest+a.Rest*x)
}

// Product is x·y without rounding for real numbers, and rounded as a wide number for complex ones.
func Product[T Scalar](x, y T) Number[T] {
	switch x := any(x).(type) {
	case float64:
		y := any(y).(float64)
		value, rest := twoProduct(x, y)
		return any(Number[float64]{value, rest}).(Number[T])
	case complex128:
		y := any(y).(complex128)
		realPart := difference(real(x), real(y), imag(x), imag(y))
		imaginaryPart := difference(real(x), imag(y), -imag(x), real(y))
		return any(Number[complex128]{
			complex(realPart.Value, imaginaryPart.Value),
			complex(realPart.Rest, imaginaryPart.Rest),
		}).(Number[T])
	}
	panic("wide: not a number")
}

// difference is a·b − c·d.
func difference(a, b, c, d float64) Number[float64] {
	ab, restAB := twoProduct(a, b)
	cd, restCD := twoProduct(-c, d)
	sum, rest := twoSum(ab, cd)
	return settle(sum, rest+(restAB+restCD))
}

// twoSum gives the rounded sum and its rounding error (Knuth, The Art of Computer Programming, volume 2, section 4.2.2).
func twoSum[T Scalar](a, b T) (sum, rest T) {
	sum = a + b
	part := sum - a
	return sum, (a - (sum - part)) + (b - part)
}

// settle is twoSum where |b| is not larger than |a|.
func settle[T Scalar](a, b T) Number[T] {
	sum := a + b
	return Number[T]{sum, b - (sum - a)}
}

// twoProduct gives the rounded product and its rounding error.
func twoProduct(x, y float64) (product, rest float64) {
	product = x * y
	return product, math.FMA(x, y, -product)
}
