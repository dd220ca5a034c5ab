package kinds

import (
	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// Voltmeter is a voltmeter with the resistance of its input.
var Voltmeter = register(&Kind{
	Name: "voltmeter", Title: "voltmeter", Group: Measure, Order: 10, Letter: "P",
	Words: []string{"meter", "volts", "measure", "multimeter"},
	Pins:  twoPins("+"),
	Specs: []Spec{
		{Name: "resistance", Title: "input resistance", Unit: quantity.Ohm, Default: Number(10e6), Positive: true, Most: 1e15},
	},
	Tray:     []Entry{{Title: "Volts"}},
	Symbol:   func(Look) stroke.List { return lettered("V") },
	Branches: resistanceBranch,
	Legend:   legendOf("resistance"),
})

// Ammeter is an ammeter with the resistance of its shunt.
var Ammeter = register(&Kind{
	Name: "ammeter", Title: "ammeter", Group: Measure, Order: 20, Letter: "P",
	Words: []string{"meter", "amperes", "measure", "shunt", "multimeter"},
	Pins:  twoPins("+"),
	Specs: []Spec{
		{Name: "resistance", Title: "resistance", Unit: quantity.Ohm, Default: Number(0.1), Least: 0, Most: 1e9},
	},
	Tray:          []Entry{{Title: "Amperes"}},
	Symbol:        func(Look) stroke.List { return lettered("A") },
	Branches:      resistanceBranch,
	Legend:        legendOf("resistance"),
	SameConductor: true,
})
