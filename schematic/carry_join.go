package schematic

import (
	"maps"
	"slices"
)

// moveJoints takes joints along at which all wires move as a whole, and leaves out those whose wires no longer cross.
func (c *carry) moveJoints() {
	joints := c.d.Joints
	c.d.Joints = nil
	for _, joint := range joints {
		u := c.uses[c.before.Node[joint]]
		switch {
		case u == nil:
			c.addJoint(joint)
		case !slices.ContainsFunc(u.wires, func(at wireAt) bool { return !c.whole[at.wire] }):
			c.addJoint(c.goes(joint))
		case c.crossing(u, joint):
			c.addJoint(joint)
		}
	}
}

func (c *carry) addJoint(p Point) {
	if !slices.Contains(c.d.Joints, p) {
		c.d.Joints = append(c.d.Joints, p)
	}
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
	c.index = make([]int, len(c.now))
	wires := make([]Wire, 0, len(c.now))
	for w, points := range c.now {
		c.index[w] = -1
		if points != nil && c.double(w) {
			c.settle(w, nil, points[0])
		} else if points != nil {
			c.index[w] = len(wires)
			wires = append(wires, Wire{c.d.Wires[w].ID, points})
		}
	}
	c.d.Wires = wires
	after := Join(&c.d.Sheet)
	// One round is enough, unless a new wire has to leave something aside.
	for round := 0; round < mostRounds && c.mend(after); round++ {
		after = Join(&c.d.Sheet)
	}
	return after
}

// mostRounds bounds how often it is looked whether something has come apart.
const mostRounds = 8

// double reports whether another wire is exactly like one that has got a new way.
func (c *carry) double(w int) bool {
	points := c.now[w]
	if &points[0] == &c.d.Wires[w].Points[0] {
		return false
	}
	return slices.ContainsFunc(c.now, func(other []Point) bool {
		return other != nil && &other[0] != &points[0] && sameWay(points, other)
	})
}

// hold is one of the things that were joined at a place, as it is after the move.
type hold struct {
	group int     // in the joins after the move
	chain []Point // of a wire
	at    Point   // where a pin is, or the place of a wire that corresponds best to where it was joined
}

// mend joins what has come apart at each place, and reports whether there was anything to do.
func (c *carry) mend(after *Joins) bool {
	sets := newSets(after.Groups)
	found := false
	for _, node := range slices.Sorted(maps.Keys(c.uses)) {
		holds := c.holds(node, after)
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

func (c *carry) holds(node int, after *Joins) []hold {
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
		list = append(list, hold{after.Wires[c.index[at.wire]], chain, place})
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
	from := c.before.Places[node]
	to := c.goes(from)
	if a.chain != nil && b.chain != nil {
		for _, p := range []Point{from, to, {to.X, from.Y}, {from.X, to.Y}} {
			if leadsOver(a.chain, p) && leadsOver(b.chain, p) && c.crossing(u, p) {
				c.addJoint(p)
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
	if a.at == b.at {
		c.addJoint(a.at) // only wires that cross can share a place and be apart
		return
	}
	group := c.before.groups[node]
	points := c.scene.bestOf(ways(a.at, b.at), group)
	wire := Wire{c.d.wireName(), points}
	c.d.Wires = append(c.d.Wires, wire)
	c.d.made.Wires = append(c.d.made.Wires, wire.ID)
	c.scene.addChain(points, group)
}

// joinedAnew reports whether something is joined after the move that was not before.
func (c *carry) joinedAnew(after *Joins) bool {
	was := make([]int, after.Groups) // one more than the group before of what was met first in each group
	differs := func(before, now int) bool {
		if was[now] == 0 {
			was[now] = before + 1
		}
		return was[now] != before+1
	}
	for i, groups := range c.before.Pins {
		for k, group := range groups {
			if differs(group, after.Pins[i][k]) {
				return true
			}
		}
	}
	for w, group := range c.before.Wires {
		if c.index[w] >= 0 && differs(group, after.Wires[c.index[w]]) {
			return true
		}
	}
	return false
}
