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
	switch {
	case len(parts)+len(wires) == 0:
		return refuse(d.place, "name the parts or wires to move")
	case edit.By == Point{}:
		return nil
	}
	return d.carry(parts, wires, func(p Point) Point { return p.shifted(edit.By) }, func(*Part) {})
}

// turn turns parts a quarter clockwise, or mirrors them left-right: one about its own origin, several about their middle.
func (d *draft) turn(edit *Edit) error {
	parts, err := d.parts(edit.Refs)
	if err != nil {
		return err
	}
	if len(parts) == 0 {
		return refuse(under(d.place, "refs"), "name the parts to %s", edit.Do)
	}
	center := d.middle(parts)
	if edit.Do == "flip" {
		return d.carry(parts, nil,
			func(p Point) Point { return Point{2*center.X - p.X, p.Y} },
			func(part *Part) { part.Flip, part.Turn = !part.Flip, (360-part.Turn)%360 })
	}
	return d.carry(parts, nil,
		func(p Point) Point { return Point{center.X - (p.Y - center.Y), center.Y + (p.X - center.X)} },
		func(part *Part) { part.Turn = (part.Turn + 90) % 360 })
}

// middle is the middle of the origins of several parts when it lies on the grid; otherwise it is the origin that lies
// nearest to it, so that four turns bring the parts back to where they were.
func (d *draft) middle(parts []int) Point {
	low, high := d.Parts[parts[0]].At, d.Parts[parts[0]].At
	for _, i := range parts {
		p := d.Parts[i].At
		low = Point{min(low.X, p.X), min(low.Y, p.Y)}
		high = Point{max(high.X, p.X), max(high.Y, p.Y)}
	}
	double := Point{low.X + high.X, low.Y + high.Y}
	if double.X%2 == 0 && double.Y%2 == 0 {
		return Point{double.X / 2, double.Y / 2}
	}
	far := func(i int) int {
		p := d.Parts[i].At
		return distance(Point{2 * p.X, 2 * p.Y}, double)
	}
	return d.Parts[slices.MinFunc(parts, func(a, b int) int { return far(a) - far(b) })].At
}

// carry takes parts and wires to where goes says; face sets how a part faces there. A part that comes to lie on a wire
// which it was not joined to goes in series.
func (d *draft) carry(parts, wires []int, goes func(Point) Point, face func(*Part)) error {
	c, err := newCarry(d, parts, wires, goes)
	if err != nil {
		return err
	}
	for _, i := range parts {
		part := &d.Parts[i]
		part.At = goes(part.At)
		face(part)
		if err := checkReach(part.At); err != nil {
			return below(err, d.place)
		}
	}
	old := d.Wires
	after := c.run()
	if !c.joinedAnew(after) {
		return nil
	}
	was := make(map[string]int, len(old)) // the group of each wire before, by its name
	for w := range old {
		was[old[w].ID] = c.before.Wires[w]
	}
	for _, i := range parts {
		pins := c.before.Pins[i]
		foreign := func(id string, a, b int) bool {
			group, known := was[id]
			return known && pins[a] != pins[b] && group != pins[a] && group != pins[b]
		}
		if d.insertInSeries(i, foreign) != nil {
			after = Join(&d.Sheet)
		}
	}
	d.noteJoins(c.before, after, was, c.moves)
	return nil
}

// noteJoins puts down in words what is joined now and was not before some parts or wires moved: for each group that has
// come about, one thing of each group before, of the moved parts if possible.
func (d *draft) noteJoins(before, after *Joins, wires map[string]int, moved []bool) {
	type name struct {
		group int // before
		text  string
	}
	met := make([][]name, after.Groups)
	note := func(was, is int, better bool, text func() string) {
		for i := range met[is] {
			if met[is][i].group == was {
				if better {
					met[is][i].text = text()
				}
				return
			}
		}
		met[is] = append(met[is], name{was, text()})
	}
	for i, groups := range before.Pins {
		for k, was := range groups {
			note(was, after.Pins[i][k], moved[i], func() string { return d.pinName(i, k) })
		}
	}
	for w, is := range after.Wires {
		if was, known := wires[d.Wires[w].ID]; known {
			note(was, is, false, func() string { return "wire " + d.Wires[w].ID })
		}
	}
	for _, names := range met {
		if len(names) < 2 {
			continue
		}
		texts := make([]string, len(names))
		for i := range names {
			texts[i] = names[i].text
		}
		d.made.Joined = append(d.made.Joined, inWords(texts)+" are joined now")
	}
}
