package trace

import (
	"fmt"
	"slices"
	"strconv"

	"loopwright/schematic/kinds"
)

// findPotentials joins groups of one name and numbers what results: the reference is 0, the others are 1, 2 … in reading
// order, each by its topmost place, and of its places at that height by the leftmost.
func (d *Drawing) findPotentials() {
	joined := newSets(d.Joins.Groups)
	names := d.joinNames(joined)
	number := d.readingOrder(joined)
	d.WirePotential = make([]int, len(d.Sheet.Wires))
	for w, group := range d.Joins.Wires {
		d.WirePotential[w] = number[joined.find(group)]
	}
	d.PinPotential = make([][]int, len(d.Sheet.Parts))
	for i, pins := range d.Joins.Pins {
		d.PinPotential[i] = make([]int, len(pins))
		for k, group := range pins {
			d.PinPotential[i][k] = number[joined.find(group)]
		}
	}
	d.putFirst(d.reference())
	for i := range d.Potentials {
		d.Potentials[i].Number = strconv.Itoa(i)
	}
	for _, part := range names {
		if p := &d.Potentials[d.PinPotential[part][0]]; p.Name == "" {
			p.Name = d.nameOf(part)
		}
	}
	d.listPins()
}

// nameOf is the name that a part gives to its potential, empty for most kinds.
func (d *Drawing) nameOf(part int) string {
	if joins := d.Sheet.Parts[part].Kind.Joins; joins != nil {
		return joins(d.Sheet.Parts[part].Fill())
	}
	return ""
}

// joinNames unites the groups to which potentials and earths give one name, and gives those parts, in their order.
func (d *Drawing) joinNames(joined sets) (named []int) {
	first := map[string]int{}
	for i := range d.Sheet.Parts {
		name := d.nameOf(i)
		if name == "" {
			continue
		}
		named = append(named, i)
		group := d.Joins.Pins[i][0]
		if other, known := first[name]; known {
			joined.union(other, group)
		} else {
			first[name] = group
		}
	}
	return named
}

// readingOrder makes the potentials and gives the number of each by its representative.
func (d *Drawing) readingOrder(joined sets) (number []int) {
	group := make([]int, len(d.Joins.Places)) // one more than the group of each place
	for i, pins := range d.places {
		for k, place := range pins {
			group[place] = d.Joins.Pins[i][k] + 1
		}
	}
	for _, piece := range d.Joins.Pieces {
		group[d.Joins.Node[piece.From]] = d.Joins.Wires[piece.Wire] + 1
		group[d.Joins.Node[piece.To]] = d.Joins.Wires[piece.Wire] + 1
	}
	number = make([]int, d.Joins.Groups)
	for i := range number {
		number[i] = -1
	}
	for _, g := range group {
		if g == 0 {
			continue
		}
		if root := joined.find(g - 1); number[root] < 0 {
			number[root] = len(d.Potentials)
			d.Potentials = append(d.Potentials, Potential{})
		}
	}
	return number
}

// putFirst makes one potential number 0; the others keep their order.
func (d *Drawing) putFirst(first int) {
	moved := func(i int) int {
		switch {
		case i == first:
			return 0
		case i < first:
			return i + 1
		}
		return i
	}
	for w := range d.WirePotential {
		d.WirePotential[w] = moved(d.WirePotential[w])
	}
	for i := range d.PinPotential {
		for k := range d.PinPotential[i] {
			d.PinPotential[i][k] = moved(d.PinPotential[i][k])
		}
	}
}

// listPins lists the pins of each potential in reading order.
func (d *Drawing) listPins() {
	type pin struct{ place, part, index int }
	pins := make([]pin, 0, 2*len(d.places))
	for i, places := range d.places {
		for k, place := range places {
			pins = append(pins, pin{place, i, k})
		}
	}
	slices.SortStableFunc(pins, func(a, b pin) int { return a.place - b.place })
	for _, p := range pins {
		part, potential := &d.Sheet.Parts[p.part], &d.Potentials[d.PinPotential[p.part][p.index]]
		potential.Pins = append(potential.Pins, part.Ref+":"+part.Kind.Pins[p.index].Name)
	}
}

// reference finds the potential of 0 V: the one that the sheet names, by name or by a pin; else that of the second pin of
// the first source; else the first in reading order. A name that is not on the sheet counts as none.
func (d *Drawing) reference() int {
	if wanted := d.Sheet.Reference; wanted != "" {
		if found, ok := d.named(wanted); ok {
			return found
		}
	}
	for i := range d.Sheet.Parts {
		if kind := d.Sheet.Parts[i].Kind; kind.Delivers && len(kind.Pins) > 1 {
			return d.PinPotential[i][1]
		}
	}
	return 0
}

// named finds a potential by its name or one of its pins.
func (d *Drawing) named(name string) (potential int, found bool) {
	for i := range d.Sheet.Parts {
		if d.nameOf(i) == name {
			return d.PinPotential[i][0], true
		}
	}
	for i := range d.Sheet.Parts {
		part := &d.Sheet.Parts[i]
		if len(name) > len(part.Ref) && name[:len(part.Ref)] == part.Ref {
			for k, pin := range part.Kind.Pins {
				if name == part.Ref+":"+pin.Name {
					return d.PinPotential[i][k], true
				}
			}
		}
	}
	return 0, false
}

// numberWires gives one wire number to all potentials that one conductor runs through: the lowest of their numbers.
func (d *Drawing) numberWires() {
	joined := newSets(len(d.Potentials))
	for _, branch := range d.Branches {
		if d.Sheet.Parts[branch.Part].Kind.SameConductor {
			joined.union(branch.From, branch.To)
		}
	}
	for i := range d.Potentials {
		d.Potentials[i].WireNumber = d.Potentials[joined.find(i)].Number
	}
}

// stateNames says where a name does not do what one expects of it: the reference is on no potential, or two names that
// ought to be apart are one potential. Earth is left out, since a circuit is joined to it on purpose.
func (d *Drawing) stateNames() {
	if wanted := d.Sheet.Reference; wanted != "" && len(d.Potentials) > 0 {
		if _, found := d.named(wanted); !found {
			instead := "the first potential"
			if pins := d.Potentials[0].Pins; len(pins) > 0 {
				instead = "the potential of -" + pins[0]
			}
			d.Statements = append(d.Statements, Statement{
				Rule: "reference", Says: fmt.Sprintf("The reference %s is not on the sheet; %s is taken as 0 V.", wanted, instead),
			})
		}
	}
	names := make([][]int, len(d.Potentials))
	for i := range d.Sheet.Parts {
		if name := d.nameOf(i); name != "" && d.Sheet.Parts[i].Kind == kinds.Potential {
			p := d.PinPotential[i][0]
			if !slices.ContainsFunc(names[p], func(other int) bool { return d.nameOf(other) == name }) {
				names[p] = append(names[p], i)
			}
		}
	}
	for _, parts := range names {
		if len(parts) < 2 {
			continue
		}
		one, other := &d.Sheet.Parts[parts[0]], &d.Sheet.Parts[parts[1]]
		d.Statements = append(d.Statements, Statement{
			Rule: "two-names", Refs: []string{one.Ref, other.Ref},
			Says: fmt.Sprintf("%s and %s are joined and are one potential.", d.nameOf(parts[0]), d.nameOf(parts[1])),
		})
	}
}
