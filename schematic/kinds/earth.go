package kinds

import "loopwright/schematic/stroke"

// Earth is a connection to earth; all of one name are joined. Its letters are those of a connection to earth potential
// in IEC 81346-2 (from memory).
var Earth = register(&Kind{
	Name: "earth", Title: "earth", Group: Wiring, Order: 30, Letter: "XE",
	Words:  []string{"ground", "pe", "protective", "gnd"},
	Pins:   onePin(),
	Specs:  []Spec{{Name: "name", Title: "name", Form: Text, Default: Word(Text, "PE")}},
	Tray:   []Entry{{Title: "Earth"}},
	Symbol: earthSymbol,
	Legend: named,
	Joins:  named,
	Check:  checkName,
})

// earthSymbol draws three lines of decreasing length; on IEC sheets the protective conductor has a circle about them.
func earthSymbol(look Look) stroke.List {
	list := stroke.List{
		stroke.Line(0, 0, 0, 0.9), stroke.Line(-0.6, 0.9, 0.6, 0.9),
		stroke.Line(-0.38, 1.15, 0.38, 1.15), stroke.Line(-0.16, 1.4, 0.16, 1.4),
	}
	if look.Set != ANSI && look.Values.Word("name") == "PE" {
		list = append(list, stroke.Circle{Center: stroke.Point{Y: 1.05}, Radius: 0.8})
	}
	return list
}
