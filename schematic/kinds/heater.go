package kinds

import (
	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// Heater is a heating element, taken as the resistance U²/P of its rated voltage and power. Its letter is that of
// IEC 81346-2 for what gives radiant or thermal energy.
var Heater = register(&Kind{
	Name: "heater", Title: "heater", Group: Load, Order: 40, Letter: "E",
	Words: []string{"heating", "element", "warm", "panel heater"},
	Pins:  twoPins(""),
	Specs: []Spec{
		{Name: "voltage", Title: "rated voltage", Unit: quantity.Volt, Required: true, Positive: true, Most: mostVolts},
		{Name: "power", Title: "rated power", Unit: quantity.Watt, Required: true, Positive: true, Most: 1e9},
		{Name: "tolerance", Title: "tolerance", Unit: quantity.Percent, Default: Number(10), Least: 0, Most: 100},
	},
	Tray: []Entry{{Title: "Heater", Values: Values{"voltage": written("24 V", 24), "power": written("60 W", 60)}}},
	Symbol: func(look Look) stroke.List {
		if look.Set == ANSI {
			// A rectangular meander, as ladder diagrams draw a heating element (from memory).
			return append(leads(0.96), stroke.Line(0, -0.96, 0.45, -0.96, 0.45, -0.48, -0.45, -0.48, -0.45, 0, 0.45, 0, 0.45, 0.48, -0.45, 0.48, -0.45, 0.96, 0, 0.96))
		}
		// IEC 60617-4: the rectangle of a resistor with lines across.
		list := resistorSymbol(look)
		for _, y := range []float64{-0.48, 0, 0.48} {
			list = append(list, stroke.Line(-barWidth, y, barWidth, y))
		}
		return list
	},
	Branches: func(values Filled, _ Condition) []Branch {
		voltage := values.Number("voltage")
		return []Branch{{"1", "2", Impedance(complex(voltage*voltage/values.Number("power"), 0), 0)}}
	},
	Legend:  legendOf("voltage", "power"),
	Ratings: []Rating{{OfPower, "power"}},
})
