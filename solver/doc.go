// Package solver solves linear networks by mesh analysis and checks every solution by a second, independent method. It
// knows branches, nodes and meshes; it knows no drawing and no part. Everything is generic over float64 (direct current)
// and complex128 (phasors at one frequency; root mean square values, so that power is u·conj(j)).
//
// # Signs
//
// A branch runs from its node From to its node To. Its voltage is u = v(From) − v(To) in volts, its current j is positive
// when it flows from From to To through the branch, in amperes, and u·conj(j) is the power that it absorbs, in watts. A
// source that delivers shows a negative power.
//
// # Method
//
// The unknowns are the mesh currents i and the voltages u of the row branches: those whose law sets the current, refers
// to other branches, may change from case to case, or has a very large impedance. There is one row for each mesh
//
//	Σ ±(E + Z·j) + Σ ±u = 0,   j = Σ ±i
//
// and one for each row branch
//
//	Alpha·j + Beta·u + Σ (Alpha·j_k + Beta·u_k) = Gamma.
//
// This is the dual of modified nodal analysis (Ho, Ruehli, Brennan, "The modified nodal approach to network analysis",
// IEEE Transactions on Circuits and Systems 22, 1975) and has no special cases: a current source between two meshes is
// the constraint of their supermesh, and an open contact is a current source of 0 A.
//
// The solution is refined with twice the digits until it is that of the laws as given, to the last digit, however far apart
// the impedances are: what remains uncertain is the values entered. See package sparse, Refine.
//
// The second method writes Kirchhoff's current law for the nodes, with the node voltages and all branch currents as
// unknowns. It shares the factorisation of sparse matrices with the first, and nothing else.
//
// # When there is no solution
//
// Loops of ideal voltage sources and cut sets of current sources are found by looking at the graph, not at small pivots, so
// that the answer names the branches that are at fault: see Problem.
package solver
