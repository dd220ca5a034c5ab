package view

import (
	"cmp"
	"math"
	"math/cmplx"
	"slices"
	"strings"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/kinds"
	"loopwright/schematic/quantity"
)

// BuildCard is the callout of one part in one case.
func BuildCard(sheet *schematic.Sheet, result *cases.Result, shown int, part *schematic.Part) Card {
	card := Card{Ref: part.Ref, Kind: part.Kind.Title, Case: result.Cases[shown].Name}
	for i, spec := range part.Kind.Specs {
		if _, given := part.Values[spec.Name]; i < plainFields || given {
			card.Fields = append(card.Fields, field(spec, part))
		} else {
			card.More = append(card.More, field(spec, part))
		}
	}
	solved := &result.Cases[shown]
	if part.Kind.Positions != nil {
		card.State = state(part, solved)
	}
	if solved.Solved {
		card.Computed, card.Limits = computed(sheet, result, solved, part)
	}
	return card
}

// plainFields is how many values of a kind the card shows at once; of the others it shows those that were given.
const plainFields = 3

// BuildWireCard is the callout of one wire in one case: the potential that it belongs to.
func BuildWireCard(sheet *schematic.Sheet, result *cases.Result, shown int, wire *schematic.Wire) Card {
	solved := &result.Cases[shown]
	index := result.Drawing.WirePotential[slices.IndexFunc(sheet.Wires, func(w schematic.Wire) bool { return w.ID == wire.ID })]
	potential := &result.Drawing.Potentials[index]
	card := Card{Wire: wire.ID, Kind: "wire", Case: solved.Name, Computed: []Figure{{"wire number", potential.WireNumber}}}
	if potential.Name != "" {
		card.Computed = append(card.Computed, Figure{"potential", potential.Name})
	}
	if solved.Solved {
		voltage := "floating"
		if reading := solved.Potentials[index]; !reading.Floating {
			voltage = amount(reading.Voltage, quantity.Volt)
		}
		card.Computed = append(card.Computed, Figure{"voltage to 0", voltage})
	}
	return card
}

func field(spec kinds.Spec, part *schematic.Part) Field {
	given, has := part.Values[spec.Name]
	f := Field{Name: spec.Name, Title: spec.Title, Choices: spec.Choices, Flag: spec.Form == kinds.Flag, Numeric: spec.Form == kinds.Quantity}
	shown := spec.Default
	if has {
		shown = given
	}
	f.Yes = shown.Yes
	switch {
	case spec.Form == kinds.Quantity && !has && (spec.Optional || spec.Required):
		f.Default = "not given"
	case spec.Form == kinds.Quantity && shown.Written != "":
		f.Value = shown.Written
	case spec.Form == kinds.Quantity:
		f.Value = quantity.Exact(shown.Number, spec.Unit)
	case spec.Form == kinds.Names:
		f.Value = strings.Join(shown.Names, ", ")
	default:
		f.Value = shown.Written
	}
	return f
}

func state(part *schematic.Part, solved *cases.Case) *State {
	at := solved.Positions[part.Ref]
	says, move := wordsOf(part.Kind)
	state := &State{Says: says(at)}
	for _, position := range part.Kind.Positions(part.Fill()) {
		if position != at {
			state.Moves = append(state.Moves, Move{position, move(position)})
		}
	}
	return state
}

// wordsOf gives the words for standing in a position and for being put into it: what is operated is moved by hand, what
// protects has done its work or is made good again.
func wordsOf(kind *kinds.Kind) (says, move func(position string) string) {
	standing := map[string]string{}
	moving := map[string]string{kinds.Rest: "Release", kinds.Operated: "Operate"}
	if kind.Group == kinds.Protect {
		standing = map[string]string{kinds.Rest: "whole", kinds.Operated: "blown"}
		moving = map[string]string{kinds.Rest: "Replace", kinds.Operated: "Blow"}
	}
	says = func(position string) string { return cmp.Or(standing[position], position) }
	move = func(position string) string { return cmp.Or(moving[position], "To "+position) }
	return says, move
}

func computed(sheet *schematic.Sheet, result *cases.Result, solved *cases.Case, part *schematic.Part) ([]Figure, []Limit) {
	for i, branch := range result.Drawing.Branches {
		if &sheet.Parts[branch.Part] != part {
			continue
		}
		reading := solved.Branches[i]
		current := reading.Current
		if part.Kind.Delivers {
			current = -current
		}
		figures := []Figure{{"current", amount(current, quantity.Ampere)}}
		if reading.Floating {
			return append(figures, Figure{"voltage", "floating"}), nil
		}
		power := real(current * cmplx.Conj(reading.Voltage))
		figures = append(figures, Figure{"voltage", amount(reading.Voltage, quantity.Volt)}, Figure{"power", quantity.Format(power, quantity.Watt, digits)})
		return figures, limits(part, reading, power)
	}
	return nil, nil
}

// limits compares what a part carries with what it is rated for, where a rating was entered or has a default.
func limits(part *schematic.Part, reading cases.Reading, power float64) []Limit {
	var list []Limit
	add := func(value, most float64, unit quantity.Unit) {
		if math.IsNaN(most) || most <= 0 {
			return
		}
		share := 100 * math.Abs(value) / most
		list = append(list, Limit{
			Says:  quantity.Format(share, quantity.Percent, 3) + " of " + quantity.Exact(most, unit),
			Share: int(math.Min(125, math.Round(share))), Over: share > 100,
		})
	}
	for _, rated := range part.Kind.Ratings {
		switch rated.Of {
		case kinds.OfCurrent:
			add(cmplx.Abs(reading.Current), part.Fill().Number(rated.Value), quantity.Ampere)
		case kinds.OfPower:
			add(power, part.Fill().Number(rated.Value), quantity.Watt)
		}
	}
	return list
}
