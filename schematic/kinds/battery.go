package kinds

import (
	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// Battery is a battery with its inner resistance; it follows the supply level of the case.
var Battery = register(&Kind{
	Name: "battery", Title: "battery", Group: Supply, Order: 20, Letter: "G",
	Words: []string{"cell", "accumulator", "12 v", "source"},
	Pins:  twoPins("+"),
	Specs: append([]Spec{
		{Name: "voltage", Title: "voltage", Unit: quantity.Volt, Default: Number(12), Positive: true, Most: mostVolts},
		{Name: "resistance", Title: "inner resistance", Unit: quantity.Ohm, Default: Number(0.05), Least: 0, Most: 1e9},
	}, limitSpecs()...),
	Tray: []Entry{{Title: "Battery"}},
	Symbol: func(Look) stroke.List {
		// IEC 60617-6 and IEEE 315: for each cell a long line, positive, and a short thick one.
		list := leads(0.48)
		for _, y := range []float64{-0.48, 0.16} {
			list = append(list, stroke.Line(-0.8, y, 0.8, y), thick(stroke.Line(-0.38, y+0.32, 0.38, y+0.32)))
		}
		return list
	},
	Branches: func(values Filled, condition Condition) []Branch {
		voltage := supplied(values, condition.Supply, 0.15)
		return []Branch{{"1", "2", Impedance(complex(values.Number("resistance"), 0), complex(voltage, 0))}}
	},
	Legend:   legendOf("voltage"),
	Check:    checkLimits,
	Delivers: true, Follows: true, DCOnly: true,
})
