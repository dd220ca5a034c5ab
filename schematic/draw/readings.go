package draw

import (
	"math"
	"math/cmplx"
	"strconv"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/kinds"
	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
	"loopwright/schematic/trace"
)

// digits is how many significant digits a value on the sheet has.
const digits = 4

// negligible is the share of the largest value of a case below which a value is only rounding, and shown as zero.
const negligible = 1e-12

// scale holds the largest values of a case, which say what is only rounding.
type scale struct {
	volts, amperes float64
	ac             bool
}

func scaleOf(solved *cases.Case, ac bool) scale {
	s := scale{ac: ac}
	for i := range solved.Branches {
		reading := &solved.Branches[i]
		s.amperes = max(s.amperes, cmplx.Abs(reading.Current))
		if !reading.Floating {
			s.volts = max(s.volts, cmplx.Abs(reading.Voltage))
		}
	}
	return s
}

// reading is what is written beside a part: texts in blue, and the way of the current as drawn.
type reading struct {
	voltage, current string
	way              *stroke.Point // nil when no current flows
}

// readingOf writes the values of a branch of a part. In DC the arrow is the direction in which the current really
// flows, and a voltage has a sign only where the part tells its poles apart. In AC both are phasors, and the arrow is
// the direction in which the current counts: into pin 1, or out of it for a source.
func readingOf(part *schematic.Part, branch *trace.Branch, r *cases.Reading, s scale) reading {
	out := reading{voltage: "floating"}
	current := r.Current
	if part.Kind.Delivers {
		current = -current
	}
	if !r.Floating {
		voltage := rounded(r.Voltage, s.volts)
		if !s.ac && !polarised(part.Kind) {
			voltage = complex(math.Abs(real(voltage)), 0)
		}
		out.voltage = quantity.Phasor(voltage, quantity.Volt, digits)
	}
	current = rounded(current, s.amperes)
	if current == 0 {
		out.current = quantity.Phasor(0, quantity.Ampere, digits)
		return out
	}
	forward := !part.Kind.Delivers // along the branch from its first pin
	if !s.ac {
		if real(current) < 0 {
			forward = !forward
		}
		current = complex(math.Abs(real(current)), 0)
	}
	out.current = quantity.Phasor(current, quantity.Ampere, digits)
	way := direction(part, branch, forward)
	out.way = &way
	return out
}

// polarised reports whether a kind says which of its pins is the positive one, or is a source.
func polarised(kind *kinds.Kind) bool {
	return kind.Delivers || len(kind.Pins) > 0 && kind.Pins[0].Mark != ""
}

// rounded is zero for what is only rounding.
func rounded(value complex128, largest float64) complex128 {
	if cmplx.Abs(value) <= negligible*largest {
		return 0
	}
	return value
}

// direction is the way along a branch as it lies on the sheet: one of the four directions of the grid.
func direction(part *schematic.Part, branch *trace.Branch, forward bool) stroke.Point {
	from, _ := part.Kind.Pin(branch.Pins[0])
	to, _ := part.Kind.Pin(branch.Pins[1])
	a, b := part.Pin(from), part.Pin(to)
	if !forward {
		a, b = b, a
	}
	dx, dy := b.X-a.X, b.Y-a.Y
	switch {
	case abs(dx) > abs(dy):
		return stroke.Point{X: math.Copysign(1, float64(dx))}
	default:
		return stroke.Point{Y: math.Copysign(1, float64(dy))}
	}
}

func abs(n int) int { return max(n, -n) }

// siNumber writes a value for scripts, in SI units, as shortly as it reads back to the same number: the real value in
// DC, the magnitude in AC.
func siNumber(value complex128, ac bool) string {
	number := real(value)
	if ac {
		number = cmplx.Abs(value)
	}
	return strconv.FormatFloat(number+0, 'g', -1, 64) // adding zero makes −0 a plain 0
}
