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
	class    []uint64
}

// loops completes the drawn meshes with as many loops as are missing: the shortest ones, counted in branches, that are
// independent of the drawn meshes and of one another; of equally short ones those that come first in reading order, and
// then those of earlier parts. They are given in reading order.
//
// Among the loops that consist of two shortest ways from a root and a branch between their ends are the shortest of each
// class that is not a sum of shorter ones, whichever shortest ways are taken (Horton, "A polynomial-time algorithm to find
// the shortest cycle basis of a graph", SIAM Journal on Computing 16, 1987), and it is enough to take as roots potentials
// of which every loop has one.
func (d *Drawing) loops(f *faces, missing int) [][]Step {
	s := newLoopSearch(d, d.newClasses(f, missing), missing)
	for b, branch := range d.Branches {
		if branch.From == branch.To {
			s.consider([]Step{{b, 1}})
		}
	}
	for _, root := range d.roots(s.needed()) {
		s.from(root)
	}
	s.choose()
	slices.SortFunc(s.found, func(a, b loop) int { return cmp.Or(cmp.Compare(a.place, b.place), compareLoops(a, b)) })
	list := make([][]Step, len(s.found))
	for i, found := range s.found {
		list[i] = d.forward(found.steps)
	}
	return list
}

func compareLoops(a, b loop) int {
	return cmp.Or(cmp.Compare(len(a.steps), len(b.steps)), cmp.Compare(a.place, b.place), slices.Compare(a.branches, b.branches))
}

// loopSearch looks for loops around one root after another.
type loopSearch struct {
	d       *Drawing
	classes *classes
	missing int
	found   []loop // those that may still be chosen
	longest int    // once enough independent loops are found, a longer one than the longest of them is of no use

	at      [][]int
	reached []int
	depth   []int
	seen    []int // the root from which a potential was reached last, plus one
	step    []Step
	twig    []int    // the first potential after the root on the way
	label   []uint64 // the class of the way
}

func newLoopSearch(d *Drawing, c *classes, missing int) *loopSearch {
	n := len(d.Potentials)
	return &loopSearch{
		d: d, classes: c, missing: missing, longest: len(d.Branches) + 1, at: d.branchesAt(),
		depth: make([]int, n), seen: make([]int, n), step: make([]Step, n), twig: make([]int, n), label: make([]uint64, n*c.words),
	}
}

// needed marks the branches of those components that lack a mesh.
func (s *loopSearch) needed() []bool {
	together := newSets(len(s.d.Potentials))
	for _, branch := range s.d.Branches {
		together.union(branch.From, branch.To)
	}
	lacks := make([]bool, len(s.d.Potentials))
	for b, branch := range s.d.Branches {
		if slices.ContainsFunc(s.classes.of(b), func(word uint64) bool { return word != 0 }) {
			lacks[together.find(branch.From)] = true
		}
	}
	needed := make([]bool, len(s.d.Branches))
	for b, branch := range s.d.Branches {
		needed[b] = lacks[together.find(branch.From)]
	}
	return needed
}

// from considers all loops around a root.
func (s *loopSearch) from(root int) {
	s.spread(root)
	for _, near := range s.reached {
		for _, b := range s.at[near] {
			branch := &s.d.Branches[b]
			if branch.From != near || s.seen[branch.To] != root+1 || s.twig[near] == s.twig[branch.To] ||
				s.step[near].Branch == b || s.step[branch.To].Branch == b ||
				s.depth[near]+s.depth[branch.To]+1 > s.longest || !s.useful(b, near, branch.To) {
				continue
			}
			s.consider(s.around(b, root))
		}
	}
}

// spread finds shortest ways from a root to all potentials that can be on a loop that is short enough.
func (s *loopSearch) spread(root int) {
	w := s.classes.words
	s.reached = append(s.reached[:0], root)
	s.seen[root], s.depth[root], s.twig[root], s.step[root] = root+1, 0, -1, Step{Branch: -1}
	clear(s.label[root*w : (root+1)*w])
	for i := 0; i < len(s.reached); i++ {
		near := s.reached[i]
		if 2*s.depth[near] >= s.longest {
			return
		}
		for _, b := range s.at[near] {
			next, sense := s.d.Branches[b].To, 1
			if next == near {
				next, sense = s.d.Branches[b].From, -1
			}
			if s.seen[next] == root+1 {
				continue
			}
			s.seen[next], s.depth[next], s.step[next] = root+1, s.depth[near]+1, Step{b, sense}
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

// around gives the loop that leaves the root towards the first end of a branch and comes back from the other.
func (s *loopSearch) around(b, root int) []Step {
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
	found := loop{steps: steps, place: len(s.d.Joins.Places), class: make([]uint64, s.classes.words)}
	for _, step := range steps {
		from, to := s.d.ends(step.Branch)
		found.place = min(found.place, from, to)
		found.branches = append(found.branches, step.Branch)
		s.classes.add(found.class, step.Branch)
	}
	slices.Sort(found.branches)
	s.found = append(s.found, found)
	if len(s.found) > 2*s.missing+256 {
		s.choose()
	}
}

// choose keeps the best independent loops of those that were found. Choosing now and again on the way gives the same as
// choosing once at the end.
func (s *loopSearch) choose() {
	slices.SortFunc(s.found, compareLoops)
	chosen := newBasis(s.missing)
	s.found = slices.DeleteFunc(s.found, func(found loop) bool { return !chosen.add(slices.Clone(found.class)) })
	if chosen.size == s.missing {
		s.longest = len(s.found[len(s.found)-1].steps)
	}
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
