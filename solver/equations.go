package solver

// Equation is one line of the record of a solution: the sum of its terms equals Right. Numbers are left apart, so that who
// writes it down can use symbols, values or both.
type Equation[T Scalar] struct {
	Kind EquationKind
	// Of lists the meshes whose voltage laws are added, ascending; for a constraint, those through its branch.
	Of []int
	// Factors says how often each mesh of Of is counted; 1 throughout when all meshes run the same way around.
	Factors []int
	Branch  int // the branch whose law a constraint or definition is; −1 for a voltage law
	Terms   []EquationTerm[T]
	Right   T
}

// EquationKind tells what an equation states.
type EquationKind int

// The kinds of equations.
const (
	VoltageLaw EquationKind = iota // voltages around a mesh or a supermesh, V; Right is 0
	Constraint                     // the current that a branch sets, A
	Definition                     // a voltage that controls another branch, V
)

// EquationTerm is one summand: Value times what its kind says.
type EquationTerm[T Scalar] struct {
	Kind   TermKind
	Branch int // the branch that the term belongs to
	// Of is the branch whose current or voltage is meant: Branch itself, or the one that controls it.
	Of    int
	Value T
	// Meshes gives the current that is meant as a sum of mesh currents: along the loop for a Drop in a voltage law, from
	// From to To of the branch otherwise.
	Meshes []SignedMesh
}

// TermKind tells what the value of a term multiplies.
type TermKind int

// The kinds of terms.
const (
	Source  TermKind = iota // nothing: Value is the voltage itself, V
	Drop                    // the current through Branch: Value is an impedance, Ω
	Current                 // the current through Of
	Voltage                 // the voltage across Of, which stays an unknown of its own
)

// SignedMesh is a mesh current with the sign (or, rarely, a multiple) with which it enters.
type SignedMesh struct{ Mesh, Sign int }

// Value is the sum of the terms less the right side; it is zero, up to rounding, for the solution of the network.
func (e *Equation[T]) Value(s *Solution[T]) T {
	sum := -e.Right
	for _, term := range e.Terms {
		switch term.Kind {
		case Source:
			sum += term.Value
		case Voltage:
			sum += term.Value * s.Voltage[term.Of]
		default:
			for _, m := range term.Meshes {
				sum += scaled(term.Value*s.Mesh[m.Mesh], float64(m.Sign))
			}
		}
	}
	return sum
}

// Equations gives the equations of a solved network as a reviewer reads them: the voltage law of every mesh that stands
// alone, one for every supermesh, and the constraint of every branch that sets its current. Voltages that control other
// branches are defined after them. Together they determine the mesh currents.
func Equations[T Scalar](n *Network[T], solution *Solution[T]) []Equation[T] {
	r := newRecord(n, solution.Laws)
	var equations []Equation[T]
	done := make([]bool, len(n.Meshes))
	for m := range n.Meshes {
		if done[m] {
			continue
		}
		group := r.group(m)
		for _, other := range group {
			done[other] = true
		}
		for _, factors := range r.combinations(group) {
			equations = append(equations, r.voltageLaw(group, factors))
		}
	}
	for b := range r.laws {
		if r.laws[b].setsCurrent() {
			if constraint, any := r.constraint(b); any {
				equations = append(equations, constraint)
			}
		}
	}
	for b, controls := range r.controls {
		if controls && !r.laws[b].setsCurrent() {
			equations = append(equations, r.definition(b))
		}
	}
	return equations
}
