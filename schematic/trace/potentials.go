package trace

import (
	"cmp"
	"slices"
	"strconv"
	"strings"

	"loopwright/schematic"
)

// findPotentials joins groups of one name and numbers what results.
func (d *Drawing) findPotentials() {
	sets := newSets(d.Joins.Groups)
	names := d.joinNames(sets)
	order, at := d.readingOrder(sets)
	d.Potentials = make([]Potential, len(order))
	for i, root := range order {
		d.Potentials[i].Name = names[root]
	}
	d.WirePotential = make([]int, len(d.Sheet.Wires))
	for w, group := range d.Joins.Wires {
		d.WirePotential[w] = at[sets.find(group)]
	}
	d.PinPotential = make([][]int, len(d.Sheet.Parts))
	for i, pins := range d.Joins.Pins {
		d.PinPotential[i] = make([]int, len(pins))
		for k, group := range pins {
			d.PinPotential[i][k] = at[sets.find(group)]
		}
	}
	d.listPins()
	d.putReferenceFirst()
	for i := range d.Potentials {
		d.Potentials[i].Number = strconv.Itoa(i)
	}
}

// joinNames unites the groups that potentials and earths give one name, and gives the name of each root.
func (d *Drawing) joinNames(sets sets) map[int]string {
	first := map[string]int{}
	for i := range d.Sheet.Parts {
		part := &d.Sheet.Parts[i]
		if part.Kind.Joins == nil {
			continue
		}
		name, group := part.Kind.Joins(part.Fill()), d.Joins.Pins[i][0]
		if other, known := first[name]; known {
			sets.union(other, group)
		} else {
			first[name] = group
		}
	}
	names := map[int]string{}
	for _, name := range sortedKeys(first) {
		root := sets.find(first[name])
		if names[root] == "" {
			names[root] = name
		}
	}
	return names
}

func sortedKeys(m map[string]int) []string {
	keys := make([]string, 0, len(m))
	for key := range m {
		keys = append(keys, key)
	}
	slices.Sort(keys)
	return keys
}

// readingOrder lists the roots by the first place at which each is met from the top left, and gives the way back.
func (d *Drawing) readingOrder(sets sets) (order []int, at map[int]int) {
	group := make([]int, len(d.Joins.Places))
	for i := range group {
		group[i] = -1
	}
	for i := range d.Sheet.Parts {
		for k, pin := range d.Sheet.Parts[i].Kind.Pins {
			group[d.Joins.Node[d.Sheet.Parts[i].Pin(pin)]] = d.Joins.Pins[i][k]
		}
	}
	for _, piece := range d.Joins.Pieces {
		group[d.Joins.Node[piece.From]] = d.Joins.Wires[piece.Wire]
		group[d.Joins.Node[piece.To]] = d.Joins.Wires[piece.Wire]
	}
	at = map[int]int{}
	for _, g := range group {
		if g < 0 {
			continue
		}
		if root := sets.find(g); !has(at, root) {
			at[root] = len(order)
			order = append(order, root)
		}
	}
	return order, at
}

func has[K comparable, V any](m map[K]V, key K) bool { _, ok := m[key]; return ok }

func (d *Drawing) listPins() {
	type placed struct {
		name string
		at   schematic.Point
	}
	lists := make([][]placed, len(d.Potentials))
	for i := range d.Sheet.Parts {
		part := &d.Sheet.Parts[i]
		for k, pin := range part.Kind.Pins {
			p := d.PinPotential[i][k]
			lists[p] = append(lists[p], placed{part.Ref + ":" + pin.Name, part.Pin(pin)})
		}
	}
	for i, list := range lists {
		slices.SortStableFunc(list, func(a, b placed) int {
			return cmp.Or(cmp.Compare(a.at.Y, b.at.Y), cmp.Compare(a.at.X, b.at.X))
		})
		d.Potentials[i].Pins = make([]string, len(list))
		for k, p := range list {
			d.Potentials[i].Pins[k] = p.name
		}
	}
}

// putReferenceFirst makes the reference potential number 0; the others keep their order.
func (d *Drawing) putReferenceFirst() {
	reference := d.reference()
	if reference == 0 {
		return
	}
	moved := func(i int) int {
		switch {
		case i == reference:
			return 0
		case i < reference:
			return i + 1
		}
		return i
	}
	front := d.Potentials[reference]
	d.Potentials = slices.Insert(slices.Delete(d.Potentials, reference, reference+1), 0, front)
	for w := range d.WirePotential {
		d.WirePotential[w] = moved(d.WirePotential[w])
	}
	for i := range d.PinPotential {
		for k := range d.PinPotential[i] {
			d.PinPotential[i][k] = moved(d.PinPotential[i][k])
		}
	}
}

// reference finds the potential of 0 V: the one that the sheet names, by name or by a pin; else that of the second pin
// of the first source; else the first in reading order. A name that is not on the sheet counts as none.
func (d *Drawing) reference() int {
	wanted := d.Sheet.Reference
	for i := range d.Sheet.Parts {
		if part := &d.Sheet.Parts[i]; part.Kind.Joins != nil && part.Kind.Joins(part.Fill()) == wanted {
			return d.PinPotential[i][0]
		}
	}
	if ref, name, found := cutLast(wanted); found {
		for i := range d.Sheet.Parts {
			if k := pinIndex(&d.Sheet.Parts[i], name); d.Sheet.Parts[i].Ref == ref && k >= 0 {
				return d.PinPotential[i][k]
			}
		}
	}
	for i := range d.Sheet.Parts {
		if part := &d.Sheet.Parts[i]; part.Kind.Delivers && len(part.Kind.Pins) > 1 {
			return d.PinPotential[i][1]
		}
	}
	return 0
}

// cutLast parts "K1:2:A1" into "K1:2" and "A1".
func cutLast(text string) (ref, pin string, found bool) {
	i := strings.LastIndexByte(text, ':')
	if i < 0 {
		return "", "", false
	}
	return text[:i], text[i+1:], true
}

func pinIndex(part *schematic.Part, name string) int {
	for k, pin := range part.Kind.Pins {
		if pin.Name == name {
			return k
		}
	}
	return -1
}

// numberWires gives one wire number to all potentials that one conductor runs through: the lowest of their numbers.
func (d *Drawing) numberWires() {
	sets := newSets(len(d.Potentials))
	for _, branch := range d.Branches {
		if d.Sheet.Parts[branch.Part].Kind.SameConductor {
			sets.union(branch.From, branch.To)
		}
	}
	lowest := map[int]string{}
	for i := range d.Potentials {
		root := sets.find(i)
		if lowest[root] == "" {
			lowest[root] = d.Potentials[i].Number
		}
		d.Potentials[i].WireNumber = lowest[root]
	}
}
