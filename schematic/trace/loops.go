package trace

import (
	"cmp"
	"slices"
)

// loop is a closed way that may become a mesh.
type loop struct {
	steps    []Step
	place    int   // the first place in reading order of its pins
	branches []int // ascending
}

// loops completes the drawn meshes with as many loops as are missing: the shortest ones, counted in branches, that are
// independent of the drawn meshes and of one another; of equally short ones those that come first in reading order, and
// then those of earlier parts. They are given in reading order.
//
// Among the loops that consist of two shortest ways from a root and a branch between their ends are the shortest of each
// class that is not a sum of shorter ones, whichever shortest ways are taken (Horton, "A polynomial-time algorithm to find
// the shortest cycle basis of a graph", SIAM Journal on Computing 16, 1987), and it is enough to take as roots potentials
// of which every loop of a class has one.
func (d *Drawing) loops(f *faces, missing int) [][]Step {
	s := newLoopSearch(d, d.newClasses(f, missing), missing)
	for b, branch := range d.Branches {
		if branch.From == branch.To {
			s.consider([]Step{{b, 1}})
		}
	}
	s.choose()
	roots := d.roots(s.classes)
	next := make([]int, len(roots)) // the length from which on the loops around each root were not considered yet
	for length := 2; length <= len(d.Branches) && len(s.chosen) < missing; {
		longer := len(d.Branches) + 1
		for i, root := range roots {
			if next[i] <= length {
				next[i] = s.around(root, length)
			}
			longer = min(longer, next[i])
		}
		s.choose()
		length = longer
	}
	slices.SortFunc(s.chosen, func(a, b loop) int {
		return cmp.Or(cmp.Compare(a.place, b.place), cmp.Compare(len(a.steps), len(b.steps)), slices.Compare(a.branches, b.branches))
	})
	list := make([][]Step, len(s.chosen))
	for i, chosen := range s.chosen {
		list[i] = d.forward(chosen.steps)
	}
	return list
}

// loopSearch looks for loops of one length after another.
type loopSearch struct {
	d       *Drawing
	classes *classes
	chosen  []loop
	basis   basis  // of the chosen loops
	found   []loop // all of one length

	at      [][]int
	reached []int
	depth   []int
	seen    []int // the search in which a potential was reached last
	search  int
	step    []Step
	twig    []int    // the first potential after the root on the way
	label   []uint64 // the class of the way
}

func newLoopSearch(d *Drawing, c *classes, missing int) *loopSearch {
	n := len(d.Potentials)
	return &loopSearch{
		d: d, classes: c, basis: make(basis, missing), at: d.branchesAt(),
		depth: make([]int, n), seen: make([]int, n), step: make([]Step, n), twig: make([]int, n), label: make([]uint64, n*c.words),
	}
}

// around considers all loops of one length around a root, and gives the length of the next longer ones.
func (s *loopSearch) around(root, length int) (next int) {
	s.spread(root)
	next = len(s.d.Branches) + 1
	for _, near := range s.reached {
		for _, b := range s.at[near] {
			from, to := s.d.Branches[b].From, s.d.Branches[b].To
			if from != near || s.twig[from] == s.twig[to] || s.step[from].Branch == b || s.step[to].Branch == b {
				continue
			}
			long := s.depth[from] + s.depth[to] + 1
			if long < length || long >= next || !s.useful(b, from, to) {
				continue
			}
			if long > length {
				next = long
			} else {
				s.consider(s.through(b, root))
			}
		}
	}
	return next
}

// spread finds shortest ways from a root to all potentials of its component.
func (s *loopSearch) spread(root int) {
	w := s.classes.words
	s.search++
	s.reached = append(s.reached[:0], root)
	s.seen[root], s.depth[root], s.twig[root], s.step[root] = s.search, 0, -1, Step{Branch: -1}
	clear(s.label[root*w : (root+1)*w])
	for i := 0; i < len(s.reached); i++ {
		near := s.reached[i]
		for _, b := range s.at[near] {
			next, sense := s.d.Branches[b].To, 1
			if next == near {
				next, sense = s.d.Branches[b].From, -1
			}
			if s.seen[next] == s.search {
				continue
			}
			s.seen[next], s.depth[next], s.step[next] = s.search, s.depth[near]+1, Step{b, sense}
			if s.twig[next] = s.twig[near]; near == root {
				s.twig[next] = next
			}
			copy(s.label[next*w:(next+1)*w], s.label[near*w:(near+1)*w])
			s.classes.add(s.label[next*w:(next+1)*w], b)
			s.reached = append(s.reached, next)
		}
	}
}

// useful reports whether the loop through a branch between two ways is no sum of drawn meshes.
func (s *loopSearch) useful(b, from, to int) bool {
	w := s.classes.words
	for i, word := range s.classes.of(b) {
		if word^s.label[from*w+i]^s.label[to*w+i] != 0 {
			return true
		}
	}
	return false
}

// through gives the loop that leaves the root towards the first end of a branch and comes back from the other.
func (s *loopSearch) through(b, root int) []Step {
	var steps []Step
	for at := s.d.Branches[b].From; at != root; {
		step := s.step[at]
		steps = append(steps, step)
		at = s.before(step)
	}
	slices.Reverse(steps)
	steps = append(steps, Step{b, 1})
	for at := s.d.Branches[b].To; at != root; {
		step := s.step[at]
		steps = append(steps, Step{step.Branch, -step.Sense})
		at = s.before(step)
	}
	return steps
}

// before is where a step begins.
func (s *loopSearch) before(step Step) int {
	if step.Sense > 0 {
		return s.d.Branches[step.Branch].From
	}
	return s.d.Branches[step.Branch].To
}

// consider takes a loop among those that may be chosen.
func (s *loopSearch) consider(steps []Step) {
	found := loop{steps: steps, place: len(s.d.Joins.Places), branches: make([]int, len(steps))}
	for i, step := range steps {
		from, to := s.d.ends(step.Branch)
		found.place = min(found.place, from, to)
		found.branches[i] = step.Branch
	}
	slices.Sort(found.branches)
	s.found = append(s.found, found)
	if len(s.found) > 4*len(s.basis)+1024 {
		s.found = s.independent(slices.Clone(s.basis))
	}
}

// choose takes the best independent loops of those that were found.
func (s *loopSearch) choose() {
	s.chosen = append(s.chosen, s.independent(s.basis)...)
	s.found = nil
}

// independent gives, of the loops that were found, those that are independent of a basis and of better ones, and adds
// them to the basis. Doing so now and again with what was found so far gives the same as doing it once with all.
func (s *loopSearch) independent(of basis) []loop {
	slices.SortFunc(s.found, func(a, b loop) int {
		return cmp.Or(cmp.Compare(a.place, b.place), slices.Compare(a.branches, b.branches))
	})
	list := slices.CompactFunc(s.found, func(a, b loop) bool { return slices.Equal(a.branches, b.branches) })
	return slices.DeleteFunc(list, func(found loop) bool {
		class := make([]uint64, s.classes.words)
		for _, b := range found.branches {
			s.classes.add(class, b)
		}
		return !of.add(class)
	})
}

// forward turns a loop so that it runs its first source, in the order of the parts, the way the source delivers; a loop
// without a source runs its first branch from the first pin to the second. It begins there.
func (d *Drawing) forward(steps []Step) []Step {
	first := 0
	for i, step := range steps {
		a, b := d.Delivers(step.Branch), d.Delivers(steps[first].Branch)
		if (a && !b) || (a == b && step.Branch < steps[first].Branch) {
			first = i
		}
	}
	wanted := 1
	if d.Delivers(steps[first].Branch) {
		wanted = -1
	}
	if steps[first].Sense == wanted {
		return slices.Concat(steps[first:], steps[:first])
	}
	turned := make([]Step, 0, len(steps))
	for i := range steps {
		step := steps[(first-i+len(steps))%len(steps)]
		turned = append(turned, Step{step.Branch, -step.Sense})
	}
	return turned
}
