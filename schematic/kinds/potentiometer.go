package kinds

import (
	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// Potentiometer is a resistor with a wiper. The setting is the share of the resistance between pin 1 and the wiper. Its
// letter is that of IEC 81346-2 for what restricts a flow.
var Potentiometer = register(&Kind{
	Name: "potentiometer", Title: "potentiometer", Group: Load, Order: 35, Letter: "R",
	Words: []string{"wiper", "setpoint", "variable", "trimmer", "divider", "rheostat"},
	Pins:  append(twoPins(""), Pin{Name: "3", X: 2, Y: 0}),
	Specs: []Spec{
		{Name: "resistance", Title: "resistance", Unit: quantity.Ohm, Default: Number(10e3), Least: 0, Most: 1e12},
		{Name: "setting", Title: "setting from pin 1", Unit: quantity.None, Default: Number(0.5), Least: 0, Most: 1},
		{Name: "tolerance", Title: "tolerance", Unit: quantity.Percent, Default: Number(10), Least: 0, Most: 100},
		{Name: "power", Title: "rated power", Unit: quantity.Watt, Optional: true, Positive: true, Most: 1e9},
	},
	Tray: []Entry{{Title: "Potentiometer"}},
	Symbol: func(look Look) stroke.List {
		// IEC 60617-4 and IEEE 315: the wiper is an arrow onto the resistor.
		tip := barWidth
		if look.Set == ANSI {
			tip = 0.4
		}
		head := stroke.Outline(tip, 0, tip+0.5, -0.18, tip+0.5, 0.18)
		head.Filled = true
		return append(resistorSymbol(look), stroke.Line(tip+0.5, 0, 2, 0), head)
	},
	Branches: func(values Filled, _ Condition) []Branch {
		upper := values.Number("resistance") * values.Number("setting")
		return []Branch{
			{"1", "3", Impedance(complex(upper, 0), 0)},
			{"3", "2", Impedance(complex(values.Number("resistance")-upper, 0), 0)},
		}
	},
	Legend:  legendOf("resistance", "setting"),
	Ratings: []Rating{{OfPower, "power"}},
})
