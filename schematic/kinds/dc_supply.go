package kinds

import (
	"errors"

	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// DCSupply is a power supply unit for a control circuit; it follows the supply level of the case.
var DCSupply = register(&Kind{
	Name: "dc-supply", Title: "DC supply", Group: Supply, Order: 10, Letter: "G",
	Words: []string{"power", "psu", "24 v", "rectifier", "source"},
	Pins:  twoPins("+"),
	Specs: append([]Spec{
		{Name: "voltage", Title: "voltage", Unit: quantity.Volt, Default: Number(24), Positive: true, Most: mostVolts},
		{Name: "resistance", Title: "inner resistance", Unit: quantity.Ohm, Default: Number(0), Least: 0, Most: 1e9},
		{Name: "rated_current", Title: "rated current", Unit: quantity.Ampere, Optional: true, Positive: true, Most: 1e6},
		{Name: "current_limit", Title: "current limit", Unit: quantity.Ampere, Optional: true, Positive: true, Most: 1e6},
	}, limitSpecs()...),
	Tray:   []Entry{{Title: "DC supply"}},
	Symbol: dcSupplySymbol,
	Branches: func(values Filled, condition Condition) []Branch {
		voltage := supplied(values, condition.Supply, 0.10)
		return []Branch{{"1", "2", Impedance(complex(values.Number("resistance"), 0), complex(voltage, 0))}}
	},
	Legend: legendOf("voltage", "rated_current"),
	Check: func(values Filled, system System) error {
		if values.Has("current_limit") {
			return errors.New("current_limit: a supply that limits its current is not built yet; leave it out")
		}
		return checkLimits(values, system)
	},
	Delivers: true, Follows: true, DCOnly: true,
	Ratings: []Rating{{OfCurrent, "rated_current"}},
})

func dcSupplySymbol(look Look) stroke.List {
	const half = 0.9
	list := append(leads(half), stroke.Rectangle(-half, -half, half, half))
	if look.Set == ANSI {
		return append(list, stroke.Text{Text: "DC", Height: 0.8, Anchor: stroke.Middle, Centred: true})
	}
	// IEC 60617-2, direct current: a line above a broken one.
	sign := stroke.List{stroke.Line(-0.5, -0.14, 0.5, -0.14)}
	for _, left := range []float64{-0.5, -0.13, 0.24} {
		sign = append(sign, stroke.Line(left, 0.16, left+0.26, 0.16))
	}
	return append(list, upright(look, sign)...)
}
