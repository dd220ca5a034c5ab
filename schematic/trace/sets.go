package trace

// sets are disjoint sets of small numbers.
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

// union joins two sets and reports whether they were apart. The lower of the two representatives stays one.
func (s sets) union(a, b int) bool {
	a, b = s.find(a), s.find(b)
	s[max(a, b)] = min(a, b)
	return a != b
}
