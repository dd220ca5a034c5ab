package trace

// roots chooses potentials such that every closed way of more than one branch runs through one of them. They are few where
// much hangs on few potentials, as on the rails of a control circuit. Circuits whose meshes are all drawn are left out:
// needed tells which branches count.
//
// As long as there are closed ways left, the potential with the most branches is taken out, and then all that lies on
// none any more.
func (d *Drawing) roots(needed []bool) []int {
	p := peeling{d: d, degree: make([]int, len(d.Potentials)), gone: make([]bool, len(d.Branches)), at: d.branchesAt()}
	for b, branch := range d.Branches {
		if !needed[b] || branch.From == branch.To {
			p.gone[b] = true
			continue
		}
		p.degree[branch.From]++
		p.degree[branch.To]++
	}
	for i := range p.degree {
		p.peel(i)
	}
	var roots []int
	for {
		root := -1
		for i, degree := range p.degree {
			if degree > 0 && (root < 0 || degree > p.degree[root]) {
				root = i
			}
		}
		if root < 0 {
			return roots
		}
		roots = append(roots, root)
		p.remove(root)
	}
}

type peeling struct {
	d      *Drawing
	degree []int
	gone   []bool  // branches
	at     [][]int // branches at each potential
}

// remove takes a potential out with its branches, and whatever then lies on no closed way.
func (p *peeling) remove(potential int) {
	for _, b := range p.at[potential] {
		if p.gone[b] {
			continue
		}
		p.gone[b] = true
		other := p.d.Branches[b].From + p.d.Branches[b].To - potential
		p.degree[potential]--
		p.degree[other]--
		p.peel(other)
	}
}

// peel takes a potential out when only one branch is left there, and goes on along it.
func (p *peeling) peel(potential int) {
	for p.degree[potential] == 1 {
		for _, b := range p.at[potential] {
			if !p.gone[b] {
				p.gone[b] = true
				p.degree[potential]--
				potential = p.d.Branches[b].From + p.d.Branches[b].To - potential
				p.degree[potential]--
				break
			}
		}
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
