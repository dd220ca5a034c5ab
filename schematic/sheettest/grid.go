// Package sheettest makes sheets for tests and benchmarks: regular grids, and random circuits that are drawn without
// crossings.
package sheettest

import (
	"fmt"
	"math/rand/v2"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
)

// pitch is the distance between neighbouring nodes of a grid, in grid steps: a part of four and a wire at either end.
const pitch = 6

// Builder draws a circuit on a square lattice of nodes.
type Builder struct {
	Sheet *schematic.Sheet
	Shift schematic.Point // where the first node lies
	count map[string]int
}

// NewBuilder begins an empty DC sheet.
func NewBuilder(title string) *Builder {
	return &Builder{Sheet: schematic.New(title), count: map[string]int{}}
}

// Node is where a node of the lattice lies on the sheet.
func (b *Builder) Node(column, row int) schematic.Point {
	return schematic.Point{X: b.Shift.X + pitch*column, Y: b.Shift.Y + pitch*row}
}

// Right draws a part between a node and the next one to the right, with its first pin at the left, or at the right when
// it is turned round. It gives the part's reference.
func (b *Builder) Right(kind *kinds.Kind, values kinds.Values, column, row int, round bool) string {
	from, to := b.Node(column, row), b.Node(column+1, row)
	turn := 270
	if round {
		turn = 90
	}
	at := schematic.Point{X: from.X + pitch/2, Y: from.Y}
	b.Wire(from, schematic.Point{X: at.X - 2, Y: at.Y})
	b.Wire(schematic.Point{X: at.X + 2, Y: at.Y}, to)
	return b.Part(kind, values, at, turn)
}

// Down draws a part between a node and the next one below, with its first pin above, or below when it is turned round.
// It gives the part's reference.
func (b *Builder) Down(kind *kinds.Kind, values kinds.Values, column, row int, round bool) string {
	from, to := b.Node(column, row), b.Node(column, row+1)
	turn := 0
	if round {
		turn = 180
	}
	at := schematic.Point{X: from.X, Y: from.Y + pitch/2}
	b.Wire(from, schematic.Point{X: at.X, Y: at.Y - 2})
	b.Wire(schematic.Point{X: at.X, Y: at.Y + 2}, to)
	return b.Part(kind, values, at, turn)
}

// Part puts a part on the sheet, numbers it and gives its reference.
func (b *Builder) Part(kind *kinds.Kind, values kinds.Values, at schematic.Point, turn int) string {
	b.count[kind.Letter]++
	ref := fmt.Sprintf("%s%d", kind.Letter, b.count[kind.Letter])
	b.Sheet.Parts = append(b.Sheet.Parts, schematic.Part{Ref: ref, Kind: kind, At: at, Turn: turn, Values: values})
	return ref
}

// Wire draws a wire.
func (b *Builder) Wire(points ...schematic.Point) {
	id := fmt.Sprintf("w%d", len(b.Sheet.Wires)+1)
	b.Sheet.Wires = append(b.Sheet.Wires, schematic.Wire{ID: id, Points: points})
}

// Grid is a lattice of columns by rows nodes with a resistor of 1 kΩ between all neighbours, except for a supply of 24 V in
// place of the first one downwards.
func Grid(columns, rows int) *schematic.Sheet {
	b := NewBuilder("Grid")
	for row := range rows {
		for column := range columns {
			if column == 0 && row == 0 && rows > 1 {
				b.Down(kinds.DCSupply, nil, 0, 0, false)
			} else if row+1 < rows {
				b.Down(kinds.Resistor, nil, column, row, false)
			}
			if column+1 < columns {
				b.Right(kinds.Resistor, nil, column, row, false)
			}
		}
	}
	return b.Sheet
}

// Rungs is a supply and a number of rungs of a switch and a lamp, each between the rails L+ and 0V, which are joined by name
// alone.
func Rungs(rungs int) *schematic.Sheet {
	b := NewBuilder("Rungs")
	rail := func(name string, at schematic.Point) {
		b.Part(kinds.Potential, kinds.Values{"name": kinds.Word(kinds.Text, name)}, at, 0)
	}
	for rung := range rungs + 1 {
		column, row := rung%20, 3*(rung/20)
		rail("L+", b.Node(column, row))
		rail("0V", b.Node(column, row+2))
		if rung == 0 {
			b.Down(kinds.DCSupply, nil, column, row, false)
			b.Wire(b.Node(column, row+1), b.Node(column, row+2))
			continue
		}
		b.Down(kinds.Switch, nil, column, row, false)
		b.Down(kinds.Lamp, nil, column, row+1, false)
	}
	return b.Sheet
}

// Tangle is a number of resistors, each between two of a number of nodes that are joined by name alone.
func Tangle(resistors, nodes int) *schematic.Sheet {
	b := NewBuilder("Tangle")
	random := rand.New(rand.NewPCG(1, 2))
	for i := range resistors {
		column, row := i%50, 2*(i/50)
		b.Down(kinds.Resistor, nil, column, row, false)
		for end := range 2 {
			name := fmt.Sprint("N", random.IntN(nodes))
			b.Part(kinds.Potential, kinds.Values{"name": kinds.Word(kinds.Text, name)}, b.Node(column, row+end), 0)
		}
	}
	return b.Sheet
}
