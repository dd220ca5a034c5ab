package kinds

import (
	"errors"
	"fmt"
	"slices"

	"loopwright/schematic/quantity"
)

// Switch is one pole of anything that a person or a process operates.
var Switch = register(&Kind{
	Name: "switch", Title: "switch", Group: Operate, Order: 10, Letter: "S",
	Words: []string{"button", "push", "stop", "start", "selector", "limit", "float", "make", "break", "mushroom", "no", "nc"},
	Pins:  twoPins(""),
	Specs: []Spec{
		{Name: "form", Title: "form", Form: Choice, Default: Word(Choice, "make"), Choices: []string{"make", "break"}},
		{Name: "actuator", Title: "actuator", Form: Choice, Default: Word(Choice, "push"), Choices: []string{"push", "mushroom",
			"selector", "toggle", "limit", "float", "pressure", "temperature", "proximity", "overload", "output"}},
		{Name: "positions", Title: "positions", Form: Names, Optional: true},
		{Name: "closed_in", Title: "closed in", Form: Names, Optional: true},
		{Name: "resistance", Title: "contact resistance", Unit: quantity.Ohm, Default: Number(0.02), Least: 0, Most: 1e6},
		{Name: "leakage", Title: "leakage when open", Unit: quantity.Ampere, Default: Number(0), Least: 0, Most: 1},
		{Name: "leakage_voltage", Title: "voltage of that leakage", Unit: quantity.Volt, Default: Number(24), Positive: true},
		{Name: "drop", Title: "voltage drop when closed", Unit: quantity.Volt, Default: Number(0), Least: 0, Most: 1000},
	},
	Tray: []Entry{
		{Title: "Make"},
		{Title: "Break", Values: Values{"form": Word(Choice, "break")}},
		{Title: "Selector", Values: Values{"actuator": Word(Choice, "selector")}},
	},
	Symbol: switchSymbol,
	Branches: func(values Filled, condition Condition) []Branch {
		leakage := values.Number("leakage") / values.Number("leakage_voltage")
		closed := switchClosed(values, condition.Position)
		return []Branch{{"1", "2", Contact(closed, values.Number("resistance"), leakage)}}
	},
	Legend:    func(Filled) string { return "" },
	Positions: switchPositions,
	Closed:    switchClosed,
	Check:     checkSwitch,
})

func switchPositions(values Filled) []string {
	if names := values.Names("positions"); len(names) > 0 {
		return names
	}
	return []string{Rest, Operated}
}

func switchClosed(values Filled, position string) bool {
	if values.Has("positions") {
		return slices.Contains(values.Names("closed_in"), position)
	}
	return (position == Operated) == (values.Word("form") == "make")
}

func checkSwitch(values Filled, system System) error {
	if values.Number("drop") > 0 {
		return errors.New("drop: a switch that conducts beyond a voltage drop is not built yet; leave it out")
	}
	if !values.Has("positions") {
		if values.Has("closed_in") {
			return errors.New("closed_in: it goes with positions; name the positions, or use form")
		}
		return nil
	}
	if values.Has("form") {
		return errors.New("form: a switch with positions has closed_in instead; leave form out")
	}
	if len(values.Names("positions")) < 2 {
		return errors.New("positions: name at least two, the first is rest")
	}
	for i, name := range values.Names("closed_in") {
		if !slices.Contains(values.Names("positions"), name) {
			return fmt.Errorf("closed_in[%d]: %q is not one of the positions", i, name)
		}
	}
	return nil
}
