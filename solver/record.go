package solver

import "slices"

// record gathers what the equations of a network are made from.
type record[T Scalar] struct {
	network  *Network[T]
	laws     []Law[T]
	through  *membership
	controls []bool // branches whose voltage controls another one
	fused    *groups
}

func newRecord[T Scalar](n *Network[T], laws []Law[T]) *record[T] {
	r := &record[T]{
		network: n, laws: laws, through: newMembership(len(laws), n.Meshes),
		controls: make([]bool, len(laws)), fused: newGroups(len(n.Meshes)),
	}
	for b := range laws {
		for _, term := range laws[b].Terms {
			if term.Beta != 0 {
				r.controls[term.Branch] = true
			}
		}
	}
	for b := range laws {
		if r.eliminated(b) {
			meshes, _ := r.through.of(b)
			for _, m := range meshes {
				r.fused.join(meshes[0], m)
			}
		}
	}
	return r
}

// eliminated reports whether the branch's voltage is an unknown that no equation should show.
func (r *record[T]) eliminated(b int) bool { return r.laws[b].setsCurrent() && !r.controls[b] }

// group gives the meshes that are fused with m, ascending.
func (r *record[T]) group(m int) []int {
	root := r.fused.of(m)
	if r.fused.size[root] == 1 {
		return []int{m}
	}
	var group []int
	for other := range r.network.Meshes {
		if r.fused.of(other) == root {
			group = append(group, other)
		}
	}
	return group
}

// combinations gives the sums of mesh voltage laws in which no eliminated voltage is left: a basis of the integer vectors c
// with Σ c_m·sense(m, b) = 0 for every eliminated branch b, one factor for each mesh of the group.
func (r *record[T]) combinations(group []int) [][]int {
	position := make(map[int]int, len(group))
	var order []int
	for k, m := range group {
		position[m] = k
		for _, step := range r.network.Meshes[m].Path {
			if r.eliminated(step.Branch) {
				order = append(order, step.Branch)
			}
		}
	}
	rows := make([]map[int]int, 0, len(order))
	for _, b := range sortedUnique(order) {
		row := map[int]int{}
		for _, m := range r.current(b, 1) {
			row[position[m.Mesh]] = m.Sign
		}
		if len(row) > 0 {
			rows = append(rows, row)
		}
	}
	return nullSpace(rows, len(group))
}

// voltageLaw adds the voltages around the meshes of a group: sources first, then drops in the order of the path.
func (r *record[T]) voltageLaw(group, factors []int) Equation[T] {
	e := Equation[T]{Kind: VoltageLaw, Branch: -1}
	for k, factor := range factors {
		if factor != 0 {
			e.Of, e.Factors = append(e.Of, group[k]), append(e.Factors, factor)
		}
	}
	for _, step := range r.path(e.Of, e.Factors) {
		e.Terms = append(e.Terms, r.voltage(step.Branch, step.Sense)...)
	}
	slices.SortStableFunc(e.Terms, func(a, b EquationTerm[T]) int { return sourcesFirst(a.Kind) - sourcesFirst(b.Kind) })
	return e
}

func sourcesFirst(kind TermKind) int {
	if kind == Source {
		return 0
	}
	return 1
}

// path gives the steps of a sum of meshes that do not cancel, in the order of a walk along them.
func (r *record[T]) path(meshes, factors []int) []Step {
	if len(meshes) == 1 && factors[0] == 1 && r.simple(meshes[0]) {
		return r.network.Meshes[meshes[0]].Path
	}
	net := map[int]int{}
	var order []int
	for k, m := range meshes {
		for _, step := range r.network.Meshes[m].Path {
			if _, known := net[step.Branch]; !known {
				order = append(order, step.Branch)
			}
			net[step.Branch] += factors[k] * step.Sense
		}
	}
	var left []Step
	for _, b := range order {
		for range max(net[b], -net[b]) {
			left = append(left, Step{b, sign(net[b])})
		}
	}
	return r.walk(left)
}

// simple reports whether a mesh runs through each of its branches once.
func (r *record[T]) simple(m int) bool {
	seen := map[int]bool{}
	for _, step := range r.network.Meshes[m].Path {
		if seen[step.Branch] {
			return false
		}
		seen[step.Branch] = true
	}
	return true
}

// walk orders steps so that each begins where the one before it ends, as far as that goes.
func (r *record[T]) walk(left []Step) []Step {
	path := make([]Step, 0, len(left))
	for at := -1; len(left) > 0; {
		next := slices.IndexFunc(left, func(step Step) bool {
			from, _ := r.network.ends(step)
			return from == at
		})
		next = max(next, 0)
		path = append(path, left[next])
		_, at = r.network.ends(left[next])
		left = slices.Delete(left, next, next+1)
	}
	return path
}

func sign(x int) int {
	if x < 0 {
		return -1
	}
	return 1
}

// voltage gives the voltage of a branch in the sense of a loop:
//
//	sense·u = sense·(Gamma − Alpha·j − Σ Terms)/Beta
func (r *record[T]) voltage(b, sense int) []EquationTerm[T] {
	law := &r.laws[b]
	if law.setsCurrent() {
		return []EquationTerm[T]{{Kind: Voltage, Branch: b, Of: b, Value: scalar[T](float64(sense))}}
	}
	var terms []EquationTerm[T]
	if law.Gamma != 0 {
		terms = append(terms, EquationTerm[T]{Kind: Source, Branch: b, Of: b, Value: signed(sense, law.Gamma/law.Beta)})
	}
	if law.Alpha != 0 {
		if meshes := r.current(b, sense); len(meshes) > 0 {
			terms = append(terms, EquationTerm[T]{Kind: Drop, Branch: b, Of: b, Value: -law.Alpha / law.Beta, Meshes: meshes})
		}
	}
	return append(terms, r.control(b, signed(-sense, 1/law.Beta))...)
}

// control gives the terms of a law times a factor.
func (r *record[T]) control(b int, factor T) []EquationTerm[T] {
	var terms []EquationTerm[T]
	for _, term := range r.laws[b].Terms {
		if meshes := r.current(term.Branch, 1); term.Alpha != 0 && len(meshes) > 0 {
			terms = append(terms, EquationTerm[T]{
				Kind: Current, Branch: b, Of: term.Branch, Value: factor * term.Alpha, Meshes: meshes,
			})
		}
		if term.Beta != 0 {
			terms = append(terms, EquationTerm[T]{Kind: Voltage, Branch: b, Of: term.Branch, Value: factor * term.Beta})
		}
	}
	return terms
}

// current gives the current of a branch in a sense as a sum of mesh currents, by ascending mesh.
func (r *record[T]) current(b, sense int) []SignedMesh {
	var sum []SignedMesh
	meshes, senses := r.through.of(b)
	for k, m := range meshes {
		if last := len(sum) - 1; last >= 0 && sum[last].Mesh == m {
			sum[last].Sign += sense * senses[k]
			continue
		}
		sum = append(sum, SignedMesh{m, sense * senses[k]})
	}
	return slices.DeleteFunc(sum, func(m SignedMesh) bool { return m.Sign == 0 })
}

// constraint gives the law of a branch that sets its current, turned so that its first mesh current is positive. There is
// none for a branch in no mesh that depends on nothing: it carries no current, whatever the meshes do.
func (r *record[T]) constraint(b int) (Equation[T], bool) {
	law := &r.laws[b]
	meshes := r.current(b, 1)
	turn := 1
	if len(meshes) > 0 && meshes[0].Sign < 0 {
		turn = -1
		meshes = r.current(b, -1)
	}
	e := Equation[T]{Kind: Constraint, Branch: b}
	scale := scalar[T](1)
	if law.Alpha != 0 {
		scale = 1 / law.Alpha
	}
	if law.Gamma != 0 {
		e.Right = signed(turn, law.Gamma*scale)
	}
	if len(meshes) > 0 && law.Alpha != 0 {
		e.Terms = append(e.Terms, EquationTerm[T]{Kind: Current, Branch: b, Of: b, Value: 1, Meshes: meshes})
	}
	for _, m := range meshes {
		e.Of, e.Factors = append(e.Of, m.Mesh), append(e.Factors, 1)
	}
	e.Terms = append(e.Terms, r.control(b, signed(turn, scale))...)
	return e, len(e.Terms) > 0
}

// definition gives the voltage of a branch: u less what its law makes it is zero.
func (r *record[T]) definition(b int) Equation[T] {
	e := Equation[T]{Kind: Definition, Branch: b}
	e.Terms = []EquationTerm[T]{{Kind: Voltage, Branch: b, Of: b, Value: 1}}
	for _, term := range r.voltage(b, 1) {
		if term.Kind == Source {
			e.Right = term.Value
			continue
		}
		term.Value = -term.Value
		e.Terms = append(e.Terms, term)
	}
	return e
}
