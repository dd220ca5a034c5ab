package trace

import "strconv"

// findMeshes chooses the meshes: the bounded faces of the drawing that are free of unjoined crossings, as far as they
// are independent, completed with the shortest independent loops. There are always as many as
// branches − potentials + components.
func (d *Drawing) findMeshes() {
	if len(d.Branches) == 0 {
		return
	}
	g := d.plane()
	g.markCrossed(d.Joins.Node)
	g.findBlocks()
	f := g.findFaces()
	kept := f.keep()
	d.Meshes = make([]Mesh, len(kept))
	for i, walk := range kept {
		d.Meshes[i] = d.mesh(f, walk)
	}
	f.center(kept, d.Meshes)
	if missing := d.cycleRank() - len(kept); missing > 0 {
		for _, loop := range d.loops(f, missing) {
			d.Meshes = append(d.Meshes, Mesh{Path: loop})
		}
	}
	for i := range d.Meshes {
		d.Meshes[i].Name = "m" + strconv.Itoa(i+1)
	}
}

// cycleRank is how many independent meshes the circuit has: branches − potentials + components.
func (d *Drawing) cycleRank() int {
	joined := newSets(len(d.Potentials))
	rank := 0
	for _, branch := range d.Branches {
		if !joined.union(branch.From, branch.To) {
			rank++
		}
	}
	return rank
}
