package schematic

import (
	"slices"
	"unicode/utf8"
)

func checkWires(sheet *Sheet) error {
	names := make(map[string]bool, len(sheet.Wires))
	drawn := make(map[string]int, len(sheet.Wires))
	for i := range sheet.Wires {
		wire := &sheet.Wires[i]
		place := at("wires", i)
		if err := checkWireName(under(place, "id"), wire.ID); err != nil {
			return err
		}
		if names[wire.ID] {
			return refuse(under(place, "id"), "%q is the name of another wire; name it otherwise", wire.ID)
		}
		names[wire.ID] = true
		if err := checkChain(under(place, "points"), wire.Points); err != nil {
			return err
		}
		key := chainKey(wire.Points)
		if first, twice := drawn[key]; twice {
			return refuse(place, "wires[%d] is exactly the same; leave one out", first)
		}
		drawn[key] = i
	}
	return nil
}

func checkWireName(place, id string) error {
	if id == "" || utf8.RuneCountInString(id) > longestRef {
		return refuse(place, "a wire's name has 1 to %d characters", longestRef)
	}
	return checkName(place, id)
}

func checkChain(place string, points []Point) error {
	if len(points) < 2 {
		return refuse(place, "a wire needs at least two places")
	}
	for i, p := range points {
		if err := checkReach(at(place, i), p); err != nil {
			return err
		}
		if i == 0 {
			continue
		}
		before := points[i-1]
		switch {
		case p == before:
			return refuse(at(place, i), "the segment has no length; leave the place out")
		case p.X != before.X && p.Y != before.Y:
			return refuse(at(place, i), "the segment is neither horizontal nor vertical; put a corner between")
		}
	}
	return nil
}

// chainKey is the same for a chain of places and its reverse, and for no other.
func chainKey(points []Point) string {
	forth, back := make([]byte, 0, 8*len(points)), make([]byte, 0, 8*len(points))
	for i := range points {
		forth = appendPoint(forth, points[i])
		back = appendPoint(back, points[len(points)-1-i])
	}
	return min(string(forth), string(back))
}

func checkJoints(sheet *Sheet) error {
	seen := map[Point]bool{}
	for i, joint := range sheet.Joints {
		place := at("joints", i)
		if seen[joint] {
			return refuse(place, "the joint is there twice; leave one out")
		}
		seen[joint] = true
		if err := checkReach(place, joint); err != nil {
			return err
		}
	}
	crossed := crossedAt(sheet.Wires, sheet.Joints)
	for i, joint := range sheet.Joints {
		if !crossed[joint] {
			return refuse(at("joints", i), "no wires cross here; a joint marks a crossing as joined")
		}
	}
	return nil
}

// The four ways that lead from a place.
const (
	leftWay = 1 << iota
	rightWay
	upWay
	downWay
	allWays = leftWay | rightWay | upWay | downWay
)

// crossedAt tells at which of some places wires cross: where wires lead away to the left, to the right, up and down.
func crossedAt(wires []Wire, places []Point) map[Point]bool {
	if len(places) == 0 {
		return nil
	}
	rows, columns := map[int][]int{}, map[int][]int{}
	for _, p := range places {
		rows[p.Y] = append(rows[p.Y], p.X)
		columns[p.X] = append(columns[p.X], p.Y)
	}
	for _, line := range []map[int][]int{rows, columns} {
		for _, at := range line {
			slices.Sort(at)
		}
	}
	ways := make(map[Point]int, len(places))
	for w := range wires {
		points := wires[w].Points
		for i := 1; i < len(points); i++ {
			a, b := points[i-1], points[i]
			if a.Y == b.Y {
				noteWays(rows[a.Y], min(a.X, b.X), max(a.X, b.X), func(x, way int) { ways[Point{x, a.Y}] |= way })
			} else {
				noteWays(columns[a.X], min(a.Y, b.Y), max(a.Y, b.Y), func(y, way int) { ways[Point{a.X, y}] |= way << 2 })
			}
		}
	}
	crossed := make(map[Point]bool, len(places))
	for p, way := range ways {
		crossed[p] = way == allWays
	}
	return crossed
}

// noteWays calls note for each place of a line that a stretch covers, with the ways that it leads along there as if the
// line were level.
func noteWays(line []int, low, high int, note func(at, way int)) {
	first, _ := slices.BinarySearch(line, low)
	for _, at := range line[first:] {
		if at > high {
			return
		}
		way := 0
		if at > low {
			way |= leftWay
		}
		if at < high {
			way |= rightWay
		}
		note(at, way)
	}
}

// onSegment reports whether a place lies on a horizontal or vertical segment, its ends included.
func onSegment(p, from, to Point) bool {
	return p.X >= min(from.X, to.X) && p.X <= max(from.X, to.X) && p.Y >= min(from.Y, to.Y) && p.Y <= max(from.Y, to.Y)
}
