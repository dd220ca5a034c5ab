package schematic

import (
	"cmp"
	"slices"
	"sort"
)

// Piece is a straight stretch of wire between two neighbouring places of a sheet.
type Piece struct {
	Wire     int // index in Sheet.Wires of the first wire that is drawn there
	From, To Point
}

// Joins tells what the geometry of a sheet joins with what. Names of potentials are not looked at.
//
// Two things join when a pin or a wire end lies on a pin, a wire end or a wire, where a wire's corner lies on a wire,
// where wires run along one another, and where a joint marks a crossing. So whatever passes through one place is joined
// there, and a crossing that does not join is no place.
type Joins struct {
	Places    []Point       // in reading order: by y, then by x
	Node      map[Point]int // index in Places
	Pieces    []Piece       // by wire, in the direction of drawing; a stretch that is drawn twice appears once
	Wires     []int         // the group of each wire
	Pins      [][]int       // the group of each pin of each part
	Groups    int           // how many groups of joined things there are
	Dots      []Point       // places where three or more ways meet, in reading order
	Crossings []Point       // where pieces cross without joining

	along [][]Point // the places on each wire, in the direction of drawing
}

// Join finds what is joined on a sheet. Its cost is O(n log n) in the number of pins and wire corners, and one step for
// each row that an upright piece passes.
func Join(sheet *Sheet) *Joins {
	joins := &Joins{Node: map[Point]int{}}
	joins.collectPlaces(sheet)
	joins.cutWires(sheet)
	joins.group(sheet)
	joins.findDots(sheet)
	joins.findCrossings()
	return joins
}

// comparePoints orders places as one reads: from the top, and from the left.
func comparePoints(a, b Point) int { return cmp.Or(cmp.Compare(a.Y, b.Y), cmp.Compare(a.X, b.X)) }

func (j *Joins) collectPlaces(sheet *Sheet) {
	add := func(p Point) {
		if _, known := j.Node[p]; !known {
			j.Node[p] = 0
			j.Places = append(j.Places, p)
		}
	}
	for i := range sheet.Parts {
		for _, pin := range sheet.Parts[i].Kind.Pins {
			add(sheet.Parts[i].Pin(pin))
		}
	}
	for _, wire := range sheet.Wires {
		for _, p := range wire.Points {
			add(p)
		}
	}
	for _, p := range sheet.Joints {
		add(p)
	}
	slices.SortFunc(j.Places, comparePoints)
	for i, p := range j.Places {
		j.Node[p] = i
	}
}

// rows holds places in lines, so that those on a segment are found by bisection.
type rows struct {
	level   map[int][]int // y → x ascending
	upright map[int][]int // x → y ascending
}

func (j *Joins) rows() rows {
	r := rows{map[int][]int{}, map[int][]int{}}
	for _, p := range j.Places {
		r.level[p.Y] = append(r.level[p.Y], p.X)
		r.upright[p.X] = append(r.upright[p.X], p.Y)
	}
	for _, ys := range r.upright {
		sort.Ints(ys)
	}
	return r
}

// along lists the places on a segment from one end to the other, both included.
func (r rows) along(from, to Point) []Point {
	level := from.Y == to.Y
	line, low, high := r.upright[from.X], min(from.Y, to.Y), max(from.Y, to.Y)
	if level {
		line, low, high = r.level[from.Y], min(from.X, to.X), max(from.X, to.X)
	}
	first := sort.SearchInts(line, low)
	last := sort.SearchInts(line, high+1)
	places := make([]Point, 0, last-first)
	for _, at := range line[first:last] {
		if level {
			places = append(places, Point{at, from.Y})
		} else {
			places = append(places, Point{from.X, at})
		}
	}
	if comparePoints(from, to) > 0 {
		slices.Reverse(places)
	}
	return places
}

func (j *Joins) cutWires(sheet *Sheet) {
	lines := j.rows()
	drawn := map[[2]int]bool{}
	j.along = make([][]Point, len(sheet.Wires))
	for w, wire := range sheet.Wires {
		j.along[w] = append(j.along[w], wire.Points[0])
		for i := 1; i < len(wire.Points); i++ {
			places := lines.along(wire.Points[i-1], wire.Points[i])
			j.along[w] = append(j.along[w], places[1:]...)
			for k := 1; k < len(places); k++ {
				a, b := j.Node[places[k-1]], j.Node[places[k]]
				if key := [2]int{min(a, b), max(a, b)}; !drawn[key] {
					drawn[key] = true
					j.Pieces = append(j.Pieces, Piece{w, places[k-1], places[k]})
				}
			}
		}
	}
}

func (j *Joins) group(sheet *Sheet) {
	sets := newSets(len(j.Places))
	for _, piece := range j.Pieces {
		sets.union(j.Node[piece.From], j.Node[piece.To])
	}
	number := map[int]int{}
	of := func(p Point) int {
		root := sets.find(j.Node[p])
		if _, known := number[root]; !known {
			number[root] = len(number)
		}
		return number[root]
	}
	j.Wires = make([]int, len(sheet.Wires))
	j.Pins = make([][]int, len(sheet.Parts))
	for i := range sheet.Parts {
		part := &sheet.Parts[i]
		j.Pins[i] = make([]int, len(part.Kind.Pins))
		for k, pin := range part.Kind.Pins {
			j.Pins[i][k] = of(part.Pin(pin))
		}
	}
	for i, wire := range sheet.Wires {
		j.Wires[i] = of(wire.Points[0])
	}
	j.Groups = len(number)
}

func (j *Joins) findDots(sheet *Sheet) {
	ways := make([]int, len(j.Places))
	for _, piece := range j.Pieces {
		ways[j.Node[piece.From]]++
		ways[j.Node[piece.To]]++
	}
	for i := range sheet.Parts {
		part := &sheet.Parts[i]
		for _, pin := range part.Kind.Pins {
			ways[j.Node[part.Pin(pin)]]++
		}
	}
	for i, p := range j.Places {
		if ways[i] > 2 {
			j.Dots = append(j.Dots, p)
		}
	}
}

func (j *Joins) findCrossings() {
	level := map[int][]Piece{} // by y, ascending in their left ends
	for _, piece := range j.Pieces {
		if piece.From.Y == piece.To.Y {
			if piece.From.X > piece.To.X {
				piece.From, piece.To = piece.To, piece.From
			}
			level[piece.From.Y] = append(level[piece.From.Y], piece)
		}
	}
	for _, row := range level {
		slices.SortFunc(row, func(a, b Piece) int { return cmp.Compare(a.From.X, b.From.X) })
	}
	for _, piece := range j.Pieces {
		x := piece.From.X
		for y := min(piece.From.Y, piece.To.Y) + 1; x == piece.To.X && y < max(piece.From.Y, piece.To.Y); y++ {
			row := level[y]
			next := sort.Search(len(row), func(i int) bool { return row[i].From.X >= x })
			if next > 0 && row[next-1].To.X > x {
				j.Crossings = append(j.Crossings, Point{x, y})
			}
		}
	}
	slices.SortFunc(j.Crossings, comparePoints)
}

// sets are disjoint sets of small numbers, joined by rank-free union with path halving.
type sets []int

func newSets(n int) sets {
	s := make(sets, n)
	for i := range s {
		s[i] = i
	}
	return s
}

func (s sets) find(i int) int {
	for s[i] != i {
		s[i] = s[s[i]]
		i = s[i]
	}
	return i
}

func (s sets) union(a, b int) { s[s.find(a)] = s.find(b) }
