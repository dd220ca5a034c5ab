package kinds

import (
	"math"

	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// Inductor is a coil without contacts, with the resistance of its winding, which is all of it on a DC sheet. Its letter is
// that of IEC 81346-2 for what restricts a flow.
var Inductor = register(&Kind{
	Name: "inductor", Title: "inductor", Group: Load, Order: 60, Letter: "R",
	Words: []string{"inductance", "henry", "choke", "reactor", "winding"},
	Pins:  twoPins(""),
	Specs: []Spec{
		{Name: "inductance", Title: "inductance", Unit: quantity.Henry, Required: true, Positive: true, Most: 1e6},
		{Name: "resistance", Title: "winding resistance", Unit: quantity.Ohm, Default: Number(0), Least: 0, Most: 1e9},
		{Name: "tolerance", Title: "tolerance", Unit: quantity.Percent, Default: Number(10), Least: 0, Most: 100},
	},
	Tray:   []Entry{{Title: "Inductor", Values: Values{"inductance": written("10 mH", 10e-3)}}},
	Symbol: func(Look) stroke.List { return inductorSymbol() },
	Branches: func(values Filled, condition Condition) []Branch {
		reactance := 0.0
		if condition.System.AC() {
			reactance = 2 * math.Pi * condition.System.Hertz * values.Number("inductance")
		}
		return []Branch{{"1", "2", Impedance(complex(values.Number("resistance"), reactance), 0)}}
	},
	Legend: legendOf("inductance"),
})

// inductorSymbol is the row of half circles of IEC 60617-4 and IEEE 315.
func inductorSymbol() stroke.List {
	const bump = 0.25
	list := leads(4 * bump)
	for i := range 4 {
		list = append(list, stroke.Arc{Center: stroke.Point{Y: float64(2*i-3) * bump}, Radius: bump, Start: -90, Sweep: 180})
	}
	return list
}
