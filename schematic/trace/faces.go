package trace

import (
	"cmp"
	"math"
	"slices"

	"loopwright/schematic"
	"loopwright/schematic/stroke"
)

// edge is one line of the drawing between two places: a piece of wire, or a branch from pin to pin.
type edge struct {
	from, to schematic.Point
	branch   int // −1 for a piece of wire
	// crossed marks an edge that crosses another without joining it, or runs over it: faces along it are not free.
	crossed bool
}

// face is a walk around one face of the drawing.
type face struct {
	outline []schematic.Point
	steps   []Step
	crossed bool
	area    float64 // twice the area, in square grid steps; positive when the walk is clockwise
}

// edges lists all lines of the drawing.
func (d *Drawing) edges() []edge {
	list := make([]edge, 0, len(d.Joins.Pieces)+len(d.Branches))
	for _, piece := range d.Joins.Pieces {
		list = append(list, edge{from: piece.From, to: piece.To, branch: -1})
	}
	for b, branch := range d.Branches {
		part := &d.Sheet.Parts[branch.Part]
		from, _ := part.Kind.Pin(branch.Pins[0])
		to, _ := part.Kind.Pin(branch.Pins[1])
		list = append(list, edge{from: part.Pin(from), to: part.Pin(to), branch: b})
	}
	return list
}

// findFaces walks around every face of the drawing. At each place the edges are taken in the order of their angles; a
// walk turns as sharply to the right as it can, so that it goes clockwise around the inside of a face and
// counterclockwise around the outside of a component.
func findFaces(edges []edge) []face {
	rotation := newRotation(edges)
	seen := make([]bool, 2*len(edges))
	var faces []face
	for start := range seen {
		if seen[start] {
			continue
		}
		var f face
		for half := start; !seen[half]; half = rotation.next(half) {
			seen[half] = true
			f.add(edges, half)
		}
		faces = append(faces, f)
	}
	return faces
}

// A half edge is an edge with a direction: 2i runs edge i from its first place to its second, 2i+1 back.
func ends(edges []edge, half int) (from, to schematic.Point) {
	e := &edges[half/2]
	if half%2 == 0 {
		return e.from, e.to
	}
	return e.to, e.from
}

func (f *face) add(edges []edge, half int) {
	from, to := ends(edges, half)
	f.outline = append(f.outline, from)
	f.area += float64(from.X)*float64(to.Y) - float64(to.X)*float64(from.Y)
	e := &edges[half/2]
	f.crossed = f.crossed || e.crossed
	if e.branch >= 0 {
		f.steps = append(f.steps, Step{e.branch, 1 - 2*(half%2)})
	}
}

// rotation holds, for each half edge, the one that follows it around a face.
type rotation struct{ following []int }

func (r *rotation) next(half int) int { return r.following[half] }

func newRotation(edges []edge) *rotation {
	around := map[schematic.Point][]int{} // the half edges that leave each place
	for i := range edges {
		around[edges[i].from] = append(around[edges[i].from], 2*i)
		around[edges[i].to] = append(around[edges[i].to], 2*i+1)
	}
	r := &rotation{make([]int, 2*len(edges))}
	for _, leaving := range around {
		angle := make(map[int]float64, len(leaving))
		for _, half := range leaving {
			from, to := ends(edges, half)
			angle[half] = math.Atan2(float64(to.Y-from.Y), float64(to.X-from.X))
		}
		slices.SortFunc(leaving, func(a, b int) int { return cmp.Or(cmp.Compare(angle[a], angle[b]), cmp.Compare(a, b)) })
		for i, half := range leaving {
			before := leaving[(i+len(leaving)-1)%len(leaving)]
			r.following[half^1] = before
			if len(leaving) > 1 && angle[half] == angle[before] {
				edges[half/2].crossed, edges[before/2].crossed = true, true
			}
		}
	}
	return r
}

// cancel takes out of a walk the branches that it runs in both directions: those do not belong to the mesh.
func cancel(steps []Step) []Step {
	sum := make(map[int]int, len(steps))
	for _, step := range steps {
		sum[step.Branch] += step.Sense
	}
	kept := make([]Step, 0, len(steps))
	for _, step := range steps {
		if sum[step.Branch] == step.Sense {
			kept = append(kept, step)
			sum[step.Branch] = 0
		}
	}
	return kept
}

// corner is the first corner of a face as one reads: the topmost, and of those the leftmost.
func (f *face) corner() schematic.Point {
	return slices.MinFunc(f.outline, compareByReading)
}

func compareByReading(a, b schematic.Point) int {
	return cmp.Or(cmp.Compare(a.Y, b.Y), cmp.Compare(a.X, b.X))
}

// drawnMesh makes a mesh of a face.
func (f *face) drawnMesh() Mesh {
	m := Mesh{Drawn: true, Path: cancel(f.steps), Outline: make([]stroke.Point, len(f.outline))}
	for i, p := range f.outline {
		m.Outline[i] = stroke.Point{X: float64(p.X), Y: float64(p.Y)}
	}
	m.Center, m.Radius = widest(m.Outline)
	return m
}
