package quantity

import (
	"math"
	"math/cmplx"
)

// Phasor writes a complex quantity: a real one as Format does, any other as its magnitude and its angle in degrees to a
// tenth, "23.97 V ∠−36.9°".
func Phasor(value complex128, unit Unit, digits int) string {
	if imag(value) == 0 {
		return Format(real(value), unit, digits)
	}
	var buffer [64]byte
	out := Append(buffer[:0], cmplx.Abs(value), unit, digits)
	out = append(out, " ∠"...)
	tenths := math.Round(cmplx.Phase(value) * 1800 / math.Pi)
	return string(Append(out, tenths/10+0, Degree, 4))
}
