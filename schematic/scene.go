package schematic

// scene is what a new way of a wire could join by mistake: places that are hard to pass, and stretches of wire, each
// with the group of things that it belonged to before anything moved.
type scene struct {
	hard  []grouped[Point]
	lines []grouped[[2]Point]
}

type grouped[T any] struct {
	what  T
	group int
}

func (s *scene) addPlace(p Point, group int) {
	s.hard = append(s.hard, grouped[Point]{p, group})
}

func (s *scene) addChain(points []Point, group int) {
	for i, p := range points {
		s.addPlace(p, group)
		if i > 0 {
			s.lines = append(s.lines, grouped[[2]Point]{[2]Point{points[i-1], p}, group})
		}
	}
}

// clashes counts what a chain of the given group would join that belongs to another group.
func (s *scene) clashes(points []Point, group int) int {
	count := 0
	for i, p := range points {
		for _, line := range s.lines {
			if line.group != group && onSegment(p, line.what[0], line.what[1]) {
				count++
			}
		}
		if i == 0 {
			continue
		}
		for _, place := range s.hard {
			if place.group != group && onSegment(place.what, points[i-1], p) {
				count++
			}
		}
	}
	return count
}

// best chooses among chains the one that joins least by mistake, then the one with fewest corners, then the first. A
// chain of which nothing is left counts as the best of all, since then two ends have met.
func (s *scene) best(chains [][]Point, group int) []Point {
	var chosen []Point
	least := -1
	for _, chain := range chains {
		chain = straighten(chain)
		if chain == nil {
			return nil
		}
		cost := 1000*s.clashes(chain, group) + len(chain)
		if least < 0 || cost < least {
			chosen, least = chain, cost
		}
	}
	return chosen
}
