package kinds

import (
	"errors"
	"math"

	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// FixedImpedance is a resistance in series with a reactance that does not depend on the frequency; inductive reactance is
// positive. Its letter is that of IEC 81346-2 for what restricts a flow.
var FixedImpedance = register(&Kind{
	Name: "impedance", Title: "impedance", Group: Load, Order: 70, Letter: "R",
	Words: []string{"reactance", "ohm", "complex", "z"},
	Pins:  twoPins(""),
	Specs: []Spec{
		{Name: "resistance", Title: "resistance", Unit: quantity.Ohm, Default: Number(0), Least: 0, Most: 1e12},
		{Name: "reactance", Title: "reactance", Unit: quantity.Ohm, Default: Number(0), Least: -1e12, Most: 1e12},
	},
	Tray:   []Entry{{Title: "Impedance", Values: Values{"resistance": written("100 Ω", 100)}}},
	Symbol: impedanceSymbol,
	Branches: func(values Filled, _ Condition) []Branch {
		return []Branch{{"1", "2", Impedance(complex(values.Number("resistance"), values.Number("reactance")), 0)}}
	},
	Legend: func(values Filled) string {
		reactance := values.Number("reactance")
		sign := " + j "
		if reactance < 0 {
			sign = " − j "
		}
		if reactance == 0 {
			return values.Exact("resistance")
		}
		return values.Exact("resistance") + sign + quantity.Exact(math.Abs(reactance), quantity.Ohm)
	},
	Check: func(values Filled, system System) error {
		if !system.AC() && values.Number("reactance") != 0 {
			return errors.New("reactance: a dc sheet has no reactances; leave it out or set the sheet to ac")
		}
		return nil
	},
})

// impedanceSymbol is a box with the letter Z in it, in both sets.
func impedanceSymbol(Look) stroke.List {
	sign := capital("Z", 0, 0)
	sign.Height = 0.8
	return append(leads(3*barWidth), stroke.Rectangle(-0.45, -3*barWidth, 0.45, 3*barWidth), sign)
}
