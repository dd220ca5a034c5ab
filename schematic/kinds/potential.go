package kinds

import (
	"errors"
	"strings"

	"loopwright/schematic/stroke"
)

// Potential gives a name to a potential; all of one name are joined. Its letter is not of IEC 81346-2, which designates
// objects: V is the quantity symbol of electric potential in IEC 80000-6 (from memory).
var Potential = register(&Kind{
	Name: "potential", Title: "potential", Group: Wiring, Order: 20, Letter: "V",
	Words: []string{"name", "rail", "reference", "common", "0 v", "l+"},
	Pins:  onePin(),
	Specs: []Spec{{Name: "name", Title: "name", Form: Text, Default: Word(Text, "0V")}},
	Tray:  []Entry{{Title: "Potential"}},
	Symbol: func(Look) stroke.List {
		return stroke.List{stroke.Line(0, 0, 0, -0.8), stroke.Line(-0.5, -0.8, 0.5, -0.8)}
	},
	Legend: named,
	Joins:  named,
	Check:  checkName,
})

func named(values Filled) string { return values.Word("name") }

func checkName(values Filled, _ System) error {
	if strings.TrimSpace(values.Word("name")) == "" {
		return errors.New("name: a potential needs a name; write one such as L+ or 0V")
	}
	return nil
}
