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
		{Name: "power", Title: "rated power", Unit: quantity.Watt, Default: Number(0.25), Positive: true},
	},
	Tray: []Entry{{Title: "Resistor"}},
	Symbol: func(look Look) stroke.List {
		// IEC 60617 S00555: a rectangle three times as long as wide.
		return stroke.List{
			stroke.Line(0, -2, 0, -1),
			stroke.Rectangle(-0.35, -1, 0.35, 1),
			stroke.Line(0, 1, 0, 2),
		}
	},
	Branches: func(values Filled, _ Condition) []Branch {
		return []Branch{{"1", "2", Impedance(complex(values.Number("resistance"), 0), 0)}}
	},
	Legend: func(values Filled) string { return values.Exact("resistance") },
})
