package solver

// Scalar is a real number (direct current) or a phasor (alternating current).
type Scalar interface{ float64 | complex128 }

// Law is what a branch does:
//
//	Alpha·j + Beta·u + Σ Terms = Gamma
//
// with j in amperes and u in volts. Alpha and Beta must not both be zero unless there are Terms.
type Law[T Scalar] struct {
	Alpha, Beta, Gamma T

	// Terms are added on the left: they make the branch a controlled source.
	Terms []Term[T]

	// Row keeps the law as a row of its own, and u as an unknown, whatever the law is. Set it for every branch that may
	// switch, limit or bend, and set it the same in every case of a sheet: then all cases share one analysis. A law that is
	// not of the form u − Z·j = E (Beta is 1, no Terms) is given its row anyway.
	Row bool
}

// Term is the part of a law that depends on another branch: Alpha·j + Beta·u of that branch.
type Term[T Scalar] struct {
	Branch      int
	Alpha, Beta T
}

// Impedance is the law u − z·j = e of an impedance of z ohms in series with an EMF of e volts, which raises From over To.
func Impedance[T Scalar](z, e T) Law[T] { return Law[T]{Alpha: -z, Beta: 1, Gamma: e} }

// VoltageSource is the law u = e.
func VoltageSource[T Scalar](e T) Law[T] { return Law[T]{Beta: 1, Gamma: e} }

// Conductance is the law j = y·u + j0 of a conductance of y siemens beside a source of j0 amperes. It has its own row.
func Conductance[T Scalar](y, j0 T) Law[T] { return Law[T]{Alpha: 1, Beta: -y, Gamma: j0, Row: true} }

// CurrentSource is the law j = j0: j0 amperes flow from From to To through the branch.
func CurrentSource[T Scalar](j0 T) Law[T] { return Law[T]{Alpha: 1, Gamma: j0, Row: true} }

// Open is the law j = 0 of an open contact.
func Open[T Scalar]() Law[T] { return Law[T]{Alpha: 1, Row: true} }

// Branch is one element between two nodes. From and To may be the same node: then its voltage is zero.
type Branch[T Scalar] struct {
	From, To int
	Law      Law[T]
}

// Step is one branch of a loop: Sense is +1 where the loop runs from the branch's From to its To, and −1 the other way.
type Step struct{ Branch, Sense int }

// Mesh is a closed loop of branches, in the order in which the mesh current runs through them.
type Mesh struct {
	Name string
	Path []Step
}

// Network is a set of branches between the nodes 0 … Nodes−1, with a basis of meshes.
//
// The meshes must be independent and complete: there are as many as branches − nodes + connected components.
// FundamentalLoops finds such a basis where no drawing gives one. Reference is the node of 0 V.
type Network[T Scalar] struct {
	Nodes     int
	Reference int
	Branches  []Branch[T]
	Meshes    []Mesh
}

// setsCurrent reports whether the law gives j and leaves u to the rest of the network.
func (l *Law[T]) setsCurrent() bool { return l.Beta == 0 }

// controlled reports whether the law depends on another branch.
func (l *Law[T]) controlled() bool {
	for _, term := range l.Terms {
		if term.Alpha != 0 || term.Beta != 0 {
			return true
		}
	}
	return false
}

// open reports whether the law is j = 0.
func (l *Law[T]) open() bool { return l.Beta == 0 && l.Gamma == 0 && !l.controlled() }

// ideal reports whether the law gives u by itself, without any impedance.
func (l *Law[T]) ideal() bool { return l.Alpha == 0 && !l.controlled() }

// needsRow reports whether the law is not of the form u − Z·j = E, from which u follows without division.
func (l *Law[T]) needsRow() bool { return l.Row || l.Beta != 1 || len(l.Terms) > 0 }
