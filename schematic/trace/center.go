package trace

import (
	"cmp"
	"math"
	"slices"

	"loopwright/schematic/stroke"
)

// segment is a straight line that a mesh arrow must keep clear of.
type segment struct{ a, b stroke.Point }

// meets reports whether the box around a segment touches a box.
func (s *segment) meets(box stroke.Box) bool {
	return min(s.a.X, s.b.X) <= box.Right && max(s.a.X, s.b.X) >= box.Left && min(s.a.Y, s.b.Y) <= box.Bottom && max(s.a.Y, s.b.Y) >= box.Top
}

// center finds for each drawn mesh the point that is farthest from all lines around and within it.
func (f *faces) center(kept []*face, meshes []Mesh) {
	loose := f.looseLines()
	for i := range meshes {
		outline := meshes[i].Outline
		lines := make([]segment, 0, len(outline))
		for k, a := range outline {
			lines = append(lines, segment{a, outline[(k+1)%len(outline)]})
		}
		box := boxOf(outline)
		for _, line := range loose {
			if line.meets(box) {
				lines = append(lines, line)
			}
		}
		meshes[i].Center, meshes[i].Radius = widest(outline, lines)
	}
}

// looseLines are the lines that can lie within a mesh without being part of its outline: those on no closed way, and those
// on the outside of a block.
func (f *faces) looseLines() []segment {
	var loose []segment
	blocks := map[int]bool{}
	for i := range f.edges {
		e := &f.edges[i]
		outside := e.block >= 0 && (f.list[f.beside[2*i]].area <= 0 || f.list[f.beside[2*i+1]].area <= 0)
		if outside {
			blocks[e.block] = true
		}
		if outside || e.block < 0 {
			a, b := f.line(i)
			loose = append(loose, segment{stroke.Point{X: float64(a.X), Y: float64(a.Y)}, stroke.Point{X: float64(b.X), Y: float64(b.Y)}})
		}
	}
	if len(blocks) == 1 && len(loose) > 0 && !slices.ContainsFunc(f.edges, func(e edge) bool { return e.block < 0 }) {
		return nil // one block with nothing beside it: nothing can lie within its meshes
	}
	return loose
}

func boxOf(points []stroke.Point) stroke.Box {
	box := stroke.Box{Left: math.Inf(1), Top: math.Inf(1), Right: math.Inf(-1), Bottom: math.Inf(-1)}
	for _, p := range points {
		box = box.Around(stroke.Box{Left: p.X, Top: p.Y, Right: p.X, Bottom: p.Y})
	}
	return box
}

// fine is how much wider a better place must be, in grid steps, for the search to go on.
const fine = 0.125

// cell is a square of the search, known by its middle.
type cell struct {
	middle stroke.Point
	half   float64 // of its side
	room   float64 // around its middle
}

// most is more than the room around any point of the cell.
func (c *cell) most() float64 { return c.room + c.half*math.Sqrt2 }

// widest finds the point within an outline that is farthest from the given lines, and that distance. It divides the box of
// the outline into squares, and again those that could hold a better place than the best so far, the most promising first.
func widest(outline []stroke.Point, lines []segment) (center stroke.Point, radius float64) {
	box := boxOf(outline)
	at := func(x, y, half float64) cell {
		p := stroke.Point{X: x, Y: y}
		return cell{p, half, clearance(p, outline, lines)}
	}
	best := at((box.Left+box.Right)/2, (box.Top+box.Bottom)/2, 0)
	if best.room >= math.Min(box.Right-box.Left, box.Bottom-box.Top)/2 {
		return best.middle, best.room // no place within the box is wider
	}
	half := math.Max(1, math.Min(box.Right-box.Left, box.Bottom-box.Top)) / 2
	var open []cell
	for y := box.Top + half; y < box.Bottom+half; y += 2 * half {
		for x := box.Left + half; x < box.Right+half; x += 2 * half {
			open = append(open, at(x, y, half))
		}
	}
	for len(open) > 0 {
		next := slices.MaxFunc(open, func(a, b cell) int { return cmp.Compare(a.most(), b.most()) })
		if next.most() < best.room+fine {
			break
		}
		open = slices.DeleteFunc(open, func(c cell) bool { return c == next || c.most() < best.room+fine })
		if next.room > best.room+fine/2 {
			best = next
		}
		quarter := next.half / 2
		for _, shift := range [4]stroke.Point{{X: -quarter, Y: -quarter}, {X: quarter, Y: -quarter}, {X: -quarter, Y: quarter}, {X: quarter, Y: quarter}} {
			open = append(open, at(next.middle.X+shift.X, next.middle.Y+shift.Y, quarter))
		}
	}
	return best.middle, math.Max(best.room, 0)
}

// clearance is how far a point lies from lines, negative outside of an outline.
func clearance(p stroke.Point, outline []stroke.Point, lines []segment) float64 {
	least := math.Inf(1)
	for _, line := range lines {
		dx, dy := line.b.X-line.a.X, line.b.Y-line.a.Y
		t := math.Max(0, math.Min(1, ((p.X-line.a.X)*dx+(p.Y-line.a.Y)*dy)/(dx*dx+dy*dy)))
		x, y := p.X-line.a.X-t*dx, p.Y-line.a.Y-t*dy
		least = math.Min(least, x*x+y*y)
	}
	if within(p, outline) {
		return math.Sqrt(least)
	}
	return -math.Sqrt(least)
}

// within reports whether a point lies within a closed outline, by the number of its lines to the right of the point.
func within(p stroke.Point, outline []stroke.Point) bool {
	in := false
	for i, a := range outline {
		b := outline[(i+1)%len(outline)]
		if (a.Y > p.Y) != (b.Y > p.Y) && p.X < a.X+(p.Y-a.Y)/(b.Y-a.Y)*(b.X-a.X) {
			in = !in
		}
	}
	return in
}
