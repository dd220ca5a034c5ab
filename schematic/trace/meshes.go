package trace

import (
	"slices"
	"strconv"
)

// findMeshes chooses the meshes: the bounded faces of the drawing that are free of unjoined crossings, as far as they
// are independent, completed with the shortest independent loops. There are always as many as
// branches − potentials + components.
func (d *Drawing) findMeshes() {
	if len(d.Branches) == 0 {
		return
	}
	edges := d.edges()
	markCrossed(edges, d.Joins.Places)
	meshes := drawnMeshes(findFaces(edges))
	wanted := d.cycleRank()
	if len(meshes) != wanted || slices.ContainsFunc(edges, func(e edge) bool { return e.crossed }) || d.namesJoin() {
		meshes = d.complete(meshes, wanted)
	}
	for i := range meshes {
		meshes[i].Name = "m" + strconv.Itoa(i+1)
	}
	d.Meshes = meshes
}

// drawnMeshes are the meshes of the bounded faces that are free of crossings, in reading order.
func drawnMeshes(faces []face) []Mesh {
	var kept []*face
	for i := range faces {
		if f := &faces[i]; f.area > 0 && !f.crossed && len(cancel(f.steps)) > 0 {
			kept = append(kept, f)
		}
	}
	slices.SortStableFunc(kept, func(a, b *face) int { return compareByReading(a.corner(), b.corner()) })
	meshes := make([]Mesh, len(kept))
	for i, f := range kept {
		meshes[i] = f.drawnMesh()
	}
	return meshes
}

// cycleRank is how many independent meshes the circuit has: branches − potentials + components.
func (d *Drawing) cycleRank() int {
	sets := newSets(len(d.Potentials))
	rank := 0
	for _, branch := range d.Branches {
		if !sets.union(branch.From, branch.To) {
			rank++
		}
	}
	return rank
}

// namesJoin reports whether potentials that are apart on paper are joined by name; the faces of the drawing may then be
// dependent on one another although their number is right.
func (d *Drawing) namesJoin() bool {
	group := map[int]int{} // potential → a group of it
	for i, pins := range d.Joins.Pins {
		for k, g := range pins {
			potential := d.PinPotential[i][k]
			if other, known := group[potential]; known && other != g {
				return true
			}
			group[potential] = g
		}
	}
	return false
}

// complete keeps of the drawn meshes those that are independent, in their order, and adds the shortest independent
// loops. The same circuit always gets the same loops.
func (d *Drawing) complete(drawn []Mesh, wanted int) []Mesh {
	basis := d.newBasis(wanted)
	meshes := make([]Mesh, 0, wanted)
	for _, mesh := range drawn {
		if basis.add(mesh.Path) {
			meshes = append(meshes, mesh)
		}
	}
	if len(meshes) == wanted {
		return meshes
	}
	for _, loops := range [][][]Step{d.shortestLoops(), d.treeLoops()} {
		for _, loop := range loops {
			if len(meshes) < wanted && basis.add(loop) {
				meshes = append(meshes, Mesh{Path: forward(loop)})
			}
		}
	}
	return meshes
}

// forward turns a loop so that it runs its first branch from the first pin to the second, and begins there.
func forward(loop []Step) []Step {
	first := 0
	for i, step := range loop {
		if step.Branch < loop[first].Branch {
			first = i
		}
	}
	if loop[first].Sense > 0 {
		return slices.Concat(loop[first:], loop[:first])
	}
	turned := make([]Step, 0, len(loop))
	for i := range loop {
		step := loop[(first-i+len(loop))%len(loop)]
		turned = append(turned, Step{step.Branch, -step.Sense})
	}
	return turned
}

// basis tells which cycles are independent of those before, by elimination over the field of two elements. A cycle is
// known by the branches that it has outside of a spanning forest; cycles that are independent there are independent.
type basis struct {
	chord map[int]int // branch outside of the forest → column
	rows  map[int][]uint64
	words int
}

func (d *Drawing) newBasis(rank int) *basis {
	b := &basis{chord: make(map[int]int, rank), rows: map[int][]uint64{}, words: (rank + 63) / 64}
	sets := newSets(len(d.Potentials))
	for i, branch := range d.Branches {
		if !sets.union(branch.From, branch.To) {
			b.chord[i] = len(b.chord)
		}
	}
	return b
}

// add takes a cycle into the basis and reports whether it was independent.
func (b *basis) add(steps []Step) bool {
	row := make([]uint64, b.words)
	for _, step := range steps {
		if column, ok := b.chord[step.Branch]; ok {
			row[column/64] ^= 1 << (column % 64)
		}
	}
	for column := range b.words * 64 {
		if row[column/64]&(1<<(column%64)) == 0 {
			continue
		}
		pivot, known := b.rows[column]
		if !known {
			b.rows[column] = row
			return true
		}
		for i := range row {
			row[i] ^= pivot[i]
		}
	}
	return false
}
