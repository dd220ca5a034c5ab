package schematic

import "slices"

// A chain is a list of places, each on the row or the column of the one before: the way of a wire.

// straighten leaves out places that a chain passes without a corner, places that repeat, and stretches that go out and
// come straight back. It gives nil when nothing is left of the chain.
func straighten(points []Point) []Point {
	chain := make([]Point, 0, len(points))
	for _, p := range points {
		chain = append(chain, p)
		for len(chain) >= 2 {
			n := len(chain)
			if chain[n-1] == chain[n-2] {
				chain = chain[:n-1]
				continue
			}
			if n >= 3 && inLine(chain[n-3], chain[n-2], chain[n-1]) {
				chain = append(chain[:n-2], chain[n-1])
				continue
			}
			break
		}
	}
	if len(chain) < 2 {
		return nil
	}
	return chain
}

// smooth leaves out places that a chain passes without a corner and places that repeat. It gives nil when nothing is
// left of the chain. Unlike straighten it leaves no place aside that the chain led over.
func smooth(points []Point) []Point {
	points = slices.Compact(slices.Clone(points))
	var chain []Point
	for k, p := range points {
		if bends(points, k) {
			chain = append(chain, p)
		}
	}
	if len(chain) < 2 {
		return nil
	}
	return chain
}

// backward is a chain from its end to its beginning.
func backward(points []Point) []Point {
	list := slices.Clone(points)
	slices.Reverse(list)
	return list
}

func inLine(a, b, c Point) bool {
	return (a.X == b.X && b.X == c.X) || (a.Y == b.Y && b.Y == c.Y)
}

// leadsOver reports whether a chain passes a place, its ends included.
func leadsOver(chain []Point, p Point) bool {
	for i := 1; i < len(chain); i++ {
		if onSegment(p, chain[i-1], chain[i]) {
			return true
		}
	}
	return false
}

// nearest is the place on a chain that is nearest to another place. Of the stretches of the chain only those count that
// lead over a given place, if there are any.
func nearest(chain []Point, over, to Point) Point {
	anywhere := !leadsOver(chain, over)
	found, least := chain[0], -1
	for i := 1; i < len(chain); i++ {
		a, b := chain[i-1], chain[i]
		if !anywhere && !onSegment(over, a, b) {
			continue
		}
		p := Point{
			min(max(to.X, min(a.X, b.X)), max(a.X, b.X)),
			min(max(to.Y, min(a.Y, b.Y)), max(a.Y, b.Y)),
		}
		if far := distance(p, to); least < 0 || far < least {
			found, least = p, far
		}
	}
	return found
}

// distance is how far it is between two places along the grid.
func distance(a, b Point) int { return max(a.X-b.X, b.X-a.X) + max(a.Y-b.Y, b.Y-a.Y) }

// shifted is the place a vector away.
func (p Point) shifted(by Point) Point { return Point{p.X + by.X, p.Y + by.Y} }

// ways lists square ways between two places: straight or with one corner, with two corners at some steps in between,
// and round what lies on these.
func ways(from, to Point) [][]Point {
	var list [][]Point
	if from.X == to.X || from.Y == to.Y {
		list = append(list, []Point{from, to})
	} else {
		list = append(list, []Point{from, {to.X, from.Y}, to}, []Point{from, {from.X, to.Y}, to})
		half := Point{(from.X + to.X) / 2, (from.Y + to.Y) / 2}
		for _, off := range []int{0, 1, -1, 2, -2} {
			list = append(list, viaColumn(from, to, half.X+off), viaRow(from, to, half.Y+off))
		}
	}
	for _, off := range []int{1, 2, 3, 5, 8} {
		list = append(list,
			viaRow(from, to, min(from.Y, to.Y)-off), viaRow(from, to, max(from.Y, to.Y)+off),
			viaColumn(from, to, min(from.X, to.X)-off), viaColumn(from, to, max(from.X, to.X)+off))
	}
	return list
}

// viaColumn leads level to a column, along it, and level to the end.
func viaColumn(from, to Point, x int) []Point { return []Point{from, {x, from.Y}, {x, to.Y}, to} }

// viaRow leads upright to a row, along it, and upright to the end.
func viaRow(from, to Point, y int) []Point { return []Point{from, {from.X, y}, {to.X, y}, to} }
