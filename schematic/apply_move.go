package schematic

import "slices"

func (d *draft) move(edit *Edit) error {
	parts, err := d.parts(edit.Refs)
	if err != nil {
		return err
	}
	wires, err := d.wires(edit.Wires)
	if err != nil {
		return err
	}
	if len(parts)+len(wires) == 0 {
		return refuse(d.place, "name the parts or wires to move")
	}
	moved := make(map[int]Part, len(parts))
	for _, i := range parts {
		part := d.Parts[i]
		part.At = part.At.moved(edit.By)
		if err := checkReach(under(d.place, "by"), part.At); err != nil {
			return err
		}
		moved[i] = part
	}
	c := newCarry(d, moved, wires, edit.By)
	single := len(parts) == 1 && len(wires) == 0 && c.loose(parts[0])
	c.run()
	if single {
		d.insertInSeries(parts[0])
	}
	d.noteJoins(c.before, parts)
	return nil
}

// loose reports whether nothing is joined to any pin of a part.
func (c *carry) loose(part int) bool {
	for _, pin := range c.d.Parts[part].Kind.Pins {
		u := c.uses[c.partPin(part, pin.Name)]
		if u.stays || len(u.wires) > 0 {
			return false
		}
	}
	return true
}

// turn turns parts a quarter clockwise, or mirrors them: one about its own origin, several about their middle.
func (d *draft) turn(edit *Edit) error {
	parts, err := d.parts(edit.Refs)
	if err != nil {
		return err
	}
	if len(parts) == 0 {
		return refuse(under(d.place, "refs"), "name the parts to %s", edit.Do)
	}
	center := d.Parts[parts[0]].At
	if len(parts) > 1 {
		center = d.middle(parts)
	}
	moved := make(map[int]Part, len(parts))
	for _, i := range parts {
		part := d.Parts[i]
		out := offset(center, part.At)
		if edit.Do == "flip" {
			part.At = Point{center.X - out.X, center.Y + out.Y}
			part.Flip = !part.Flip
			part.Turn = (360 - part.Turn) % 360
		} else {
			part.At = Point{center.X - out.Y, center.Y + out.X}
			part.Turn = (part.Turn + 90) % 360
		}
		if err := checkReach(d.place, part.At); err != nil {
			return err
		}
		moved[i] = part
	}
	c := newCarry(d, moved, nil, Point{})
	c.run()
	d.noteJoins(c.before, parts)
	return nil
}

// middle is the grid point in the middle of several parts.
func (d *draft) middle(parts []int) Point {
	low, high := d.Parts[parts[0]].At, d.Parts[parts[0]].At
	for _, i := range parts {
		p := d.Parts[i].At
		low = Point{min(low.X, p.X), min(low.Y, p.Y)}
		high = Point{max(high.X, p.X), max(high.Y, p.Y)}
	}
	return Point{(low.X + high.X) / 2, (low.Y + high.Y) / 2}
}

// insertInSeries cuts a wire when both pins of a part lie on one straight stretch of it with nothing between them, so
// that the part lies in series.
func (d *draft) insertInSeries(index int) {
	part := &d.Parts[index]
	if len(part.Kind.Pins) != 2 {
		return
	}
	a, b := part.Pin(part.Kind.Pins[0]), part.Pin(part.Kind.Pins[1])
	for w := range d.Wires {
		points := d.Wires[w].Points
		for i := 1; i < len(points); i++ {
			if !onSegment(a, points[i-1], points[i]) || !onSegment(b, points[i-1], points[i]) {
				continue
			}
			if !d.clearBetween(index, w, a, b) {
				return
			}
			d.cut(w, i, a, b)
			return
		}
	}
}

// clearBetween reports whether no other part touches a wire between the two pins of a part, or at them, nothing else is
// attached strictly between, and no other wire runs along there.
func (d *draft) clearBetween(part, w int, a, b Point) bool {
	inside := func(p Point) bool { return p != a && p != b && onSegment(p, a, b) }
	for i := range d.Parts {
		for _, pin := range d.Parts[i].Kind.Pins {
			if i != part && onSegment(d.Parts[i].Pin(pin), a, b) {
				return false
			}
		}
	}
	for k, wire := range d.Wires {
		if k == w {
			continue
		}
		for i, p := range wire.Points {
			if inside(p) || (i > 0 && onSegment(a, wire.Points[i-1], p) && onSegment(b, wire.Points[i-1], p)) {
				return false
			}
		}
	}
	return !slices.ContainsFunc(d.Joints, inside)
}

// cut takes the stretch between two places out of segment i of a wire; what is left behind it becomes a new wire.
func (d *draft) cut(w, i int, a, b Point) {
	points := d.Wires[w].Points
	if onSegment(b, points[i-1], a) {
		a, b = b, a
	}
	head := straighten(append(slices.Clone(points[:i]), a))
	tail := straighten(append([]Point{b}, points[i:]...))
	switch {
	case head != nil && tail != nil:
		d.Wires[w].Points = head
		wire := Wire{newWireNames(&d.Sheet)(), tail}
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
