package kinds

import (
	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// ACSupply is the supply of an AC control circuit; it follows the supply level of the case. Its letter is that of IEC 81346-2
// for what generates.
var ACSupply = register(&Kind{
	Name: "ac-supply", Title: "AC supply", Group: Supply, Order: 15, Letter: "G",
	Words: []string{"power", "mains", "line", "120 v", "230 v", "source"},
	Pins:  twoPins(""),
	Specs: append([]Spec{
		{Name: "voltage", Title: "voltage", Unit: quantity.Volt, Default: Number(120), Positive: true, Most: mostVolts},
		phaseSpec(),
		{Name: "resistance", Title: "inner resistance", Unit: quantity.Ohm, Default: Number(0), Least: 0, Most: 1e9},
		{Name: "reactance", Title: "inner reactance", Unit: quantity.Ohm, Default: Number(0), Least: -1e9, Most: 1e9},
		{Name: "rated_power", Title: "rated apparent power", Unit: quantity.VoltAmpere, Optional: true, Positive: true, Most: 1e9},
	}, limitSpecs()...),
	Tray:   []Entry{{Title: "AC supply"}},
	Symbol: acSupplySymbol,
	Branches: func(values Filled, condition Condition) []Branch {
		emf := phasor(supplied(values, condition.Supply, 0.10), values)
		return []Branch{{"1", "2", Impedance(complex(values.Number("resistance"), values.Number("reactance")), emf)}}
	},
	Legend: func(values Filled) string {
		text := withPhase("voltage")(values)
		if values.Has("rated_power") {
			text += " " + values.Exact("rated_power")
		}
		return text
	},
	Check:    checkLimits,
	Delivers: true, Follows: true, ACOnly: true,
})

func acSupplySymbol(look Look) stroke.List {
	// IEC 60617-2, alternating current: one period of a sine, which stays level.
	wave := upright(look, stroke.List{
		stroke.Arc{Center: stroke.Point{X: -0.22}, Radius: 0.22, Start: 180, Sweep: 180},
		stroke.Arc{Center: stroke.Point{X: 0.22}, Radius: 0.22, Start: 180, Sweep: -180},
	})
	if look.Set == ANSI {
		return append(round(), wave...) // IEEE 315: within a circle
	}
	const half = 0.9
	return append(append(leads(half), stroke.Rectangle(-half, -half, half, half)), wave...)
}
