package trace

import (
	"cmp"
	"slices"

	"loopwright/schematic/stroke"
)

// face is a walk around one face of one block of the drawing.
type face struct {
	halves  []int
	number  int // among all faces
	corner  int // the first place in reading order
	area    int // twice the area, in square grid steps; positive when the walk is clockwise
	steps   int // how many branches it runs through
	crossed bool
	kept    bool // it is a mesh
}

// faces are the faces of the drawing, and how they lie side by side.
type faces struct {
	*plane
	list   []face
	beside []int // the number of the face to the right of each half edge, −1 for none
}

// findFaces walks around every face of every block. At each place a walk turns as sharply to the right as it can within
// its block, so that it goes clockwise around the inside of a face and counterclockwise around the outside of a block.
func (g *plane) findFaces() *faces {
	f := &faces{plane: g, beside: make([]int, len(g.leaving))}
	following := g.following()
	for half := range f.beside {
		f.beside[half] = -1
	}
	arena := make([]int, 0, len(g.leaving))
	for start := range f.beside {
		if f.beside[start] >= 0 || g.edges[start/2].block < 0 {
			continue
		}
		first := len(arena)
		walk := face{number: len(f.list), corner: len(g.places)}
		for half := start; f.beside[half] < 0; half = following[half] {
			f.beside[half] = walk.number
			arena = append(arena, half)
			walk.add(g, half)
		}
		walk.halves = arena[first:]
		f.list = append(f.list, walk)
	}
	return f
}

// following gives the half edge that comes after each one around its face.
func (g *plane) following() []int {
	following := make([]int, len(g.leaving))
	for p := range g.places {
		around := g.leaving[g.start[p]:g.start[p+1]]
		for i, half := range around {
			before := i
			for {
				before = (before + len(around) - 1) % len(around)
				if g.edges[around[before]/2].block == g.edges[half/2].block {
					break
				}
			}
			following[half^1] = around[before]
		}
	}
	return following
}

func (f *face) add(g *plane, half int) {
	from, to := g.ends(half)
	a, b := g.places[from], g.places[to]
	f.corner = min(f.corner, from)
	f.area += a.X*b.Y - b.X*a.Y
	e := &g.edges[half/2]
	f.crossed = f.crossed || e.crossed
	if e.branch >= 0 {
		f.steps++
	}
}

// keep chooses the faces that are meshes and gives them in reading order: those that are bounded, free of unjoined
// crossings, and have a branch.
//
// Such faces depend on one another only where a ring of wire surrounds some of them: then every branch on one of a group
// of faces lies on another one of that group as well, so that they add up to nothing. The one with the most branches is
// left out; of those, the largest, and the last as one reads.
func (f *faces) keep() []*face {
	groups := newSets(len(f.list))
	for i := range f.edges {
		if e := &f.edges[i]; e.branch >= 0 && e.block >= 0 {
			groups.union(f.beside[2*i], f.beside[2*i+1])
		}
	}
	free := make([]bool, len(f.list)) // groups that hold a face that is no mesh
	var kept []*face
	for i := range f.list {
		walk := &f.list[i]
		walk.kept = walk.area > 0 && !walk.crossed && walk.steps > 0
		if walk.kept {
			kept = append(kept, walk)
		} else {
			free[groups.find(i)] = true
		}
	}
	slices.SortFunc(kept, func(a, b *face) int {
		return cmp.Or(cmp.Compare(a.corner, b.corner), cmp.Compare(a.area, b.area), cmp.Compare(a.number, b.number))
	})
	most := map[int]*face{}
	for _, walk := range kept {
		group := groups.find(walk.number)
		if !free[group] && (most[group] == nil || cmp.Or(walk.steps-most[group].steps, walk.area-most[group].area) >= 0) {
			most[group] = walk
		}
	}
	for _, walk := range most {
		walk.kept = false
	}
	return slices.DeleteFunc(kept, func(walk *face) bool { return !walk.kept })
}

// mesh makes a mesh of a face.
func (d *Drawing) mesh(f *faces, walk *face) Mesh {
	first := slices.IndexFunc(walk.halves, func(half int) bool {
		from, _ := f.ends(half)
		return from == walk.corner
	})
	m := Mesh{Drawn: true, Path: make([]Step, 0, walk.steps)}
	last := walk.halves[(first+len(walk.halves)-1)%len(walk.halves)]
	for i := range walk.halves {
		half := walk.halves[(first+i)%len(walk.halves)]
		if f.bends(last, half) {
			from, _ := f.ends(half)
			m.Outline = append(m.Outline, stroke.Point{X: float64(f.places[from].X), Y: float64(f.places[from].Y)})
		}
		last = half
		if b := f.edges[half/2].branch; b >= 0 {
			m.Path = append(m.Path, Step{b, 1 - 2*(half%2)})
		}
	}
	m.Path = d.sourceFirst(m.Path)
	return m
}

// bends reports whether a walk bends between two half edges.
func (g *plane) bends(a, b int) bool {
	ax, ay := g.direction(a)
	bx, by := g.direction(b)
	return ax*by != ay*bx
}

// sourceFirst lets a mesh begin with its first source, in the order of the parts.
func (d *Drawing) sourceFirst(path []Step) []Step {
	first := -1
	for i, step := range path {
		if d.Delivers(step.Branch) && (first < 0 || step.Branch < path[first].Branch) {
			first = i
		}
	}
	if first <= 0 {
		return path
	}
	return slices.Concat(path[first:], path[:first])
}

// Delivers reports whether a branch is that of a source.
func (d *Drawing) Delivers(b int) bool { return d.Sheet.Parts[d.Branches[b].Part].Kind.Delivers }
