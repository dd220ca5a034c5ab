package trace

import "slices"

// roots chooses potentials such that every closed way of more than one branch runs through one of them, except for ways
// that are sums of drawn meshes whatever happens. They are few where much hangs on few potentials, as on the rails of a
// control circuit, and where few meshes are not drawn.
//
// A way of a class needs a branch of a class. So as long as there are closed ways with such branches left, the potential at
// which most of those branches meet is taken out, and then all that lies on no closed way any more.
func (d *Drawing) roots(c *classes) []int {
	p := peeling{
		d: d, at: d.branchesAt(), gone: make([]bool, len(d.Branches)), telling: make([]bool, len(d.Branches)),
		degree: make([]int, len(d.Potentials)), told: make([]int, len(d.Potentials)),
	}
	for b, branch := range d.Branches {
		if p.gone[b] = branch.From == branch.To; p.gone[b] {
			continue
		}
		p.telling[b] = slices.ContainsFunc(c.of(b), func(word uint64) bool { return word != 0 })
		p.count(b, 1)
	}
	for i := range p.degree {
		p.peel(i)
	}
	var roots []int
	for {
		root := 0
		for i, told := range p.told {
			if told > p.told[root] {
				root = i
			}
		}
		if p.told[root] == 0 {
			return roots
		}
		roots = append(roots, root)
		p.remove(root)
	}
}

// peeling takes potentials and branches out of a circuit.
type peeling struct {
	d       *Drawing
	at      [][]int // branches at each potential
	gone    []bool  // branches
	telling []bool  // branches that have a class
	degree  []int   // how many branches are left at each potential
	told    []int   // how many of them have a class
}

// count adds a branch to those that are left at its ends, or takes it away.
func (p *peeling) count(b, sign int) {
	for _, end := range [2]int{p.d.Branches[b].From, p.d.Branches[b].To} {
		p.degree[end] += sign
		if p.telling[b] {
			p.told[end] += sign
		}
	}
}

// remove takes a potential out with its branches, and whatever then lies on no closed way.
func (p *peeling) remove(potential int) {
	for _, b := range p.at[potential] {
		if !p.gone[b] {
			p.gone[b] = true
			p.count(b, -1)
			p.peel(p.other(b, potential))
		}
	}
}

// other is the end of a branch that is not the given one.
func (p *peeling) other(b, potential int) int {
	return p.d.Branches[b].From + p.d.Branches[b].To - potential
}

// peel takes a potential out when only one branch is left there, and goes on along it.
func (p *peeling) peel(potential int) {
	for p.degree[potential] == 1 {
		last := slices.IndexFunc(p.at[potential], func(b int) bool { return !p.gone[b] })
		b := p.at[potential][last]
		p.gone[b] = true
		p.count(b, -1)
		potential = p.other(b, potential)
	}
}

// branchesAt lists the branches at each potential; one that begins and ends there is listed once.
func (d *Drawing) branchesAt() [][]int {
	at := make([][]int, len(d.Potentials))
	for b, branch := range d.Branches {
		at[branch.From] = append(at[branch.From], b)
		if branch.To != branch.From {
			at[branch.To] = append(at[branch.To], b)
		}
	}
	return at
}
