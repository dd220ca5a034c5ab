package solver

// groups is a partition of 0 … n−1 that only grows together: union by size with path halving (Tarjan, "Efficiency of a
// good but not linear set union algorithm", Journal of the ACM 22, 1975).
type groups struct {
	parent, size []int
}

func newGroups(n int) *groups {
	block := make([]int, 2*n)
	g := &groups{parent: block[:n], size: block[n:]}
	for i := range n {
		g.parent[i], g.size[i] = i, 1
	}
	return g
}

// of gives the representative of the group of i.
func (g *groups) of(i int) int {
	for g.parent[i] != i {
		g.parent[i] = g.parent[g.parent[i]]
		i = g.parent[i]
	}
	return i
}

// join unites the groups of i and j; it reports false when they were one already.
func (g *groups) join(i, j int) bool {
	i, j = g.of(i), g.of(j)
	if i == j {
		return false
	}
	if g.size[i] < g.size[j] {
		i, j = j, i
	}
	g.parent[j] = i
	g.size[i] += g.size[j]
	return true
}
