package kinds

import (
	"errors"

	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// Lamp is a signal lamp, taken as the resistance U²/P of its rated voltage and power.
var Lamp = register(&Kind{
	Name: "lamp", Title: "lamp", Group: Load, Order: 10, Letter: "P",
	Words: []string{"light", "signal", "pilot", "bulb", "indicator"},
	Pins:  twoPins(""),
	Specs: []Spec{
		{Name: "voltage", Title: "rated voltage", Unit: quantity.Volt, Default: Number(24), Positive: true, Most: mostVolts},
		{Name: "power", Title: "rated power", Unit: quantity.Watt, Default: Number(2), Positive: true, Most: 1e6},
		{Name: "tolerance", Title: "tolerance", Unit: quantity.Percent, Default: Number(10), Least: 0, Most: 100},
		{Name: "cold_ratio", Title: "cold resistance by hot", Unit: quantity.None, Default: Number(1), Positive: true, Most: 1},
	},
	Tray:   []Entry{{Title: "Lamp"}},
	Symbol: lampSymbol,
	Branches: func(values Filled, _ Condition) []Branch {
		voltage := values.Number("voltage")
		return []Branch{{"1", "2", Impedance(complex(voltage*voltage/values.Number("power"), 0), 0)}}
	},
	Legend: legendOf("voltage", "power"),
	Check: func(values Filled, _ System) error {
		if values.Number("cold_ratio") < 1 {
			return errors.New("cold_ratio: a filament that is colder than hot is not built yet; leave it out")
		}
		return nil
	},
})

func lampSymbol(look Look) stroke.List {
	if look.Set != ANSI {
		// IEC 60617-8: a circle with two diameters at 45°.
		return append(round(), diagonals(roundRadius)...)
	}
	// IEEE 315, pilot light: a circle with four short rays at 45°.
	list := round()
	for _, corner := range []stroke.Point{{X: -1, Y: -1}, {X: 1, Y: -1}, {X: 1, Y: 1}, {X: -1, Y: 1}} {
		list = append(list, stroke.Line(0.66*corner.X, 0.66*corner.Y, 0.92*corner.X, 0.92*corner.Y))
	}
	return list
}
