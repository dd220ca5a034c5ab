package schematic

import "slices"

// knot is a place at which a wire bends or something hangs on it.
type knot struct {
	at   Point
	held bool // something other than the wire lies there, so that the wire has to stay
}

// tie leads a wire that moves as a whole from what stays at its ends: from pins, and from wires that it ended on unless
// it only slides along them.
func (c *carry) tie(w int) {
	chain := c.now[w]
	for which := range 2 {
		if node := c.endNode(w, which); c.anchored(node, w) {
			chain = c.tieEnd(w, node, chain)
		}
		chain = backward(chain)
	}
	c.settle(w, straighten(chain), chain[0])
}

func (c *carry) tieEnd(w, node int, chain []Point) []Point {
	u := c.uses[node]
	from, to := c.before.Places[node], chain[0]
	start, pinned := from, slices.ContainsFunc(u.pins, func(pin pinAt) bool { return !c.moves[pin.part] })
	for _, at := range u.wires {
		if at.wire == w || c.whole[at.wire] || !at.passes {
			continue
		}
		near := nearest(c.now[at.wire], from, to)
		if near == to {
			return chain
		}
		if !pinned {
			start = near
		}
	}
	var list []way
	for _, points := range ways(start, to) {
		list = append(list, newWay(points, false))
	}
	return append(slices.Clone(c.scene.best(list, c.before.Wires[w])), chain[1:]...)
}

// settle gives a wire its new way; without one, its ends met at the given place and it is not needed any more.
func (c *carry) settle(w int, points []Point, met Point) {
	c.now[w] = points
	if points == nil {
		c.met[w] = met
		return
	}
	c.scene.addChain(points, c.before.Wires[w])
}

// goal is where the end of a wire at a place goes; false when it stays.
func (c *carry) goal(node, wire int) (Point, bool) {
	from := c.before.Places[node]
	to := c.goes(from)
	if !c.mayFollow(node, wire) {
		return from, false
	}
	u := c.uses[node]
	if slices.ContainsFunc(u.pins, func(pin pinAt) bool { return c.moves[pin.part] }) {
		return to, true
	}
	found := false
	for _, at := range u.wires {
		if c.whole[at.wire] && leadsOver(c.now[at.wire], from) {
			return from, false
		}
		found = found || (c.whole[at.wire] && leadsOver(c.now[at.wire], to))
	}
	return to, found
}

// lead leads the ends of a wire to where they follow.
func (c *carry) lead(w int) {
	knots := c.knots(w)
	ends := [2]int{c.endNode(w, 0), c.endNode(w, 1)}
	_, lastGoes := c.goal(ends[1], w)
	for which, node := range ends {
		to, goes := c.goal(node, w)
		if goes && knots != nil {
			loose := (which == 1 || !lastGoes) && c.mayTrim(ends[1-which], w)
			knots = c.leadEnd(knots, to, c.before.Wires[w], loose)
		}
		slices.Reverse(knots)
	}
	met, _ := c.goal(ends[0], w)
	c.settle(w, smooth(eachKnot(knots)), met)
}

func eachKnot(knots []knot) []Point {
	points := make([]Point, len(knots))
	for i := range knots {
		points[i] = knots[i].at
	}
	return points
}

func (c *carry) knots(w int) []knot {
	nodes := c.before.along[w]
	var list []knot
	for k, node := range nodes {
		end := k == 0 || k == len(nodes)-1
		u, p := c.uses[node], c.before.Places[node]
		held := !end && (len(u.pins) > 0 || len(u.wires) > 1 || u.wires[0].twice)
		corner := end || heading(c.before.Places[nodes[k-1]], p) != heading(p, c.before.Places[nodes[k+1]])
		if held || corner {
			list = append(list, knot{p, held})
		}
	}
	return list
}

// mayTrim reports whether an end of a wire that stays may slide along the wire that it ends on. It may not when it is
// what joins other wires there.
func (c *carry) mayTrim(node, wire int) bool {
	passing := 0
	for _, at := range c.uses[node].wires {
		if at.wire == wire {
			continue
		}
		if at.end {
			return true
		}
		passing++
	}
	return passing < 2 || len(c.uses[node].pins) > 0
}

// leadEnd leads the first end of a wire to another place, and changes it up to the first place where it has to stay.
// With loose, that may be its other end, which may slide along the wire that it ends on. It gives nil when the ends of
// the wire meet.
func (c *carry) leadEnd(knots []knot, to Point, group int, loose bool) []knot {
	keep := 1
	for keep < len(knots)-1 && !knots[keep].held {
		keep++
	}
	last := keep == len(knots)-1
	before := eachKnot(knots[:keep+1])
	var list []way
	for _, candidate := range candidates(before, to) {
		points := c.scene.trim(straighten(candidate.points), group)
		if last && loose {
			points = backward(c.scene.trim(backward(points), group))
		}
		way := newWay(points, candidate.keepsShape || (len(before) == 2 && len(points) == 2 && alike(before, points)))
		if n := len(points); n > 0 && !last && heading(points[n-2], points[n-1]) == heading(knots[keep+1].at, knots[keep].at) {
			way.cost += costOfBack
		}
		list = append(list, way)
	}
	points := c.scene.best(list, group)
	if points == nil && last {
		return nil
	}
	var led []knot
	for _, p := range points {
		led = append(led, knot{at: p})
	}
	if last {
		return led
	}
	return append(led[:max(0, len(led)-1)], knots[keep:]...)
}

// alike reports whether two chains begin along the same axis.
func alike(a, b []Point) bool { return (a[0].X == a[1].X) == (b[0].X == b[1].X) }

type candidate struct {
	points     []Point
	keepsShape bool
}

// candidates lists ways for the beginning of a wire, up to the last of the given places, that begin at another place from
// now on. Those keep the shape that a hand would draw: a stretch that lies across the motion is shifted, one that lies
// along it is stretched, and a straight wire gets a jog.
func candidates(points []Point, to Point) []candidate {
	last := points[len(points)-1]
	upright := points[0].X == points[1].X
	var list []candidate
	if len(points) > 2 {
		corner := Point{points[1].X, to.Y}
		if upright {
			corner = Point{to.X, points[1].Y}
		}
		list = append(list, candidate{append([]Point{to, corner}, points[2:]...), true})
	} else if upright {
		list = append(list, candidate{viaRow(to, last, (to.Y+last.Y)/2), true})
	} else {
		list = append(list, candidate{viaColumn(to, last, (to.X+last.X)/2), true})
	}
	for i := 1; i < len(points); i++ {
		for _, way := range ways(to, points[i]) {
			list = append(list, candidate{append(way, points[i+1:]...), false})
		}
	}
	return list
}
