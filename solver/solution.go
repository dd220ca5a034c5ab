package solver

import "time"

// Solution is what Solve finds. Slices are indexed as the network's meshes, branches and nodes are.
type Solution[T Scalar] struct {
	Mesh    []T // mesh currents, A
	Current []T // branch currents, A
	Voltage []T // branch voltages, V
	Node    []T // node voltages relative to Reference, V

	// FloatingNode marks nodes without any conducting path to the reference: their voltage is not defined, Node is 0.
	FloatingNode []bool
	// FloatingBranch marks open branches between pieces that nothing else joins: their voltage is not defined, Voltage is 0.
	FloatingBranch []bool
	// Piece numbers the parts of the network that hang together without open branches. Between two nodes of one piece
	// the voltage is always defined. The piece of the reference is 0.
	Piece []int

	// Laws are those under which the network was solved.
	Laws []Law[T]

	Supermeshes []Supermesh
	Audit       Audit
	Timing      Timing
}

// Supermesh is a group of meshes that are fused because branches between them set the current and not the voltage:
// current sources, and open contacts in this case.
type Supermesh struct {
	Meshes  []int // ascending
	Through []int // the branches between them, ascending
}

// Audit holds how far a solution is from the laws of Kirchhoff and from the second method. Its figures are relative to
// the largest current, voltage or power of the case; 0/0 is 0; what rounding of the summed terms explains is not counted.
type Audit struct {
	KCL      float64 // largest sum of currents at a node over the largest current
	KVL      float64 // largest sum of voltages around a mesh over the largest voltage
	Power    float64 // sum of the absorbed powers over the largest of them
	NodalGap float64 // largest difference to nodal analysis, in currents and voltages
	Passed   bool    // all figures are below AuditLimit
}

// AuditLimit is what every figure of a passed audit lies below.
const AuditLimit = 1e-9

// Timing says how long the parts of a solution took.
type Timing struct {
	Solve time.Duration // ordering, assembling, factorising and solving the mesh equations
	Audit time.Duration // checking them, the second method included
}
