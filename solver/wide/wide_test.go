package wide_test

import (
	"math/big"
	"math/rand/v2"
	"testing"

	"loopwright/solver/wide"
)

// exact gives a number as a rational, from the standard library's arithmetic without rounding.
func exact(n wide.Number[float64]) *big.Rat {
	value, rest := new(big.Rat), new(big.Rat)
	value.SetFloat64(n.Value)
	rest.SetFloat64(n.Rest)
	return value.Add(value, rest)
}

func rational(x float64) *big.Rat { return new(big.Rat).SetFloat64(x) }

// far reports whether two rationals differ by more than 2⁻¹⁰⁰ of scale.
func far(got, want, scale *big.Rat) bool {
	difference := new(big.Rat).Sub(got, want)
	limit := new(big.Rat).Mul(new(big.Rat).Abs(scale), new(big.Rat).SetFrac(big.NewInt(1), new(big.Int).Lsh(big.NewInt(1), 100)))
	return difference.Abs(difference).Cmp(limit) > 0
}

func TestRealProductsAreExact(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 1))
	for range 1000 {
		x, y := random.NormFloat64(), random.NormFloat64()*1e6
		want := new(big.Rat).Mul(rational(x), rational(y))
		if got := exact(wide.Product(x, y)); got.Cmp(want) != 0 {
			t.Fatalf("%g·%g: got %v, want %v", x, y, got, want)
		}
	}
}

func TestSumsKeepAboutTwiceTheDigits(t *testing.T) {
	random := rand.New(rand.NewPCG(2, 2))
	for range 1000 {
		var sum wide.Number[float64]
		want, scale := new(big.Rat), new(big.Rat)
		for range 20 {
			x, y := random.NormFloat64(), random.NormFloat64()
			term := wide.Product(x, y)
			sum = sum.Plus(term).Add(x).Minus(wide.Of(y).Times(x))
			want.Add(want, rational(x))
			scale.Add(scale, rational(3+x*x+y*y))
		}
		if far(exact(sum), want, scale) {
			t.Fatalf("got %v, want %v", exact(sum), want)
		}
	}
}

func TestSmallTermsSurviveBesideLargeOnes(t *testing.T) {
	sum := wide.Of(1e16).Add(0.125).Add(-1e16)
	if sum.Round() != 0.125 {
		t.Errorf("1e16 + 0.125 − 1e16 = %g", sum.Round())
	}
	plain := 1e16
	plain += 0.125
	if plain-1e16 == 0.125 {
		t.Error("plain arithmetic keeps the term too: the case shows nothing")
	}
}

func TestComplexProductsCancelWithoutLoss(t *testing.T) {
	random := rand.New(rand.NewPCG(3, 3))
	for range 1000 {
		x := complex(random.NormFloat64(), random.NormFloat64())
		y := complex(random.NormFloat64(), random.NormFloat64())
		got := wide.Product(x, y)
		want := new(big.Rat).Sub(
			new(big.Rat).Mul(rational(real(x)), rational(real(y))),
			new(big.Rat).Mul(rational(imag(x)), rational(imag(y))))
		if far(exact(wide.Number[float64]{Value: real(got.Value), Rest: real(got.Rest)}), want, rational(4)) {
			t.Fatalf("real part of %v·%v: got %v, want %v", x, y, got, want)
		}
		want = new(big.Rat).Add(
			new(big.Rat).Mul(rational(real(x)), rational(imag(y))),
			new(big.Rat).Mul(rational(imag(x)), rational(real(y))))
		if far(exact(wide.Number[float64]{Value: imag(got.Value), Rest: imag(got.Rest)}), want, rational(4)) {
			t.Fatalf("imaginary part of %v·%v: got %v, want %v", x, y, got, want)
		}
	}
}
