package schematic

import "slices"

// carry moves parts and wires, and takes along what is joined to them: wires between moved things move as a whole, wires
// that end there follow and stay square, and what cannot follow is joined by a new wire. Ways are chosen so that nothing
// is joined which was not, and nothing comes apart which was joined.
type carry struct {
	d      *draft
	before *Joins
	goes   func(Point) Point // where what moves goes; distances stay as they are
	moves  []bool            // which parts move
	whole  []bool            // which wires move as a whole
	along  [][]int           // the places on each wire of the groups of what moves, by index in before.Places
	uses   map[int]*use      // what lies at each place of these groups, by the same index
	now    [][]Point         // the way of each wire after the move; nil when the wire is not needed any more
	met    map[int]Point     // where the ends of wires met that are not needed any more
	index  []int             // where each wire stands in the list after the move; −1 when it is not needed any more
	scene  scene
}

// use is what lies at a place.
type use struct {
	pins  []pinAt
	wires []wireAt
}

type pinAt struct{ part, pin int }

type wireAt struct {
	wire   int
	end    bool // it ends there
	passes bool // it bends there or goes straight on
	twice  bool // it comes there again
}

// mostSpans bounds how many stretches between places may hang on what moves at once.
const mostSpans = 1_000_000

// newCarry finds what moves along. It is a *PlaceError when that is more than any drawing has.
func newCarry(d *draft, parts, wires []int, goes func(Point) Point) (*carry, error) {
	c := &carry{d: d, before: Join(&d.Sheet), goes: goes, uses: map[int]*use{}, met: map[int]Point{}, moves: make([]bool, len(d.Parts)),
		whole: make([]bool, len(d.Wires)), along: make([][]int, len(d.Wires)), now: make([][]Point, len(d.Wires))}
	touched := make([]bool, c.before.Groups)
	for _, i := range parts {
		c.moves[i] = true
		for _, group := range c.before.Pins[i] {
			touched[group] = true
		}
	}
	for _, w := range wires {
		c.whole[w] = true
		touched[c.before.Wires[w]] = true
	}
	spans := 0
	for w, group := range c.before.Wires {
		if touched[group] {
			spans += c.before.spans(d.Wires[w].Points)
		}
	}
	if spans > mostSpans {
		return nil, refuse(d.place, "too many wires lie on one another to be moved; remove some of them first")
	}
	c.noteUses(touched)
	c.takeGroups(touched)
	for c.takeWires() {
	}
	return c, nil
}

func (c *carry) noteUses(touched []bool) {
	at := func(node int) *use {
		if c.uses[node] == nil {
			c.uses[node] = &use{}
		}
		return c.uses[node]
	}
	for i, groups := range c.before.Pins {
		for k, group := range groups {
			if touched[group] {
				u := at(c.before.Node[c.d.Parts[i].pin(k)])
				u.pins = append(u.pins, pinAt{i, k})
			}
		}
	}
	for w, group := range c.before.Wires {
		if !touched[group] {
			continue
		}
		c.along[w] = c.before.along(c.d.Wires[w].Points)
		for k, node := range c.along[w] {
			at(node).addWire(w, k == 0 || k == len(c.along[w])-1)
		}
	}
}

func (u *use) addWire(w int, end bool) {
	for i := range u.wires {
		if u.wires[i].wire == w {
			u.wires[i].end = u.wires[i].end || end
			u.wires[i].passes = u.wires[i].passes || !end
			u.wires[i].twice = true
			return
		}
	}
	u.wires = append(u.wires, wireAt{wire: w, end: end, passes: !end})
}

// takeGroups lets all wires of a group move as a whole when they lead from moved pins to moved pins only.
func (c *carry) takeGroups(touched []bool) {
	moved, fixed := make([]int, c.before.Groups), make([]bool, c.before.Groups)
	for node, u := range c.uses {
		group := c.before.groups[node]
		for _, pin := range u.pins {
			if c.moves[pin.part] {
				moved[group]++
			} else {
				fixed[group] = true
			}
		}
		// An end that hangs loose stays where it is.
		fixed[group] = fixed[group] || (len(u.pins) == 0 && len(u.wires) == 1 && u.wires[0].end && !u.wires[0].passes)
	}
	for w, group := range c.before.Wires {
		if touched[group] && moved[group] > 1 && !fixed[group] {
			c.whole[w] = true
		}
	}
}

// takeWires lets further wires move as a whole whose ends both lie on what moves, and tells whether there are any.
func (c *carry) takeWires() bool {
	found := false
	for w, nodes := range c.along {
		if c.whole[w] || nodes == nil {
			continue
		}
		ends := []int{nodes[0], nodes[len(nodes)-1]}
		free := !slices.ContainsFunc(ends, func(node int) bool { return !c.carried(node) })
		for _, node := range nodes {
			free = free && !c.anchored(node, w)
		}
		if free {
			c.whole[w], found = true, true
		}
	}
	return found
}

// carried reports whether something at a place moves: a pin, or a wire as a whole.
func (c *carry) carried(node int) bool {
	return c.pulled(node) || slices.ContainsFunc(c.uses[node].wires, func(at wireAt) bool { return c.whole[at.wire] })
}

// anchored reports whether something at a place keeps a wire from moving along: a pin that stays, or another wire that
// passes and does not move as a whole.
func (c *carry) anchored(node, wire int) bool {
	u := c.uses[node]
	return slices.ContainsFunc(u.pins, func(pin pinAt) bool { return !c.moves[pin.part] }) ||
		slices.ContainsFunc(u.wires, func(at wireAt) bool { return at.wire != wire && at.passes && !c.whole[at.wire] })
}

// run makes the move on the draft, where the parts stand in their new places already, and gives what is joined after it.
func (c *carry) run() *Joins {
	var led, tied []int
	for w := range c.d.Wires {
		c.now[w] = c.d.Wires[w].Points
		switch {
		case c.whole[w]:
			c.now[w] = each(c.now[w], c.goes)
			if c.end(w, 0, c.anchored) || c.end(w, 1, c.anchored) {
				tied = append(tied, w)
			}
		case c.along[w] == nil:
		case c.end(w, 0, c.mayFollow) || c.end(w, 1, c.mayFollow):
			led = append(led, w)
		}
	}
	c.layScene(tied, led)
	for _, w := range tied {
		c.tie(w)
	}
	for _, w := range led {
		c.lead(w)
	}
	c.moveJoints()
	after := c.keepJoined()
	c.d.dropJoints()
	return after
}

// end asks about the first end of a wire (0) or the last (1).
func (c *carry) end(w, which int, ask func(node, wire int) bool) bool {
	return ask(c.endNode(w, which), w)
}

// endNode is the place of the first end of a wire (0) or the last (1).
func (c *carry) endNode(w, which int) int { return c.along[w][which*(len(c.along[w])-1)] }

// mayFollow reports whether the end of a wire at a place goes along with what moves there.
func (c *carry) mayFollow(node, wire int) bool {
	return c.carried(node) && !c.anchored(node, wire)
}

// layScene collects all that keeps its way from here, which is all but some wires.
func (c *carry) layScene(but ...[]int) {
	later := make([]bool, len(c.now))
	for _, w := range slices.Concat(but...) {
		later[w] = true
	}
	c.scene.spots = make([]spot, 0, 2*len(c.d.Parts)+3*len(c.now))
	c.scene.lines = make([]stretch, 0, 2*len(c.now))
	c.scene.bodies = make([]stretch, 0, len(c.d.Parts))
	for i := range c.d.Parts {
		c.scene.addPart(&c.d.Parts[i], c.before.Pins[i])
	}
	for w, points := range c.now {
		if !later[w] {
			c.scene.addChain(points, c.before.Wires[w])
		}
	}
	for _, joint := range c.d.Joints {
		c.scene.spots = append(c.scene.spots, spot{joint, c.before.groups[c.before.Node[joint]]})
	}
}

func each(points []Point, change func(Point) Point) []Point {
	list := make([]Point, len(points))
	for i, p := range points {
		list[i] = change(p)
	}
	return list
}
