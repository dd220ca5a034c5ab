package kinds

import (
	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// VoltageSource is an ideal source of a fixed voltage, with a resistance in series when one is given. It does not follow
// the supply level of the case.
var VoltageSource = register(&Kind{
	Name: "voltage-source", Title: "voltage source", Group: Supply, Order: 30, Letter: "G",
	Words: []string{"ideal", "emf", "volt"},
	Pins:  twoPins("+"),
	Specs: []Spec{
		{Name: "voltage", Title: "voltage", Unit: quantity.Volt, Required: true, Least: -1e9, Most: 1e9},
		phaseSpec(),
		{Name: "resistance", Title: "source resistance", Unit: quantity.Ohm, Default: Number(0), Least: 0, Most: 1e12},
	},
	Tray:   []Entry{{Title: "Voltage", Values: Values{"voltage": written("24 V", 24)}}},
	Symbol: voltageSourceSymbol,
	Branches: func(values Filled, _ Condition) []Branch {
		resistance := complex(values.Number("resistance"), 0)
		return []Branch{{"1", "2", Impedance(resistance, phasor(values.Number("voltage"), values))}}
	},
	Legend:   withPhase("voltage"),
	Check:    checkPhase,
	Delivers: true,
})

func voltageSourceSymbol(look Look) stroke.List {
	list := round()
	if look.Set == ANSI {
		// IEEE 315: both signs within the circle.
		return append(list, stroke.Line(-0.2, -0.38, 0.2, -0.38), stroke.Line(0, -0.58, 0, -0.18), minus(look))
	}
	// IEC 60617-2, ideal voltage source: the conductor goes on through the circle.
	return append(list, stroke.Line(0, -roundRadius, 0, roundRadius))
}

// minus is a level minus sign in the lower half of a circle.
func minus(look Look) stroke.Path {
	if look.Turn%180 == 0 {
		return stroke.Line(-0.2, 0.38, 0.2, 0.38)
	}
	return stroke.Line(0, 0.18, 0, 0.58)
}
