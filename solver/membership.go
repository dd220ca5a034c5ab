package solver

// membership lists the meshes that run through each branch, with the sense in which they do.
type membership struct {
	start []int // those of branch b are mesh[start[b]:start[b+1]]
	mesh  []int
	sense []int
}

func newMembership(branches int, meshes []Mesh) *membership {
	m := &membership{start: make([]int, branches+1)}
	steps := 0
	for _, mesh := range meshes {
		steps += len(mesh.Path)
		for _, step := range mesh.Path {
			m.start[step.Branch+1]++
		}
	}
	for b := range branches {
		m.start[b+1] += m.start[b]
	}
	block := make([]int, 2*steps+branches)
	m.mesh, m.sense = block[:steps:steps], block[steps:2*steps:2*steps]
	next := block[2*steps:]
	copy(next, m.start)
	for k, mesh := range meshes {
		for _, step := range mesh.Path {
			m.mesh[next[step.Branch]], m.sense[next[step.Branch]] = k, step.Sense
			next[step.Branch]++
		}
	}
	return m
}

// of gives the meshes through a branch and their senses.
func (m *membership) of(b int) (meshes, senses []int) {
	from, to := m.start[b], m.start[b+1]
	return m.mesh[from:to], m.sense[from:to]
}
