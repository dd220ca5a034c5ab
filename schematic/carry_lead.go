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
	return append(slices.Clone(c.scene.bestOf(ways(start, to), c.before.Wires[w])), chain[1:]...)
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
	if c.pulled(node) {
		return to, true
	}
	u := c.uses[node]
	found := false
	for _, at := range u.wires {
		if c.whole[at.wire] && leadsOver(c.now[at.wire], from) {
			return from, false
		}
		found = found || (c.whole[at.wire] && leadsOver(c.now[at.wire], to))
	}
	return to, found
}

// pulled reports whether a pin at a place moves.
func (c *carry) pulled(node int) bool {
	return slices.ContainsFunc(c.uses[node].pins, func(pin pinAt) bool { return c.moves[pin.part] })
}

// lead leads the ends of a wire to where they follow.
func (c *carry) lead(w int) {
	knots := c.knots(w)
	ends := [2]int{c.endNode(w, 0), c.endNode(w, 1)}
	_, lastGoes := c.goal(ends[1], w)
	for which, node := range ends {
		to, goes := c.goal(node, w)
		if goes && knots != nil {
			slides := [2]bool{c.pulled(node), (which == 1 || !lastGoes) && c.mayTrim(ends[1-which], w)}
			knots = c.leadEnd(knots, to, c.before.Wires[w], slides)
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
	nodes := c.along[w]
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
// Slides tells whether this end, and whether the other one if the wire is changed that far, may slide along a wire that it
// comes to lie on. It gives nil when the ends of the wire meet.
func (c *carry) leadEnd(knots []knot, to Point, group int, slides [2]bool) []knot {
	keep := 1
	for keep < len(knots)-1 && !knots[keep].held {
		keep++
	}
	last := keep == len(knots)-1
	slides[1] = slides[1] && last
	behind := knots[keep:]
	before := eachKnot(knots[:keep+1])
	shaped := c.price(shapes(before, to), behind, slides, group)
	if len(before) == 2 && len(shaped[1].points) != 2 {
		shaped = shaped[:1] // it does not slide
	}
	for i := range shaped {
		shaped[i].cost -= worthOfShape
	}
	points, cost := c.scene.best(shaped, group)
	if cost > distance(to, before[keep]) {
		others := c.price(detours(before, to), behind, slides, group)
		points, _ = c.scene.best(append(shaped, others...), group)
	}
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

// price makes ways of the chains that the beginning of a wire could take, with the ends that slide left out where they
// run along other wires. Behind are the places of the wire from the end of the chains on.
func (c *carry) price(chains [][]Point, behind []knot, slides [2]bool, group int) []way {
	list := make([]way, 0, len(chains))
	for _, chain := range chains {
		points := straighten(chain)
		if slides[0] {
			points = c.scene.trim(points, group)
		}
		if slides[1] {
			points = backward(c.scene.trim(backward(points), group))
		}
		way := newWay(points)
		if n := len(points); n > 0 && len(behind) > 1 && heading(points[n-2], points[n-1]) == heading(behind[1].at, behind[0].at) {
			way.cost += costOfBack
		}
		list = append(list, way)
	}
	return list
}

// shapes lists ways for the beginning of a wire, up to the last of the given places, that keep the shape that a hand drew
// when it begins at another place: a stretch that lies across the motion is shifted, one that lies along it is stretched,
// and a straight wire slides or gets a jog.
func shapes(points []Point, to Point) [][]Point {
	last := points[len(points)-1]
	upright := points[0].X == points[1].X
	corner := Point{points[1].X, to.Y}
	if upright {
		corner = Point{to.X, points[1].Y}
	}
	switch {
	case len(points) > 2:
		return [][]Point{append([]Point{to, corner}, points[2:]...)}
	case upright:
		return [][]Point{viaRow(to, last, (to.Y+last.Y)/2), {to, corner, last}}
	}
	return [][]Point{viaColumn(to, last, (to.X+last.X)/2), {to, corner, last}}
}

// detours lists other ways for it, which leave out more and more of its places.
func detours(points []Point, to Point) [][]Point {
	var list [][]Point
	for i := 1; i < len(points); i++ {
		for _, way := range ways(to, points[i]) {
			list = append(list, append(way, points[i+1:]...))
		}
	}
	return list
}
