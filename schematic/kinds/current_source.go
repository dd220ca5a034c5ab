package kinds

import (
	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// CurrentSource is an ideal source whose current flows out of pin 1 through the circuit and back into pin 2.
var CurrentSource = register(&Kind{
	Name: "current-source", Title: "current source", Group: Supply, Order: 40, Letter: "G",
	Words: []string{"ideal", "20 ma", "loop", "ampere"},
	Pins:  twoPins(""),
	Specs: []Spec{
		{Name: "current", Title: "current", Unit: quantity.Ampere, Required: true, Least: -1e9, Most: 1e9},
		phaseSpec(),
	},
	Tray:   []Entry{{Title: "Current", Values: Values{"current": written("20 mA", 0.02)}}},
	Symbol: currentSourceSymbol,
	Branches: func(values Filled, _ Condition) []Branch {
		return []Branch{{"1", "2", Current(-phasor(values.Number("current"), values))}}
	},
	Legend:   withPhase("current"),
	Check:    checkPhase,
	Delivers: true,
})

func currentSourceSymbol(look Look) stroke.List {
	list := round()
	if look.Set == ANSI {
		// IEEE 315: an arrow within the circle, in the direction of the current.
		return append(list, stroke.Line(0, 0.55, 0, -0.1), arrowhead(0, -0.55))
	}
	// IEC 60617-2, ideal current source: a bar across the circle; the arrowhead of IEC 60617-2 on the conductor says
	// which way the current flows.
	return append(list, stroke.Line(-roundRadius, 0, roundRadius, 0), arrowhead(0, -1.72))
}
