package schematic

import "slices"

// collectPlaces puts the places of a sheet in order by rows and by columns.
func (j *Joins) collectPlaces(sheet *Sheet) {
	points := placesOf(sheet)
	if !j.layTable(points) {
		j.sortPlaces(points)
	}
	j.Node = make(map[Point]int, len(j.Places))
	j.column = make([]int, len(j.Places))
	for i, p := range j.Places {
		j.Node[p] = i
		j.column[j.columns[i]] = i
	}
}

// placesOf lists where something ends, bends or is joined, some places more than once.
func placesOf(sheet *Sheet) []Point {
	points := make([]Point, 0, 2*len(sheet.Parts)+3*len(sheet.Wires)+len(sheet.Joints))
	for i := range sheet.Parts {
		for k := range sheet.Parts[i].Kind.Pins {
			points = append(points, sheet.Parts[i].pin(k))
		}
	}
	for i := range sheet.Wires {
		chain := sheet.Wires[i].Points
		for k, p := range chain {
			if bends(chain, k) {
				points = append(points, p)
			}
		}
	}
	return append(points, sheet.Joints...)
}

// table holds for each grid point of a sheet one more than the index of its place. It finds places many times faster
// than a map.
type table struct {
	corner        Point // with the least x and y
	width, height int
	cells         []int32
}

func (t *table) at(p Point) *int32 {
	return &t.cells[(p.Y-t.corner.Y)*t.width+p.X-t.corner.X]
}

// mostCells bounds a table: a sheet of size A1 has 168 × 118 grid points.
const mostCells = 1 << 15

// layTable puts the places in order with a table, unless the sheet is too large for one.
func (j *Joins) layTable(points []Point) bool {
	if len(points) == 0 {
		return true
	}
	low, high := points[0], points[0]
	for _, p := range points {
		low = Point{min(low.X, p.X), min(low.Y, p.Y)}
		high = Point{max(high.X, p.X), max(high.Y, p.Y)}
	}
	t := table{corner: low, width: high.X - low.X + 1, height: high.Y - low.Y + 1}
	if t.width > mostCells || t.height > mostCells || t.width*t.height > mostCells {
		return false
	}
	t.cells = make([]int32, t.width*t.height)
	for _, p := range points {
		*t.at(p) = 1
	}
	j.Places = make([]Point, 0, len(points))
	for i, cell := range t.cells {
		if cell != 0 {
			j.Places = append(j.Places, Point{low.X + i%t.width, low.Y + i/t.width})
			t.cells[i] = int32(len(j.Places))
		}
	}
	j.columns = make([]int, 0, len(j.Places))
	for x := range t.width {
		for i := x; i < len(t.cells); i += t.width {
			if cell := t.cells[i]; cell != 0 {
				j.columns = append(j.columns, int(cell)-1)
			}
		}
	}
	j.table = t
	return true
}

// middle moves coordinates, which may be negative, into the range of a half key.
const middle = 1 << 31

// sortPlaces puts the places in order by sorting keys, in which one coordinate stands in the upper half.
func (j *Joins) sortPlaces(points []Point) {
	keys := make([]uint64, len(points))
	for i, p := range points {
		keys[i] = uint64(p.Y+middle)<<32 | uint64(p.X+middle)
	}
	slices.Sort(keys)
	keys = slices.Compact(keys)
	j.Places = make([]Point, len(keys))
	for i, key := range keys {
		p := Point{int(key&(1<<32-1)) - middle, int(key>>32) - middle}
		j.Places[i] = p
		keys[i] = uint64(p.X+middle)<<32 | uint64(i) // the index rises with y within a column
	}
	slices.Sort(keys)
	j.columns = make([]int, len(keys))
	for k, key := range keys {
		j.columns[k] = int(key & (1<<32 - 1))
	}
}

// index finds a place while the joins are made.
func (j *Joins) index(p Point) int {
	if j.table.cells != nil {
		return int(*j.table.at(p)) - 1
	}
	return j.Node[p]
}
