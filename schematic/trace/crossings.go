package trace

import (
	"cmp"
	"slices"
	"sort"

	"loopwright/schematic"
)

// markCrossed marks the lines that cross another one without being joined to it, and branches that run over a place to
// which they are not joined. Its cost is O(n log n), and O(n) more for each slanted line; slanted are only the short ways
// between pins of parts that have more than two.
func (g *plane) markCrossed(node map[schematic.Point]int) {
	g.markCovered(node)
	g.sweep(func(p schematic.Point) (across, along int) { return p.X, p.Y })
	g.sweep(func(p schematic.Point) (across, along int) { return p.Y, p.X })
	for i := range g.edges {
		if a, b := g.line(i); a.X != b.X && a.Y != b.Y {
			g.crossSlanted(i)
		}
	}
}

// line gives the two places of an edge.
func (g *plane) line(i int) (from, to schematic.Point) {
	return g.places[g.edges[i].from], g.places[g.edges[i].to]
}

// An event of a sweep, in the order in which those of one row are taken: lines that end, then questions, then lines that
// begin. So a line that only touches a row is never there when the row asks.
const (
	ends = iota
	asks
	begins
)

type event struct {
	order     int // three times the row, plus the kind
	low, high int // columns: of a line its own twice, of a question the bounds that do not count themselves
	edge      int // that asks, −1 for a line
}

// sweep marks the level lines that an upright line crosses. A row moves down the sheet and counts the upright lines that it
// cuts, by column. What is level and upright depends on how points are read, so that a second sweep does the same for
// upright lines.
func (g *plane) sweep(read func(schematic.Point) (across, along int)) {
	events := make([]event, 0, 2*len(g.edges))
	columns := make([]int, 0, len(g.places))
	for i := range g.edges {
		a, b := g.line(i)
		x1, y1 := read(a)
		x2, y2 := read(b)
		switch {
		case x1 == x2:
			events = append(events, event{3*min(y1, y2) + begins, x1, x1, -1}, event{3*max(y1, y2) + ends, x1, x1, -1})
			columns = append(columns, x1)
		case y1 == y2:
			events = append(events, event{3*y1 + asks, min(x1, x2), max(x1, x2), i})
		}
	}
	slices.Sort(columns)
	columns = slices.Compact(columns)
	slices.SortFunc(events, func(a, b event) int { return a.order - b.order })
	active := newCounter(len(columns))
	for _, e := range events {
		low := sort.SearchInts(columns, e.low)
		switch (e.order%3 + 3) % 3 {
		case begins:
			active.add(low, 1)
		case ends:
			active.add(low, -1)
		default:
			if low < len(columns) && columns[low] == e.low {
				low++
			}
			if active.sum(sort.SearchInts(columns, e.high)) > active.sum(low) {
				g.edges[e.edge].crossed = true
			}
		}
	}
}

// markCovered marks the branches that run over a place. Pieces of wire never do, since they end at every place.
func (g *plane) markCovered(node map[schematic.Point]int) {
	for i := range g.edges {
		if g.edges[i].branch < 0 {
			continue
		}
		a, b := g.line(i)
		dx, dy := b.X-a.X, b.Y-a.Y
		points := commonDivisor(dx, dy) // grid points on the branch, one of its ends included
		for k := 1; k < points; k++ {
			if _, covered := node[schematic.Point{X: a.X + k*dx/points, Y: a.Y + k*dy/points}]; covered {
				g.edges[i].crossed = true
			}
		}
	}
}

// commonDivisor is the greatest common divisor of two whole numbers.
func commonDivisor(a, b int) int {
	for b != 0 {
		a, b = b, a%b
	}
	return max(a, -a)
}

// crossSlanted marks a slanted line together with all that it crosses.
func (g *plane) crossSlanted(i int) {
	a, b := g.line(i)
	for k := range g.edges {
		c, d := g.line(k)
		if side(a, b, c)*side(a, b, d) < 0 && side(c, d, a)*side(c, d, b) < 0 {
			g.edges[i].crossed, g.edges[k].crossed = true, true
		}
	}
}

// side tells on which side of the line from a to b a point lies: 1, −1, or 0 on it.
func side(a, b, p schematic.Point) int {
	return cmp.Compare((b.X-a.X)*(p.Y-a.Y), (b.Y-a.Y)*(p.X-a.X))
}

// counter counts things at numbered places and sums the counts below a place, each in O(log n) (Fenwick, "A new data
// structure for cumulative frequency tables", Software: Practice and Experience 24, 1994).
type counter []int

func newCounter(n int) counter { return make(counter, n+1) }

func (c counter) add(place, count int) {
	for i := place + 1; i < len(c); i += i & -i {
		c[i] += count
	}
}

func (c counter) sum(below int) int {
	total := 0
	for i := below; i > 0; i -= i & -i {
		total += c[i]
	}
	return total
}
