package kinds

import (
	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// RTD is a platinum resistance thermometer of IEC 60751. Its letter is that of IEC 81346-2 for what turns a measured
// variable into a signal.
var RTD = register(&Kind{
	Name: "rtd", Title: "resistance thermometer", Group: Measure, Order: 30, Letter: "B",
	Words: []string{"rtd", "pt100", "pt1000", "temperature", "sensor", "platinum"},
	Pins:  twoPins(""),
	Specs: []Spec{
		{Name: "r0", Title: "resistance at 0 °C", Unit: quantity.Ohm, Default: Number(100), Positive: true, Most: 1e6},
		{Name: "temperature", Title: "temperature", Unit: quantity.Celsius, Default: Number(25), Least: -200, Most: 850},
	},
	Tray: []Entry{{Title: "RTD"}},
	Symbol: func(look Look) stroke.List {
		// IEC 60617-4 and IEEE 315: a resistor with the line of what depends on a quantity, and that quantity.
		sign := capital("θ", -1.1, 0.2)
		sign.Height = 0.75
		return append(resistorSymbol(look), stroke.Line(-1.1, 0.85, -0.65, 0.85, 0.75, -0.85), sign)
	},
	Branches: func(values Filled, _ Condition) []Branch {
		return []Branch{{"1", "2", Impedance(complex(platinum(values.Number("r0"), values.Number("temperature")), 0), 0)}}
	},
	Legend: legendOf("r0", "temperature"),
})

// platinum is the resistance in ohms of a thermometer at a temperature in °C, by the equation of Callendar and Van Dusen with
// the coefficients of IEC 60751.
func platinum(r0, t float64) float64 {
	const a, b, c = 3.9083e-3, -5.775e-7, -4.183e-12
	ratio := 1 + a*t + b*t*t
	if t < 0 {
		ratio += c * (t - 100) * t * t * t
	}
	return r0 * ratio
}
