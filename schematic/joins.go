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
	Crossings []Point       // where pieces cross without joining, in reading order

	groups  []int // the group of each place
	columns []int // the places by x, then by y, as indices
	column  []int // where each place stands in columns
	right   runs  // the pieces that lead from each place to the next one on its row
	down    runs  // the pieces that lead from each place in columns to the next one
	table   table // finds places while the joins are made
}

// Join finds what is joined on a sheet that passes Validate. Its cost is O(n log n) in the number of pins, wire corners
// and pieces, and one search for each row of wires that an upright piece passes.
func Join(sheet *Sheet) *Joins {
	j := &Joins{}
	j.collectPlaces(sheet)
	sets := newSets(len(j.Places))
	j.cutWires(sheet, sets)
	j.group(sheet, sets)
	j.findDots(sheet)
	j.findCrossings()
	j.table = table{}
	return j
}

// comparePoints orders places as one reads: from the top, and from the left.
func comparePoints(a, b Point) int { return cmp.Or(cmp.Compare(a.Y, b.Y), cmp.Compare(a.X, b.X)) }

// bends reports whether a chain of places ends or changes its direction at the place k.
func bends(points []Point, k int) bool {
	return k == 0 || k == len(points)-1 || heading(points[k-1], points[k]) != heading(points[k], points[k+1])
}

// heading is the direction from one place to another on its row or column, as a step of one.
func heading(from, to Point) Point {
	return Point{cmp.Compare(to.X, from.X), cmp.Compare(to.Y, from.Y)}
}

func (j *Joins) cutWires(sheet *Sheet, sets sets) {
	j.right, j.down = newRuns(len(j.Places)), newRuns(len(j.Places))
	j.Pieces = make([]Piece, 0, len(j.Places))
	for w := range sheet.Wires {
		points := sheet.Wires[w].Points
		from := j.index(points[0])
		for k := 1; k < len(points); k++ {
			if bends(points, k) {
				to := j.index(points[k])
				j.cut(w, from, to, sets)
				from = to
			}
		}
	}
}

// cut notes the pieces of a straight stretch of a wire that no wire before has drawn.
func (j *Joins) cut(wire, from, to int, sets sets) {
	first := len(j.Pieces)
	if j.Places[from].Y == j.Places[to].Y {
		for i := j.right.end(min(from, to)); i < max(from, to); i = j.right.end(i) {
			j.right[i] = i + 1
			j.Pieces = append(j.Pieces, Piece{wire, j.Places[i], j.Places[i+1]})
			sets.union(i, i+1)
		}
	} else {
		at, end := j.column[from], j.column[to]
		for k := j.down.end(min(at, end)); k < max(at, end); k = j.down.end(k) {
			j.down[k] = k + 1
			j.Pieces = append(j.Pieces, Piece{wire, j.Places[j.columns[k]], j.Places[j.columns[k+1]]})
			sets.union(j.columns[k], j.columns[k+1])
		}
	}
	if from > to { // places in reading order are in order upright, too
		pieces := j.Pieces[first:]
		slices.Reverse(pieces)
		for i := range pieces {
			pieces[i].From, pieces[i].To = pieces[i].To, pieces[i].From
		}
	}
}

// spans counts the steps from place to place on a wire.
func (j *Joins) spans(points []Point) int {
	count, from := 0, j.Node[points[0]]
	for k := 1; k < len(points); k++ {
		if !bends(points, k) {
			continue
		}
		to := j.Node[points[k]]
		if j.Places[from].Y == j.Places[to].Y {
			count += max(from, to) - min(from, to)
		} else {
			count += max(j.column[from], j.column[to]) - min(j.column[from], j.column[to])
		}
		from = to
	}
	return count
}

// along lists the places on a wire, as indices, in the direction of drawing.
func (j *Joins) along(points []Point) []int {
	list := []int{j.Node[points[0]]}
	for k := 1; k < len(points); k++ {
		if !bends(points, k) {
			continue
		}
		from, to := list[len(list)-1], j.Node[points[k]]
		if j.Places[from].Y == j.Places[to].Y {
			for step := cmp.Compare(to, from); from != to; {
				from += step
				list = append(list, from)
			}
			continue
		}
		at, end := j.column[from], j.column[to]
		for step := cmp.Compare(end, at); at != end; {
			at += step
			list = append(list, j.columns[at])
		}
	}
	return list
}

func (j *Joins) group(sheet *Sheet, sets sets) {
	number := make([]int, len(j.Places)) // one more than the group of each root that was met
	of := func(place int) int {
		root := sets.find(place)
		if number[root] == 0 {
			j.Groups++
			number[root] = j.Groups
		}
		return number[root] - 1
	}
	j.Pins = make([][]int, len(sheet.Parts))
	all := make([]int, 0, 2*len(sheet.Parts)) // one backing array for most pins
	for i := range sheet.Parts {
		part := &sheet.Parts[i]
		first := len(all)
		for k := range part.Kind.Pins {
			all = append(all, of(j.index(part.pin(k))))
		}
		j.Pins[i] = all[first:len(all):len(all)]
	}
	j.Wires = make([]int, len(sheet.Wires))
	for w := range sheet.Wires {
		j.Wires[w] = of(j.index(sheet.Wires[w].Points[0]))
	}
	j.groups = make([]int, len(j.Places))
	for i := range j.Places {
		j.groups[i] = of(i)
	}
}

func (j *Joins) findDots(sheet *Sheet) {
	ways := make([]int, len(j.Places))
	for i := range j.Places {
		if j.right.leads(i) {
			ways[i]++
			ways[i+1]++
		}
		if k := j.column[i]; j.down.leads(k) {
			ways[i]++
			ways[j.columns[k+1]]++
		}
	}
	for i := range sheet.Parts {
		part := &sheet.Parts[i]
		for k := range part.Kind.Pins {
			ways[j.index(part.pin(k))]++
		}
	}
	for i, p := range j.Places {
		if ways[i] > 2 {
			j.Dots = append(j.Dots, p)
		}
	}
}

func (j *Joins) findCrossings() {
	var rows []int // the first place of each row on which there is a piece
	for i, p := range j.Places {
		if j.right.leads(i) && (len(rows) == 0 || j.Places[rows[len(rows)-1]].Y != p.Y) {
			rows = append(rows, i)
		}
	}
	for i, p := range j.Places {
		k := j.column[i]
		if !j.down.leads(k) {
			continue
		}
		end := j.Places[j.columns[k+1]].Y
		next := sort.Search(len(rows), func(k int) bool { return j.Places[rows[k]].Y > p.Y })
		for ; next < len(rows) && j.Places[rows[next]].Y < end; next++ {
			crossing := Point{p.X, j.Places[rows[next]].Y}
			after, _ := slices.BinarySearchFunc(j.Places, crossing, comparePoints)
			if after > 0 && j.right.leads(after-1) && j.Places[after-1].Y == crossing.Y {
				j.Crossings = append(j.Crossings, crossing)
			}
		}
	}
	slices.SortFunc(j.Crossings, comparePoints)
}

// runs tells for each place of a line how far pieces lead on from it: places that lead nowhere are their own run's end.
type runs []int

func newRuns(n int) runs { return runs(newSets(n)) }

// end is the first place from which no piece leads on.
func (r runs) end(i int) int { return sets(r).find(i) }

// leads reports whether a piece leads on from a place.
func (r runs) leads(i int) bool { return r[i] != i }

// sets are disjoint sets of small numbers, joined without ranks and with path halving.
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
