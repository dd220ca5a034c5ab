package kinds

import (
	"loopwright/schematic/quantity"
	"loopwright/schematic/stroke"
)

// Fuse is a fuse link. Operated, or when it is said to be blown, it is open.
var Fuse = register(&Kind{
	Name: "fuse", Title: "fuse", Group: Protect, Order: 10, Letter: "F",
	Words: []string{"protection", "link", "blown"},
	Pins:  twoPins(""),
	Specs: []Spec{
		{Name: "rating", Title: "rated current", Unit: quantity.Ampere, Optional: true, Positive: true, Most: 1e5},
		{Name: "resistance", Title: "resistance", Unit: quantity.Ohm, Default: Number(0.05), Least: 0, Most: 1e6},
		{Name: "blown", Title: "blown", Form: Flag, Default: Value{Form: Flag}},
	},
	Tray:   []Entry{{Title: "Fuse"}},
	Symbol: fuseSymbol,
	Branches: func(values Filled, condition Condition) []Branch {
		closed := fuseClosed(values, condition.Position)
		return []Branch{{"1", "2", Contact(closed, values.Number("resistance"), 0)}}
	},
	Legend:    legendOf("rating"),
	Positions: func(Filled) []string { return []string{Rest, Operated} },
	Closed:    fuseClosed,
	Ratings:   []Rating{{OfCurrent, "rating"}},
})

func fuseClosed(values Filled, position string) bool {
	return position != Operated && !values.Yes("blown")
}

func fuseSymbol(look Look) stroke.List {
	if look.Set == ANSI {
		return fuseLink(look.Closed)
	}
	// IEC 60617-7: a rectangle three times as long as wide with the conductor drawn through it.
	body := stroke.Rectangle(-barWidth, -3*barWidth, barWidth, 3*barWidth)
	if look.Closed {
		return stroke.List{body, stroke.Line(0, -2, 0, 2)}
	}
	return append(burst(0), body, stroke.Line(0, -2, 0, -0.42), stroke.Line(0, 0.42, 0, 2))
}

// fuseLink is the link of IEEE 315: two half circles, one to either side.
func fuseLink(closed bool) stroke.List {
	sweep := 180.0
	list := leads(1)
	if !closed {
		sweep = 120
		list = append(list, burst(0)...)
	}
	return append(list,
		stroke.Arc{Center: stroke.Point{Y: -0.5}, Radius: 0.5, Start: -90, Sweep: sweep},
		stroke.Arc{Center: stroke.Point{Y: 0.5}, Radius: 0.5, Start: 90, Sweep: sweep})
}

// burst is a small cross where a fuse has melted.
func burst(y float64) stroke.List {
	const d = 0.17
	return stroke.List{thick(stroke.Line(-d, y-d, d, y+d)), thick(stroke.Line(-d, y+d, d, y-d))}
}
