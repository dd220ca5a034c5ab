package kinds

import "loopwright/schematic/stroke"

// Terminal is a numbered terminal of a strip: a place where a meter can be put. It joins what meets at it and is no
// branch.
var Terminal = register(&Kind{
	Name: "terminal", Title: "terminal", Group: Wiring, Order: 10, Letter: "X",
	Words: []string{"strip", "test point", "block", "clamp"},
	Pins:  onePin(),
	Specs: []Spec{
		{Name: "strip", Title: "strip", Form: Text, Default: Word(Text, "X1")},
		{Name: "number", Title: "number", Form: Text, Default: Word(Text, "1")},
	},
	Tray: []Entry{{Title: "Terminal"}},
	Symbol: func(Look) stroke.List {
		// IEC 60617-3 and IEEE 315: a small open circle in the line.
		return stroke.List{stroke.Circle{Radius: 0.25, Style: stroke.Style{Opaque: true}}}
	},
	Legend:        func(values Filled) string { return values.Word("strip") + ":" + values.Word("number") },
	SameConductor: true,
})

// onePin is the pin of kinds that have only one, in their origin.
func onePin() []Pin { return []Pin{{Name: "1"}} }
