package sheettest

import (
	"fmt"

	"pgregory.net/rapid"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
)

// Choice says what a random circuit may be made of.
type Choice struct {
	Columns, Rows int  // at most, at least 2
	Ideal         bool // sources without inner resistance and current sources, so that there may be no solution
	Switches      int  // at most
}

// Lattice draws a random circuit without crossings: some of the neighbouring nodes of a lattice are joined, by wires or
// parts that lie either way round.
func Lattice(t *rapid.T, b *Builder, choice Choice) {
	columns := rapid.IntRange(2, choice.Columns).Draw(t, "columns")
	rows := rapid.IntRange(2, choice.Rows).Draw(t, "rows")
	for row := range rows {
		for column := range columns {
			if column+1 < columns {
				join(t, b, choice, b.Node(column, row), b.Node(column+1, row), func(kind *kinds.Kind, values kinds.Values, round bool) {
					b.Right(kind, values, column, row, round)
				})
			}
			if row+1 < rows {
				join(t, b, choice, b.Node(column, row), b.Node(column, row+1), func(kind *kinds.Kind, values kinds.Values, round bool) {
					b.Down(kind, values, column, row, round)
				})
			}
		}
	}
}

// join draws something between two nodes, or nothing.
func join(t *rapid.T, b *Builder, choice Choice, from, to schematic.Point, draw func(*kinds.Kind, kinds.Values, bool)) {
	ohms := func() kinds.Value {
		return kinds.Number(rapid.SampledFrom([]float64{0.1, 1, 4.7, 33, 470, 1200, 56e3}).Draw(t, "ohms"))
	}
	volts := func() kinds.Value {
		return kinds.Number(rapid.SampledFrom([]float64{1.5, 5, 12, 24}).Draw(t, "volts"))
	}
	what := rapid.IntRange(0, 15).Draw(t, "what")
	if what == 9 && b.count[kinds.Switch.Letter] >= choice.Switches || what >= 14 && !choice.Ideal {
		what = 5
	}
	round := rapid.Bool().Draw(t, "round")
	switch what {
	case 0, 1, 2:
	case 3, 4:
		b.Wire(from, to)
	case 9:
		form := rapid.SampledFrom([]string{"make", "break"}).Draw(t, "form")
		draw(kinds.Switch, kinds.Values{"form": kinds.Word(kinds.Choice, form)}, round)
	case 10:
		draw(kinds.Fuse, nil, round)
	case 11:
		draw(kinds.Voltmeter, nil, round)
	case 12:
		draw(kinds.DCSupply, kinds.Values{"voltage": volts(), "resistance": ohms()}, round)
	case 13:
		draw(kinds.Ammeter, nil, round)
	case 14:
		draw(kinds.VoltageSource, kinds.Values{"voltage": volts()}, round)
	case 15:
		draw(kinds.CurrentSource, kinds.Values{"current": kinds.Number(0.25)}, round)
	default:
		draw(kinds.Resistor, kinds.Values{"resistance": ohms()}, round)
	}
}

// Names puts potentials of a few names on nodes of the lattice, up to a number of them.
func Names(t *rapid.T, b *Builder, most int) {
	for range rapid.IntRange(0, most).Draw(t, "names") {
		at := b.Node(rapid.IntRange(0, 4).Draw(t, "column"), rapid.IntRange(0, 3).Draw(t, "row"))
		name := rapid.SampledFrom([]string{"L+", "0V", "PE"}).Draw(t, "name")
		b.Part(kinds.Potential, kinds.Values{"name": kinds.Word(kinds.Text, name)}, at, 0)
	}
}

// Cases gives the sheet one case for every pattern of positions of its switches.
func Cases(sheet *schematic.Sheet) {
	var switches []string
	for i := range sheet.Parts {
		if sheet.Parts[i].Kind == kinds.Switch {
			switches = append(switches, sheet.Parts[i].Ref)
		}
	}
	sheet.Cases = nil
	for pattern := range 1 << len(switches) {
		c := schematic.Case{Name: fmt.Sprintf("Pattern %b", pattern), Supply: kinds.Nominal, Positions: map[string]string{}}
		for i, ref := range switches {
			if pattern>>i&1 == 1 {
				c.Positions[ref] = kinds.Operated
			}
		}
		sheet.Cases = append(sheet.Cases, c)
	}
}

// Soup throws parts and wires onto a small field, so that they cross, cover and touch one another in every way that a sheet
// allows. The sheet passes Validate.
func Soup(t *rapid.T, b *Builder) {
	within := rapid.IntRange(0, 10)
	list := []*kinds.Kind{kinds.Resistor, kinds.Switch, kinds.DCSupply, kinds.CurrentSource, kinds.Ammeter, kinds.Terminal, kinds.Potential, kinds.Earth}
	for range rapid.IntRange(0, 10).Draw(t, "parts") {
		at := schematic.Point{X: within.Draw(t, "x"), Y: within.Draw(t, "y")}
		turn := 90 * rapid.IntRange(0, 3).Draw(t, "turn")
		kind := list[rapid.IntRange(0, len(list)-1).Draw(t, "kind")]
		b.Part(kind, kind.Tray[0].Values, at, turn)
	}
	for range rapid.IntRange(0, 8).Draw(t, "wires") {
		at := schematic.Point{X: within.Draw(t, "x"), Y: within.Draw(t, "y")}
		points := []schematic.Point{at}
		for range rapid.IntRange(1, 4).Draw(t, "corners") {
			by := rapid.SampledFrom([]int{-7, -3, -2, -1, 1, 2, 3, 7}).Draw(t, "by")
			if rapid.Bool().Draw(t, "level") {
				at.X += by
			} else {
				at.Y += by
			}
			points = append(points, at)
		}
		b.Wire(points...)
		if schematic.Validate(b.Sheet) != nil { // the same wire twice
			b.Sheet.Wires = b.Sheet.Wires[:len(b.Sheet.Wires)-1]
		}
	}
}
