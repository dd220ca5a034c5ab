package kinds

import (
	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// Resistor is a resistor of fixed value.
var Resistor = register(&Kind{
	Name: "resistor", Title: "resistor", Group: Load, Order: 30, Letter: "R",
	Words: []string{"resistance", "ohm", "shunt", "dropper"},
	Pins:  twoPins(""),
	Specs: []Spec{
		{Name: "resistance", Title: "resistance", Unit: quantity.Ohm, Default: Number(1000), Least: 0, Most: 1e12},
		{Name: "tolerance", Title: "tolerance", Unit: quantity.Percent, Default: Number(5), Least: 0, Most: 100},
		{Name: "power", Title: "rated power", Unit: quantity.Watt, Default: Number(0.25), Positive: true, Most: 1e9},
	},
	Tray:     []Entry{{Title: "Resistor"}},
	Symbol:   resistorSymbol,
	Branches: resistanceBranch,
	Legend:   legendOf("resistance"),
	Ratings:  []Rating{{OfPower, "power"}},
})

// resistanceBranch is the branch of a part that is only its resistance.
func resistanceBranch(values Filled, _ Condition) []Branch {
	return []Branch{{"1", "2", Impedance(complex(values.Number("resistance"), 0), 0)}}
}

func resistorSymbol(look Look) stroke.List {
	if look.Set != ANSI {
		// IEC 60617-4: a rectangle three times as long as wide.
		return append(leads(3*barWidth), stroke.Rectangle(-barWidth, -3*barWidth, barWidth, 3*barWidth))
	}
	// IEEE 315: a zigzag of three full peaks.
	return append(leads(0.96), stroke.Line(0, -0.96, 0.4, -0.8, -0.4, -0.48, 0.4, -0.16, -0.4, 0.16, 0.4, 0.48, -0.4, 0.8, 0, 0.96))
}
