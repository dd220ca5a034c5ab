package kinds

import (
	"errors"
	"fmt"
	"math"
	"math/cmplx"

	"loopwright/schematic/quantity"
)

// phaseSpec is the phase of an independent source.
func phaseSpec() Spec {
	return Spec{Name: "phase", Title: "phase", Unit: quantity.Degree, Default: Number(0), Least: -360, Most: 360}
}

// phasor is a magnitude turned by the phase of the source.
func phasor(magnitude float64, values Filled) complex128 {
	degrees := values.Number("phase")
	if degrees == 0 {
		return complex(magnitude, 0)
	}
	return complex(magnitude, 0) * cmplx.Rect(1, degrees*math.Pi/180)
}

// withPhase makes the Legend of a source: its magnitude, with the phase where there is one.
func withPhase(name string) func(Filled) string {
	return func(values Filled) string {
		if values.Number("phase") == 0 {
			return values.Exact(name)
		}
		return values.Exact(name) + " ∠ " + values.Exact("phase")
	}
}

// checkPhase refuses a phase where nothing alternates.
func checkPhase(values Filled, system System) error {
	if !system.AC() && values.Number("phase") != 0 {
		return errors.New("phase: a dc sheet has no phases; leave it out or set the sheet to ac")
	}
	return nil
}

// limitSpecs are the limits of a supply; when they are absent they follow from the voltage.
func limitSpecs() []Spec {
	return []Spec{
		{Name: "low", Title: "lowest voltage", Unit: quantity.Volt, Optional: true, Least: 0, Most: mostVolts},
		{Name: "high", Title: "highest voltage", Unit: quantity.Volt, Optional: true, Least: 0, Most: mostVolts},
	}
}

// mostVolts bounds the voltage of supplies; control circuits stay far below it.
const mostVolts = 1e5

// supplied is the open-circuit voltage of a supply at a level. Limits that are not given lie a share of the voltage
// below and above it: 10 % for a DC supply, 15 % for a battery, after IEC 60204-1 4.3.3 and 4.3.2 (from memory).
func supplied(values Filled, level Level, share float64) float64 {
	voltage := values.Number("voltage")
	switch level {
	case Low:
		if values.Has("low") {
			return values.Number("low")
		}
		return voltage * (1 - share)
	case High:
		if values.Has("high") {
			return values.Number("high")
		}
		return voltage * (1 + share)
	}
	return voltage
}

// checkLimits refuses limits that do not lie on either side of the voltage.
func checkLimits(values Filled, _ System) error {
	voltage := values.Number("voltage")
	if values.Has("low") && values.Number("low") > voltage {
		return fmt.Errorf("low: %s is above the voltage of %s; the low limit must not be above it", values.Exact("low"), values.Exact("voltage"))
	}
	if values.Has("high") && values.Number("high") < voltage {
		return fmt.Errorf("high: %s is below the voltage of %s; the high limit must not be below it", values.Exact("high"), values.Exact("voltage"))
	}
	return nil
}
