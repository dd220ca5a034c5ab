package quantity_test

import (
	"flag"
	"fmt"
	"math"
	"math/big"
	"os"
	"strings"
	"testing"

	"loopwright/schematic/quantity"

	"pgregory.net/rapid"
)

// units lists every unit of the package.
var units = []quantity.Unit{
	quantity.None, quantity.Volt, quantity.Ampere, quantity.Ohm, quantity.Siemens, quantity.Watt, quantity.VoltAmpere, quantity.Farad,
	quantity.Henry, quantity.Hertz, quantity.Second, quantity.Metre, quantity.SquareMillimetre, quantity.Gauge, quantity.Celsius,
	quantity.Percent, quantity.Degree, quantity.FaradPerKilometre, quantity.Var,
}

func TestMain(m *testing.M) {
	for name, value := range map[string]string{"rapid.seed": "60062", "rapid.checks": "2000", "rapid.nofailfile": "true"} {
		if err := flag.Set(name, value); err != nil {
			fmt.Fprintln(os.Stderr, err)
			os.Exit(2)
		}
	}
	os.Exit(m.Run())
}

// finite draws any finite float64: of a size that people work with, or of any bits.
func finite() *rapid.Generator[float64] {
	bits := rapid.Map(rapid.Uint64(), math.Float64frombits)
	whatever := bits.Filter(func(value float64) bool { return !math.IsNaN(value) && !math.IsInf(value, 0) })
	return rapid.OneOf(rapid.Float64Range(-1e6, 1e6), rapid.Map(rapid.IntRange(-5000, 5000), func(n int) float64 { return float64(n) / 100 }), whatever)
}

func TestEveryFiniteValueIsReadBackExactly(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		value, unit := finite().Draw(t, "value"), rapid.SampledFrom(units).Draw(t, "unit")
		text := quantity.Exact(value, unit)
		got, err := quantity.Parse(text, unit)
		if err != nil {
			t.Fatal(err)
		}
		if got != value {
			t.Fatalf("%v is written %q and read back as %v", value, text, got)
		}
	})
}

// The reference is the exact rational arithmetic of math/big.
func TestFormatIsOffByLessThanHalfOfItsLastDigit(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		value, unit := finite().Draw(t, "value"), rapid.SampledFrom(units).Draw(t, "unit")
		digits := rapid.IntRange(1, 17).Draw(t, "digits")
		text := quantity.Format(value, unit, digits)
		got, err := quantity.Parse(text, unit)
		if math.Abs(value) > 9e307 || err != nil && math.Abs(value) < 1e-322 {
			return // the rounded decimal may lie outside what a float64 holds
		}
		if err != nil {
			t.Fatal(err)
		}
		size := new(big.Rat).SetFloat64(math.Abs(value))
		off := new(big.Rat).Sub(new(big.Rat).SetFloat64(got), new(big.Rat).SetFloat64(value))
		// Half a unit of the last digit is at most 5·10^−digits of the value; reading rounds once more.
		most := new(big.Rat).Mul(size, new(big.Rat).SetFloat64(5*math.Pow10(-digits)*(1+1e-9)+0x1p-53))
		most.Add(most, new(big.Rat).SetFloat64(5e-324))
		if off.Abs(off).Cmp(most) > 0 {
			t.Fatalf("%v with %d digits is written %q", value, digits, text)
		}
	})
}

// The reference is math/big, which rounds the exact decimal once.
func TestAPrefixShiftsTheDecimalMarkAndRoundsNothing(t *testing.T) {
	prefixes := map[string]string{"p": "e-12", "n": "e-9", "µ": "e-6", "m": "e-3", "": "", "k": "e3", "M": "e6", "G": "e9", "T": "e12"}
	names := []string{"p", "n", "µ", "m", "", "k", "M", "G", "T"}
	rapid.Check(t, func(t *rapid.T) {
		whole, fraction := rapid.StringMatching(`[0-9]{1,9}`).Draw(t, "whole"), rapid.StringMatching(`[0-9]{1,12}`).Draw(t, "fraction")
		prefix := rapid.SampledFrom(names).Draw(t, "prefix")
		exact, ok := new(big.Rat).SetString(whole + "." + fraction + prefixes[prefix])
		if !ok {
			t.Fatal("the reference cannot be read")
		}
		want, _ := exact.Float64()
		texts := []string{whole + "." + fraction + " " + prefix + "F"}
		if prefix != "" {
			texts = append(texts, whole+prefix+fraction, whole+"."+fraction+prefix)
		}
		for _, text := range texts {
			if got, err := quantity.Parse(text, quantity.Farad); err != nil || got != want {
				t.Fatalf("%q is read as %v (%v), want %v", text, got, err, want)
			}
		}
	})
}

func FuzzParse(f *testing.F) {
	for _, text := range []string{
		"4k7", "R47", "24 V", "−5 °C", "0,75 mm²", "1/0 AWG", "AWG 18", "1e-3", "80m", "80 mm", "5 min", "1,000", "NaN", "12 apples", "∞", "4µ7", "3V3",
	} {
		for i := range units {
			f.Add(text, uint8(i))
		}
	}
	f.Fuzz(func(t *testing.T, text string, index uint8) {
		unit := units[int(index)%len(units)]
		value, err := quantity.Parse(text, unit)
		if err != nil {
			if says := err.Error(); strings.ContainsAny(says, "\n\r") || !strings.Contains(says, ": write ") {
				t.Fatalf("the error is no plain sentence: %q", says)
			}
			return
		}
		if math.IsNaN(value) || math.IsInf(value, 0) {
			t.Fatalf("%q is read as %v", text, value)
		}
		again, err := quantity.Parse(quantity.Exact(value, unit), unit)
		if err != nil || again != value {
			t.Fatalf("%q is read as %v, written %q and read back as %v (%v)", text, value, quantity.Exact(value, unit), again, err)
		}
	})
}
