package schematic

import (
	"hash/maphash"
	"slices"
	"unicode/utf8"
)

func checkWires(sheet *Sheet) error {
	names := make(map[string]bool, len(sheet.Wires))
	drawn := newDrawn(len(sheet.Wires))
	for i := range sheet.Wires {
		wire := &sheet.Wires[i]
		if err := checkWire(wire); err != nil {
			return below(err, at("wires", i))
		}
		if names[wire.ID] {
			return refuse(under(at("wires", i), "id"), "%q is the name of another wire; name it otherwise", wire.ID)
		}
		names[wire.ID] = true
		if first := drawn.add(sheet.Wires, i); first >= 0 {
			return refuse(at("wires", i), "wires[%d] is exactly the same; leave one out", first)
		}
	}
	return checkCrossings(sheet.Wires)
}

func checkWire(wire *Wire) error {
	if wire.ID == "" || utf8.RuneCountInString(wire.ID) > longestRef {
		return refuse("id", "a wire's name has 1 to %d characters", longestRef)
	}
	if err := checkSigns(wire.ID); err != nil {
		return below(err, "id")
	}
	return below(checkChain(wire.Points, false), "points")
}

// checkChain takes at least two places, each on the row or the column of the one before, and not the same unless repeats
// are let pass.
func checkChain(points []Point, repeats bool) error {
	if len(points) < 2 {
		return refuse("", "a wire needs at least two places")
	}
	for i, p := range points {
		if err := checkReach(p); err != nil {
			return below(err, at("", i))
		}
		if i == 0 {
			continue
		}
		before := points[i-1]
		switch {
		case p == before && !repeats:
			return refuse(at("", i), "the segment has no length; leave the place out")
		case p.X != before.X && p.Y != before.Y:
			return refuse(at("", i), "the segment is neither horizontal nor vertical; put a corner between")
		}
	}
	return nil
}

// drawn finds wires that are exactly alike, forwards or backwards.
type drawn struct {
	seed  maphash.Seed
	first map[uint64]int // the last wire of each hash
	next  []int          // the wire before that has the same hash; −1 for none
}

func newDrawn(wires int) *drawn {
	return &drawn{maphash.MakeSeed(), make(map[uint64]int, wires), make([]int, wires)}
}

// add takes the next wire and gives the index of an earlier one that is exactly like it, or −1.
func (d *drawn) add(wires []Wire, i int) int {
	hash := d.hash(wires[i].Points)
	other, known := d.first[hash]
	d.first[hash], d.next[i] = i, -1
	if known {
		d.next[i] = other
	}
	for k := d.next[i]; k >= 0; k = d.next[k] {
		if sameWay(wires[i].Points, wires[k].Points) {
			return k
		}
	}
	return -1
}

// hash is the same for a chain and its reverse.
func (d *drawn) hash(points []Point) uint64 {
	hash := uint64(0)
	for i, p := range points {
		q := points[len(points)-1-i]
		hash = hash*31 + maphash.Comparable(d.seed, p) + maphash.Comparable(d.seed, q)
	}
	return hash
}

// sameWay reports whether two chains lead over the same places, in the same or in the other direction.
func sameWay(a, b []Point) bool {
	if len(a) != len(b) {
		return false
	}
	forth, back := true, true
	for i, p := range a {
		forth = forth && p == b[i]
		back = back && p == b[len(b)-1-i]
	}
	return forth || back
}

func checkJoints(sheet *Sheet) error {
	if len(sheet.Joints) == 0 {
		return nil
	}
	seen := map[Point]bool{}
	crossed := crossedAt(sheet.Wires, sheet.Joints)
	for i, joint := range sheet.Joints {
		switch {
		case seen[joint]:
			return refuse(at("joints", i), "the joint is there twice; leave one out")
		case !crossed[joint]:
			return refuse(at("joints", i), "no wires cross here; a joint marks a crossing as joined")
		}
		seen[joint] = true
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
