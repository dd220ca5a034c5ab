package schematic

// straighten leaves out places that a chain passes without a corner, places that repeat, and stretches that go out and
// come straight back. It gives nil when nothing is left of the chain.
func straighten(points []Point) []Point {
	var chain []Point
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

// leadsOver reports whether a chain passes a place; of a chain of which nothing is left, whether its ends met there.
func leadsOver(chain []Point, p, end Point) bool {
	if chain == nil {
		return p == end
	}
	for i := 1; i < len(chain); i++ {
		if onSegment(p, chain[i-1], chain[i]) {
			return true
		}
	}
	return false
}

func inLine(a, b, c Point) bool {
	return (a.X == b.X && b.X == c.X) || (a.Y == b.Y && b.Y == c.Y)
}

// moved is the place a vector away.
func (p Point) moved(by Point) Point { return Point{p.X + by.X, p.Y + by.Y} }

// ways lists square ways between two places, plain ones first: straight or with one corner, and with two corners at
// each step in between. levelFirst prefers to begin horizontally.
func ways(from, to Point, levelFirst bool) [][]Point {
	if from.X == to.X || from.Y == to.Y {
		return append([][]Point{{from, to}}, detours(from, to)...)
	}
	level := []Point{from, {to.X, from.Y}, to}
	upright := []Point{from, {from.X, to.Y}, to}
	list := [][]Point{upright, level}
	if levelFirst {
		list = [][]Point{level, upright}
	}
	midX, midY := (from.X+to.X)/2, (from.Y+to.Y)/2
	for _, off := range []int{0, 1, -1, 2, -2} {
		list = append(list,
			[]Point{from, {midX + off, from.Y}, {midX + off, to.Y}, to},
			[]Point{from, {from.X, midY + off}, {to.X, midY + off}, to})
	}
	return append(list, detours(from, to)...)
}

// detours lead round what lies on the plain ways.
func detours(from, to Point) [][]Point {
	var list [][]Point
	for _, off := range []int{1, 2, 3, 5, 8} {
		for _, y := range []int{min(from.Y, to.Y) - off, max(from.Y, to.Y) + off} {
			list = append(list, []Point{from, {from.X, y}, {to.X, y}, to})
		}
		for _, x := range []int{min(from.X, to.X) - off, max(from.X, to.X) + off} {
			list = append(list, []Point{from, {x, from.Y}, {x, to.Y}, to})
		}
	}
	return list
}
