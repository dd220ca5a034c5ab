package schematic

import (
	"maps"
	"slices"
)

// carry moves parts and wires, and takes along what is joined to them: wires that end there follow and stay square,
// and where something that stays was touched directly a new wire keeps it joined. Routes are chosen so that nothing is
// joined which was not.
type carry struct {
	d      *draft
	before *Joins
	parts  map[int]Part    // what each moved part becomes, by index
	wires  map[int]bool    // wires that move as a whole
	by     Point           // how far these move
	to     map[Point]Point // where the moved pins and places of moved wires go
	uses   map[Point]*use  // what lies at each place that something joins
	was    []Part          // the parts before the move
	scene  scene
}

// use is what lies at a place.
type use struct {
	wires  map[int]bool // that pass or end there
	ends   map[int]bool // of those, the wires that end there
	stays  bool         // a pin of a part that does not move lies there
	pinned bool         // any pin lies there
	group  int
}

func newCarry(d *draft, parts map[int]Part, wires []int, by Point) *carry {
	c := &carry{d: d, before: Join(&d.Sheet), parts: parts, wires: map[int]bool{}, by: by, to: map[Point]Point{}, uses: map[Point]*use{}, was: slices.Clone(d.Parts)}
	for _, w := range wires {
		c.wires[w] = true
	}
	c.noteUses()
	c.notePins()
	c.followWhole()
	for w := range c.wires {
		for _, p := range c.before.placesOf(w) {
			if _, known := c.to[p]; !known {
				c.to[p] = p.moved(by)
			}
		}
	}
	return c
}

func (c *carry) useAt(p Point) *use {
	u := c.uses[p]
	if u == nil {
		u = &use{wires: map[int]bool{}, ends: map[int]bool{}}
		c.uses[p] = u
	}
	return u
}

func (c *carry) noteUses() {
	for w := range c.before.along {
		places := c.before.placesOf(w)
		for _, p := range places {
			u := c.useAt(p)
			u.wires[w] = true
			u.group = c.before.Wires[w]
		}
		c.useAt(places[0]).ends[w] = true
		c.useAt(places[len(places)-1]).ends[w] = true
	}
	for i := range c.d.Parts {
		_, moves := c.parts[i]
		for k, pin := range c.d.Parts[i].Kind.Pins {
			u := c.useAt(c.d.Parts[i].Pin(pin))
			u.pinned = true
			u.stays = u.stays || !moves
			u.group = c.before.Pins[i][k]
		}
	}
}

func (c *carry) notePins() {
	for _, i := range slices.Sorted(maps.Keys(c.parts)) {
		after := c.parts[i]
		for _, pin := range after.Kind.Pins {
			p := c.d.Parts[i].Pin(pin)
			if _, known := c.to[p]; !known {
				c.to[p] = after.Pin(pin)
			}
		}
	}
}

// anchored reports whether something at a place stays where it is: a pin, or a wire that passes.
func (c *carry) anchored(p Point) bool {
	u := c.uses[p]
	if u.stays {
		return true
	}
	for w := range u.wires {
		if !u.ends[w] && !c.wires[w] {
			return true
		}
	}
	return false
}

// followWhole lets wires move as a whole that run between moved things and to which nothing else is attached.
func (c *carry) followWhole() {
	for w := range c.before.along {
		places := c.before.placesOf(w)
		first, last := places[0], places[len(places)-1]
		to, ok := c.to[first]
		if !ok || c.wires[w] || c.anchored(first) || c.anchored(last) || c.to[last] != last.moved(offset(first, to)) || offset(first, to) != c.by {
			continue
		}
		free := true
		for _, p := range places {
			u := c.uses[p]
			_, goes := c.to[p]
			free = free && !u.stays && (goes || len(u.wires) == 1)
		}
		c.wires[w] = free
		if !free {
			delete(c.wires, w)
		}
	}
}

// partPin is where a pin of a part lay before the move.
func (c *carry) partPin(part int, name string) Point {
	pin, _ := c.was[part].Kind.Pin(name)
	return c.was[part].Pin(pin)
}

func offset(from, to Point) Point { return Point{to.X - from.X, to.Y - from.Y} }

// run makes the move on the draft.
func (c *carry) run() {
	d := c.d
	for i, part := range c.parts {
		d.Parts[i] = part
	}
	var follow []int
	for w := range d.Wires {
		switch {
		case c.wires[w]:
			d.Wires[w].Points = translated(d.Wires[w].Points, c.by)
		case c.follows(d.Wires[w].Points[0]) || c.follows(d.Wires[w].Points[len(d.Wires[w].Points)-1]):
			follow = append(follow, w)
		}
	}
	c.moveJoints()
	c.layScene(follow)
	gone := map[int]bool{}
	for _, w := range follow {
		points := c.reshaped(w)
		if points == nil {
			gone[w] = true
			continue
		}
		d.Wires[w].Points = points
		c.scene.addChain(points, c.before.Wires[w])
	}
	c.bridge()
	d.Wires = removeAll(slices.Clone(d.Wires), gone)
	d.dropDoubles()
	d.dropJoints()
}

func translated(points []Point, by Point) []Point {
	list := make([]Point, len(points))
	for i, p := range points {
		list[i] = p.moved(by)
	}
	return list
}

// follows reports whether a wire's end at a place goes along with what moves there.
func (c *carry) follows(p Point) bool {
	_, moves := c.to[p]
	return moves && !c.anchored(p)
}

// moveJoints takes a joint along when all wires through it move as a whole.
func (c *carry) moveJoints() {
	for i, joint := range c.d.Joints {
		all := true
		for w := range c.uses[joint].wires {
			all = all && c.wires[w]
		}
		if all {
			c.d.Joints[i] = joint.moved(c.by)
		}
	}
}

// layScene collects what is where after the move, but for the wires that still have to be reshaped.
func (c *carry) layScene(follow []int) {
	for i := range c.d.Parts {
		for k, pin := range c.d.Parts[i].Kind.Pins {
			c.scene.addPlace(c.d.Parts[i].Pin(pin), c.before.Pins[i][k])
		}
	}
	for w := range c.d.Wires {
		if !slices.Contains(follow, w) {
			c.scene.addChain(c.d.Wires[w].Points, c.before.Wires[w])
		}
	}
}

// reshaped is the new way of a wire of which one end or both follow; nil when its ends have met.
func (c *carry) reshaped(w int) []Point {
	points := c.d.Wires[w].Points
	first, last := points[0], points[len(points)-1]
	along := slices.Clone(c.before.placesOf(w))
	if c.follows(first) {
		points = c.leadEnd(w, points, along, c.to[first])
	}
	if points != nil && c.follows(last) {
		slices.Reverse(along)
		points = slices.Clone(points)
		slices.Reverse(points)
		points = c.leadEnd(w, points, along, c.to[last])
		slices.Reverse(points)
	}
	return points
}

// leadEnd leads the first end of a chain to another place. What hangs on the wire stays joined: the chain is changed
// only up to the first place to which something else is attached.
func (c *carry) leadEnd(w int, points, along []Point, to Point) []Point {
	points = straightenAround(points, along, c.uses)
	keep := len(points) - 1
	for i := 1; i < len(points)-1; i++ {
		if c.attached(w, points[i]) {
			keep = i
			break
		}
	}
	group := c.before.Wires[w]
	level := points[0].Y == points[1].Y
	var chains [][]Point
	if keep >= 2 {
		corner := Point{points[1].X, to.Y}
		if !level {
			corner = Point{to.X, points[1].Y}
		}
		chains = append(chains, append([]Point{to, corner}, points[2:]...))
	}
	for i := 1; i <= keep; i++ {
		for _, way := range ways(to, points[i], level) {
			chains = append(chains, slices.Concat(way, points[i+1:]))
		}
	}
	// A way that comes back on itself could be straightened past the place that has to stay.
	chains = slices.DeleteFunc(chains, func(chain []Point) bool { return !leadsOver(straighten(chain), points[keep], to) })
	return c.scene.best(chains, group)
}

// attached reports whether something other than the wire itself is at a place.
func (c *carry) attached(w int, p Point) bool {
	u := c.uses[p]
	return u != nil && (u.pinned || len(u.wires) > 1 || !u.wires[w])
}

// straightenAround gives a chain all places to which something is attached, and no other places without a corner.
func straightenAround(points, along []Point, uses map[Point]*use) []Point {
	isCorner := map[Point]bool{}
	for _, p := range points {
		isCorner[p] = true
	}
	chain := []Point{points[0]}
	for i := 1; i < len(along)-1; i++ {
		p := along[i]
		u := uses[p]
		attached := u != nil && (u.pinned || len(u.wires) > 1)
		if attached || (isCorner[p] && !inLine(chain[len(chain)-1], p, along[i+1])) {
			chain = append(chain, p)
		}
	}
	return append(chain, points[len(points)-1])
}

// bridge draws a wire wherever what stays and what goes were joined at one place.
func (c *carry) bridge() {
	next := newWireNames(&c.d.Sheet)
	places := slices.SortedFunc(maps.Keys(c.to), comparePoints)
	for _, p := range places {
		targets := c.targets(p)
		if c.anchored(p) {
			targets = append([]Point{p}, targets...)
		}
		for _, target := range targets[1:] {
			if target == targets[0] {
				continue
			}
			group := c.uses[p].group
			points := c.scene.best(ways(targets[0], target, p.Y == target.Y), group)
			wire := Wire{next(), points}
			c.d.Wires = append(c.d.Wires, wire)
			c.d.made.Wires = append(c.d.made.Wires, wire.ID)
			c.scene.addChain(points, group)
		}
	}
}

// targets lists where the things go that lie at a place and move; they part when parts turn about different points.
func (c *carry) targets(p Point) []Point {
	list := []Point{c.to[p]}
	add := func(target Point) {
		if !slices.Contains(list, target) {
			list = append(list, target)
		}
	}
	for _, i := range slices.Sorted(maps.Keys(c.parts)) {
		after := c.parts[i]
		for _, pin := range after.Kind.Pins {
			if c.partPin(i, pin.Name) == p {
				add(after.Pin(pin))
			}
		}
	}
	for w := range c.uses[p].wires {
		if c.wires[w] {
			add(p.moved(c.by))
		}
	}
	return list
}

// placesOf lists the places on a wire in the direction of drawing.
func (j *Joins) placesOf(w int) []Point {
	list := make([]Point, len(j.along[w]))
	for i, place := range j.along[w] {
		list[i] = j.Places[place]
	}
	return list
}
