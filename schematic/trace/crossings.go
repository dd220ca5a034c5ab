package trace

import (
	"cmp"
	"math"
	"slices"
	"sort"

	"loopwright/schematic"
)

// markCrossed marks the edges that cross another edge, or a place where something joins, without being joined there.
func markCrossed(edges []edge, places []schematic.Point) {
	lines := newLines(edges, places)
	for i := range edges {
		e := &edges[i]
		switch {
		case e.from.X == e.to.X:
			lines.crossUpright(edges, i)
		case e.from.Y == e.to.Y:
			if e.branch >= 0 {
				e.crossed = e.crossed || between(lines.placesLevel[e.from.Y], e.from.X, e.to.X)
			}
		default:
			lines.crossSlanted(edges, i, places)
		}
	}
}

// lines holds level edges and all places by row, and places by column, each in ascending order.
type lines struct {
	level         map[int][]int // y → edges, by their left ends
	placesLevel   map[int][]int // y → x
	placesUpright map[int][]int // x → y
}

func newLines(edges []edge, places []schematic.Point) *lines {
	l := &lines{map[int][]int{}, map[int][]int{}, map[int][]int{}}
	for i := range edges {
		if e := &edges[i]; e.from.Y == e.to.Y {
			l.level[e.from.Y] = append(l.level[e.from.Y], i)
		}
	}
	for _, row := range l.level {
		slices.SortFunc(row, func(a, b int) int { return cmp.Compare(left(&edges[a]), left(&edges[b])) })
	}
	for _, p := range places {
		l.placesLevel[p.Y] = append(l.placesLevel[p.Y], p.X)
		l.placesUpright[p.X] = append(l.placesUpright[p.X], p.Y)
	}
	for _, row := range l.placesLevel {
		sort.Ints(row)
	}
	for _, column := range l.placesUpright {
		sort.Ints(column)
	}
	return l
}

func left(e *edge) int  { return min(e.from.X, e.to.X) }
func right(e *edge) int { return max(e.from.X, e.to.X) }

// between reports whether any number of an ascending list lies strictly between two bounds.
func between(ascending []int, a, b int) bool {
	low, high := min(a, b), max(a, b)
	i := sort.SearchInts(ascending, low+1)
	return i < len(ascending) && ascending[i] < high
}

// crossUpright marks an upright edge together with the level edges that pass between its ends.
func (l *lines) crossUpright(edges []edge, i int) {
	e := &edges[i]
	if e.branch >= 0 && between(l.placesUpright[e.from.X], e.from.Y, e.to.Y) {
		e.crossed = true
	}
	for y := min(e.from.Y, e.to.Y) + 1; y < max(e.from.Y, e.to.Y); y++ {
		row := l.level[y]
		next := sort.Search(len(row), func(k int) bool { return left(&edges[row[k]]) >= e.from.X })
		for k := next - 1; k >= 0 && k >= next-overlapping; k-- {
			if right(&edges[row[k]]) > e.from.X {
				e.crossed, edges[row[k]].crossed = true, true
			}
		}
	}
}

// overlapping is how many level edges of one row are looked at: wires never overlap there, and parts rarely do.
const overlapping = 8

// crossSlanted marks a slanted edge, and whatever its box touches: a slanted line on a grid is only ever the short way
// between two pins of one part.
func (l *lines) crossSlanted(edges []edge, i int, places []schematic.Point) {
	e := &edges[i]
	for k := range edges {
		if k != i && segmentsCross(e, &edges[k]) {
			e.crossed, edges[k].crossed = true, true
		}
	}
	for _, p := range places {
		if p != e.from && p != e.to && distanceToSegment(p, e) == 0 {
			e.crossed = true
		}
	}
}

// segmentsCross reports whether two edges meet at a point that is inside both.
func segmentsCross(a, b *edge) bool {
	side := func(p, q, r schematic.Point) int {
		return cmp.Compare((q.X-p.X)*(r.Y-p.Y)-(q.Y-p.Y)*(r.X-p.X), 0)
	}
	return side(a.from, a.to, b.from)*side(a.from, a.to, b.to) < 0 && side(b.from, b.to, a.from)*side(b.from, b.to, a.to) < 0
}

// distanceToSegment is how far a place lies from an edge, in grid steps.
func distanceToSegment(p schematic.Point, e *edge) float64 {
	dx, dy := float64(e.to.X-e.from.X), float64(e.to.Y-e.from.Y)
	px, py := float64(p.X-e.from.X), float64(p.Y-e.from.Y)
	t := math.Max(0, math.Min(1, (px*dx+py*dy)/(dx*dx+dy*dy)))
	return math.Hypot(px-t*dx, py-t*dy)
}
