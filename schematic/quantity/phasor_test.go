package quantity_test

import (
	"math/cmplx"
	"testing"

	"loopwright/schematic/quantity"
)

func TestPhasorsAreWrittenWithTheirAngle(t *testing.T) {
	for _, c := range []struct {
		value complex128
		want  string
	}{
		{24, "24.00 V"},
		{-24, "−24.00 V"},
		{3 + 4i, "5.000 V ∠53.1°"}, // the 3-4-5 triangle
		{3 - 4i, "5.000 V ∠−53.1°"},
		{2i, "2.000 V ∠90°"},
		{cmplx.Rect(230, 1e-9), "230.0 V ∠0°"},
	} {
		if got := quantity.Phasor(c.value, quantity.Volt, 4); got != c.want {
			t.Errorf("%v is written %q, want %q", c.value, got, c.want)
		}
	}
}
