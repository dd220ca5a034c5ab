package kinds

import (
	"math"

	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// Capacitor is a capacitor with its equivalent series resistance. On a DC sheet it is open. Its letter is that of
// IEC 81346-2 for what stores.
var Capacitor = register(&Kind{
	Name: "capacitor", Title: "capacitor", Group: Load, Order: 50, Letter: "C",
	Words: []string{"capacitance", "farad", "smoothing", "suppression"},
	Pins:  twoPins(""),
	Specs: []Spec{
		{Name: "capacitance", Title: "capacitance", Unit: quantity.Farad, Required: true, Positive: true, Most: 1e6},
		{Name: "esr", Title: "series resistance", Unit: quantity.Ohm, Default: Number(0), Least: 0, Most: 1e9},
		{Name: "tolerance", Title: "tolerance", Unit: quantity.Percent, Default: Number(10), Least: 0, Most: 100},
		{Name: "rated_voltage", Title: "rated voltage", Unit: quantity.Volt, Optional: true, Positive: true, Most: mostVolts},
	},
	Tray:   []Entry{{Title: "Capacitor", Values: Values{"capacitance": written("100 nF", 100e-9)}}},
	Symbol: capacitorSymbol,
	Branches: func(values Filled, condition Condition) []Branch {
		if !condition.System.AC() {
			return []Branch{{"1", "2", Law{Alpha: 1, Row: true}}}
		}
		reactance := -1 / (2 * math.Pi * condition.System.Hertz * values.Number("capacitance"))
		return []Branch{{"1", "2", Impedance(complex(values.Number("esr"), reactance), 0)}}
	},
	Legend: legendOf("capacitance", "rated_voltage"),
})

func capacitorSymbol(look Look) stroke.List {
	list := append(leads(0.15), stroke.Line(-0.75, -0.15, 0.75, -0.15))
	if look.Set == ANSI {
		// IEEE 315: the lower plate is curved.
		const radius = 1.1
		return append(list, stroke.Arc{Center: stroke.Point{Y: 0.15 + radius}, Radius: radius, Start: -132, Sweep: 84})
	}
	// IEC 60617-4: two plates.
	return append(list, stroke.Line(-0.75, 0.15, 0.75, 0.15))
}
