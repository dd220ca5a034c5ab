package schematic

import "slices"

// insertInSeries cuts a wire for a part of which two pins lie on one straight stretch of it with nothing between them, so
// that the part lies in series. May says whether the wire of a name may be cut for two pins. It gives those pins, or nil.
func (d *draft) insertInSeries(index int, may func(wire string, a, b int) bool) []int {
	part := &d.Parts[index]
	for b := range part.Kind.Pins {
		for a := range b {
			from, to := part.pin(a), part.pin(b)
			for w := range d.Wires {
				i := holding(d.Wires[w].Points, from, to)
				if i > 0 && may(d.Wires[w].ID, a, b) && d.clearBetween(index, w, from, to) {
					d.cut(w, i, from, to)
					return []int{a, b}
				}
			}
		}
	}
	return nil
}

// holding is the index of the end of that segment of a chain which leads over two places; 0 when there is none.
func holding(chain []Point, a, b Point) int {
	for i := 1; i < len(chain); i++ {
		if onSegment(a, chain[i-1], chain[i]) && onSegment(b, chain[i-1], chain[i]) {
			return i
		}
	}
	return 0
}

// clearBetween reports whether nothing is attached to a wire strictly between the two pins of a part, and no other wire
// runs along there.
func (d *draft) clearBetween(part, w int, a, b Point) bool {
	inside := func(p Point) bool { return p != a && p != b && onSegment(p, a, b) }
	for i := range d.Parts {
		for k := range d.Parts[i].Kind.Pins {
			if i != part && inside(d.Parts[i].pin(k)) {
				return false
			}
		}
	}
	for k := range d.Wires {
		if k != w && (slices.ContainsFunc(d.Wires[k].Points, inside) || holding(d.Wires[k].Points, a, b) > 0) {
			return false
		}
	}
	return !slices.ContainsFunc(d.Joints, inside)
}

// cut takes the stretch between two places out of segment i of a wire; what is left behind it becomes a new wire, and
// what another wire draws already is left out.
func (d *draft) cut(w, i int, a, b Point) {
	points := d.Wires[w].Points
	if onSegment(b, points[i-1], a) {
		a, b = b, a
	}
	head := d.undrawn(w, smooth(append(slices.Clone(points[:i]), a)))
	tail := d.undrawn(w, smooth(append([]Point{b}, points[i:]...)))
	switch {
	case head != nil && tail != nil:
		wire := Wire{d.wireName(), tail}
		d.Wires[w].Points = head
		d.Wires = append(d.Wires, wire)
		d.made.Wires = append(d.made.Wires, wire.ID)
	case head != nil:
		d.Wires[w].Points = head
	case tail != nil:
		d.Wires[w].Points = tail
	default:
		d.Wires = slices.Delete(d.Wires, w, w+1)
	}
	d.dropJoints()
}

// undrawn is a chain, or nil when a wire other than the one with the given index is exactly like it.
func (d *draft) undrawn(but int, chain []Point) []Point {
	for k := range d.Wires {
		if k != but && sameWay(d.Wires[k].Points, chain) {
			return nil
		}
	}
	return chain
}
