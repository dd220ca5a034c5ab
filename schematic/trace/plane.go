package trace

import (
	"cmp"
	"slices"

	"loopwright/schematic"
)

// edge is one line of the drawing between two places: a piece of wire, or a branch drawn straight from pin to pin.
type edge struct {
	from, to int // places
	branch   int // −1 for a piece of wire
	block    int // the block that it belongs to, −1 for a line that lies on no closed way
	// crossed marks a line that another one crosses or covers without being joined to it.
	crossed bool
}

// plane is the drawing as a graph of places and lines.
//
// A half edge is a line with a direction: 2i runs edge i from its first place to its second, 2i+1 back.
type plane struct {
	places  []schematic.Point // in reading order, as in Joins
	edges   []edge
	leaving []int // the half edges that leave place p, by direction, are leaving[start[p]:start[p+1]]
	start   []int
}

// plane lists the lines of the drawing.
func (d *Drawing) plane() *plane {
	g := &plane{places: d.Joins.Places, edges: make([]edge, 0, len(d.Joins.Pieces)+len(d.Branches))}
	for _, piece := range d.Joins.Pieces {
		g.edges = append(g.edges, edge{from: d.Joins.Node[piece.From], to: d.Joins.Node[piece.To], branch: -1})
	}
	for b := range d.Branches {
		from, to := d.ends(b)
		g.edges = append(g.edges, edge{from: from, to: to, branch: b})
	}
	g.turn()
	return g
}

// ends are the places between which a half edge runs.
func (g *plane) ends(half int) (from, to int) {
	e := &g.edges[half/2]
	if half%2 == 0 {
		return e.from, e.to
	}
	return e.to, e.from
}

// turn lists the half edges around each place clockwise, and marks those that leave in one direction: one covers the other.
func (g *plane) turn() {
	g.start = make([]int, len(g.places)+1)
	for i := range g.edges {
		g.start[g.edges[i].from+1]++
		g.start[g.edges[i].to+1]++
	}
	for p := range g.places {
		g.start[p+1] += g.start[p]
	}
	g.leaving = make([]int, 2*len(g.edges))
	next := slices.Clone(g.start)
	for half := range g.leaving {
		from, _ := g.ends(half)
		g.leaving[next[from]] = half
		next[from]++
	}
	for p := range g.places {
		around := g.leaving[g.start[p]:g.start[p+1]]
		slices.SortFunc(around, func(a, b int) int { return cmp.Or(g.compareDirections(a, b), cmp.Compare(a, b)) })
		for i := 1; i < len(around); i++ {
			if g.compareDirections(around[i-1], around[i]) == 0 {
				g.edges[around[i-1]/2].crossed, g.edges[around[i]/2].crossed = true, true
			}
		}
	}
}

// compareDirections orders half edges that leave one place clockwise as seen on the sheet, beginning to the right.
func (g *plane) compareDirections(a, b int) int {
	ax, ay := g.direction(a)
	bx, by := g.direction(b)
	lower := func(x, y int) int {
		if y > 0 || (y == 0 && x > 0) {
			return 0
		}
		return 1
	}
	return cmp.Or(cmp.Compare(lower(ax, ay), lower(bx, by)), cmp.Compare(ay*bx, ax*by))
}

// direction is the way from the start of a half edge to its end.
func (g *plane) direction(half int) (dx, dy int) {
	from, to := g.ends(half)
	return g.places[to].X - g.places[from].X, g.places[to].Y - g.places[from].Y
}
