package schematic

import (
	"cmp"
	"slices"
)

// scene is what a new way of a wire has to mind. Each thing has the group that it belonged to before anything moved, so
// that ways are found that join nothing new.
type scene struct {
	spots  []spot    // pins, wire ends, corners and joints: a wire that passes there is joined
	lines  []stretch // stretches of wire: a wire that ends or turns there is joined
	bodies []stretch // the inside of parts between their pins, which a wire had better leave free
}

type spot struct {
	at    Point
	group int
}

type stretch struct {
	from, to Point
	group    int
}

func (s *scene) addPart(part *Part, groups []int) {
	for k := range part.Kind.Pins {
		at := part.pin(k)
		s.spots = append(s.spots, spot{at, groups[k]})
		for o := range k {
			from := part.pin(o)
			if (from.X == at.X || from.Y == at.Y) && distance(from, at) > 2 {
				step := heading(from, at)
				s.bodies = append(s.bodies, stretch{from.shifted(step), Point{at.X - step.X, at.Y - step.Y}, 0})
			}
		}
	}
}

func (s *scene) addChain(points []Point, group int) {
	for k, p := range points {
		if bends(points, k) {
			s.spots = append(s.spots, spot{p, group})
		}
		if k > 0 {
			s.lines = append(s.lines, stretch{points[k-1], p, group})
		}
	}
}

// What a way costs: a join that was not there weighs more than any detour, and running over a part more than most.
const (
	costOfJoin   = 10000
	costOfBody   = 300
	costOfBack   = 200 // going back along itself
	costOfCorner = 20
	costOfStep   = 1
	worthOfShape = 100 // what a way may cost more that keeps the shape of the wire
)

// price is what a way costs because of what lies about it.
func (s *scene) price(chain []Point, group int) int {
	price := 0
	for k, p := range chain {
		for i := range s.lines {
			if line := &s.lines[i]; line.group != group && onSegment(p, line.from, line.to) {
				price += costOfJoin
			}
		}
		if k == 0 {
			continue
		}
		for i := range s.spots {
			if spot := &s.spots[i]; spot.group != group && onSegment(spot.at, chain[k-1], p) {
				price += costOfJoin
			}
		}
		for i := range s.bodies {
			if meet(chain[k-1], p, s.bodies[i].from, s.bodies[i].to) {
				price += costOfBody
			}
		}
	}
	return price
}

// meet reports whether two horizontal or vertical stretches have a place in common.
func meet(a, b, c, d Point) bool {
	return max(min(a.X, b.X), min(c.X, d.X)) <= min(max(a.X, b.X), max(c.X, d.X)) &&
		max(min(a.Y, b.Y), min(c.Y, d.Y)) <= min(max(a.Y, b.Y), max(c.Y, d.Y))
}

// way is a chain that a wire might take. Points is empty when the wire is not needed any more.
type way struct {
	points []Point
	cost   int
}

// newWay prices a chain by its own shape. The chain is straightened.
func newWay(points []Point) way {
	cost := 0
	for k := 1; k < len(points); k++ {
		cost += costOfStep * distance(points[k-1], points[k])
	}
	return way{points, cost + costOfCorner*max(0, len(points)-2)}
}

// best chooses the way that costs least, of equal ones the first, and tells its cost.
func (s *scene) best(list []way, group int) ([]Point, int) {
	slices.SortStableFunc(list, func(a, b way) int { return cmp.Compare(a.cost, b.cost) })
	chosen, least := list[0].points, list[0].cost+s.price(list[0].points, group)
	for _, way := range list[1:] {
		if way.cost >= least {
			break
		}
		if cost := way.cost + s.price(way.points, group); cost < least {
			chosen, least = way.points, cost
		}
	}
	return chosen, least
}

// bestOf chooses among chains by what they cost.
func (s *scene) bestOf(chains [][]Point, group int) []Point {
	list := make([]way, len(chains))
	for i, chain := range chains {
		list[i] = newWay(straighten(chain))
	}
	points, _ := s.best(list, group)
	return points
}

// trim leaves out the beginning of a chain as far as it runs along stretches of its own group, which join what lies
// there anyway. It gives nil when that is all of the chain.
func (s *scene) trim(chain []Point, group int) []Point {
	for len(chain) > 1 {
		end := s.covered(chain[0], chain[1], group)
		if end == chain[0] {
			return chain
		}
		if end != chain[1] {
			return append([]Point{end}, chain[1:]...)
		}
		chain = chain[1:]
	}
	return nil
}

// covered is how far from one place toward another a stretch of the group runs along.
func (s *scene) covered(from, to Point, group int) Point {
	reached := from
	for i := range s.lines {
		line := &s.lines[i]
		if line.group != group || !inLine(line.from, line.to, from) || !inLine(line.from, line.to, to) || !onSegment(from, line.from, line.to) {
			continue
		}
		for _, end := range []Point{line.from, line.to, to} {
			if onSegment(end, from, to) && onSegment(end, line.from, line.to) && distance(from, end) > distance(from, reached) {
				reached = end
			}
		}
	}
	return reached
}
