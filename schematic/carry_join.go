package schematic

import (
	"maps"
	"slices"
)

// moveJoints takes joints along at which all wires move as a whole, and leaves out those whose wires no longer cross.
func (c *carry) moveJoints() {
	var joints []Point
	for _, joint := range c.d.Joints {
		u := c.uses[c.before.Node[joint]]
		switch {
		case u == nil:
			joints = append(joints, joint)
		case !slices.ContainsFunc(u.wires, func(at wireAt) bool { return !c.whole[at.wire] }):
			joints = append(joints, c.goes(joint))
		case c.crossing(u, joint):
			joints = append(joints, joint)
		}
	}
	c.d.Joints = joints
}

// crossing reports whether those wires that were joined at a place cross at another one.
func (c *carry) crossing(u *use, at Point) bool {
	var wires []Wire
	for _, each := range u.wires {
		if c.now[each.wire] != nil {
			wires = append(wires, Wire{Points: c.now[each.wire]})
		}
	}
	return crossedAt(wires, []Point{at})[at]
}

// keepJoined puts the new ways of the wires on the sheet and joins again what has come apart, with joints where wires
// still cross and with new wires otherwise. It gives what is joined then.
func (c *carry) keepJoined() *Joins {
	index := make([]int, len(c.now)) // in the new list
	var wires []Wire
	for w, points := range c.now {
		index[w] = -1
		if points != nil && c.double(w) {
			c.settle(w, nil, points[0])
		} else if points != nil {
			index[w] = len(wires)
			wires = append(wires, Wire{c.d.Wires[w].ID, points})
		}
	}
	c.d.Wires = wires
	for {
		after := Join(&c.d.Sheet)
		if !c.mend(after, index) {
			return after
		}
	}
}

// double reports whether another wire that stays or comes before is exactly like one that has got a new way.
func (c *carry) double(w int) bool {
	points := c.now[w]
	if &points[0] == &c.d.Wires[w].Points[0] {
		return false
	}
	return slices.ContainsFunc(c.now, func(other []Point) bool {
		return other != nil && &other[0] != &points[0] && (slices.Equal(points, other) || slices.Equal(points, backward(other)))
	})
}

// hold is one of the things that were joined at a place, as it is after the move.
type hold struct {
	group int     // in the joins after the move
	chain []Point // of a wire
	at    Point   // where a pin is, or the place of a wire that corresponds best to where it was joined
}

// mend joins what has come apart at each place, and reports whether there was anything to do.
func (c *carry) mend(after *Joins, index []int) bool {
	sets := newSets(after.Groups)
	found := false
	for _, node := range slices.Sorted(maps.Keys(c.uses)) {
		holds := c.holds(node, after, index)
		for i := 1; i < len(holds); i++ {
			if sets.find(holds[i].group) != sets.find(holds[0].group) {
				c.connect(node, holds[0], holds[i])
				sets.union(holds[i].group, holds[0].group)
				found = true
			}
		}
	}
	return found
}

func (c *carry) holds(node int, after *Joins, index []int) []hold {
	u := c.uses[node]
	from := c.before.Places[node]
	to := c.goes(from)
	var list []hold
	for _, pin := range u.pins {
		list = append(list, hold{group: after.Pins[pin.part][pin.pin], at: c.d.Parts[pin.part].pin(pin.pin)})
	}
	for _, at := range u.wires {
		chain := c.now[at.wire]
		if chain == nil {
			list = append(list, hold{group: c.groupAt(after, c.met[at.wire]), at: c.met[at.wire]})
			continue
		}
		place := nearest(chain, from, from)
		if c.whole[at.wire] || (at.end && !leadsOver(chain, from)) {
			place = nearest(chain, to, to)
		}
		list = append(list, hold{after.Wires[index[at.wire]], chain, place})
	}
	return list
}

// groupAt is the group of what lies at a place.
func (c *carry) groupAt(after *Joins, p Point) int {
	if node, known := after.Node[p]; known {
		return after.groups[node]
	}
	for w := range c.d.Wires {
		if leadsOver(c.d.Wires[w].Points, p) {
			return after.Wires[w]
		}
	}
	return 0
}

// connect joins two things that were joined at a place and have come apart: with a joint when they are wires that still
// cross, else with a new wire.
func (c *carry) connect(node int, a, b hold) {
	u := c.uses[node]
	if a.chain != nil && b.chain != nil {
		from := c.before.Places[node]
		to := c.goes(from)
		for _, p := range []Point{from, to, {to.X, from.Y}, {from.X, to.Y}} {
			if leadsOver(a.chain, p) && leadsOver(b.chain, p) && c.crossing(u, p) && !slices.Contains(c.d.Joints, p) {
				c.d.Joints = append(c.d.Joints, p)
				return
			}
		}
	}
	if a.chain != nil {
		a.at = nearest(a.chain, a.at, b.at)
	}
	if b.chain != nil {
		b.at = nearest(b.chain, b.at, a.at)
	}
	group := c.before.groups[node]
	var list []way
	for _, points := range ways(a.at, b.at) {
		list = append(list, newWay(points, false))
	}
	points := straighten(c.scene.best(list, group))
	if points == nil {
		return
	}
	wire := Wire{newWireNames(&c.d.Sheet)(), points}
	c.d.Wires = append(c.d.Wires, wire)
	c.d.made.Wires = append(c.d.made.Wires, wire.ID)
	c.scene.addChain(points, group)
}
