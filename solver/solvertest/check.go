package solvertest

import (
	"math/cmplx"
	"testing"

	"loopwright/solver"
)

// tolerance is what currents and voltages may be off by, against the largest of their kind.
const tolerance = 1e-9

// Check holds a solution against what every way of solving a network must meet: the laws of Kirchhoff, the law of every
// branch, power, what floats, and the dense solution of all equations by gonum. It uses nothing of the solver but its
// types.
func Check[T solver.Scalar](t testing.TB, n *solver.Network[T], s *solver.Solution[T]) {
	t.Helper()
	c := &checker[T]{TB: t, n: n, s: s, lowest: lowestNodes(n, s.Laws)}
	for b := range s.Current {
		c.amperes = max(c.amperes, size(s.Current[b]))
		c.volts = max(c.volts, size(s.Voltage[b]))
		if s.Laws[b].Beta == 1 { // an EMF, which its impedance may take
			c.volts = max(c.volts, size(s.Laws[b].Gamma))
		}
	}
	c.floats()
	c.currents()
	c.voltages()
	c.laws()
	c.power()
	c.dense()
}

type checker[T solver.Scalar] struct {
	testing.TB
	n              *solver.Network[T]
	s              *solver.Solution[T]
	lowest         []int   // the lowest node of the piece of each node
	amperes, volts float64 // the largest of the case
}

// size is |x|.
func size[T solver.Scalar](x T) float64 { return cmplx.Abs(number(x)) }

// number gives x as a complex number.
func number[T solver.Scalar](x T) complex128 {
	switch x := any(x).(type) {
	case float64:
		return complex(x, 0)
	case complex128:
		return x
	}
	return cmplx.NaN()
}

// wrong reports whether a remainder is more than the tolerance of a scale. NaN is always wrong.
func wrong[T solver.Scalar](remainder T, scale float64) bool {
	return !(size(remainder) <= tolerance*scale)
}

// lowestNodes gives for each node the lowest node that it hangs together with, without open branches.
func lowestNodes[T solver.Scalar](n *solver.Network[T], laws []solver.Law[T]) []int {
	lowest := make([]int, n.Nodes)
	for node := range lowest {
		lowest[node] = node
	}
	for changed := true; changed; {
		changed = false
		for b, branch := range n.Branches {
			if Open(&laws[b]) {
				continue
			}
			least := min(lowest[branch.From], lowest[branch.To])
			changed = changed || lowest[branch.From] != least || lowest[branch.To] != least
			lowest[branch.From], lowest[branch.To] = least, least
		}
	}
	return lowest
}

// Open reports whether a law sets a current of 0 A without regard to other branches.
func Open[T solver.Scalar](law *solver.Law[T]) bool {
	for _, term := range law.Terms {
		if term.Alpha != 0 || term.Beta != 0 {
			return false
		}
	}
	return law.Beta == 0 && law.Gamma == 0
}

// floats checks that exactly what has no reference is marked, and stands as zero.
func (c *checker[T]) floats() {
	c.Helper()
	for node, floating := range c.s.FloatingNode {
		want := c.n.Reference < 0 || c.lowest[node] != c.lowest[c.n.Reference]
		if floating != want || (floating && c.s.Node[node] != 0) {
			c.Errorf("node %d: floating %v at %v V, want floating %v", node, floating, c.s.Node[node], want)
		}
	}
	for b, floating := range c.s.FloatingBranch {
		branch := c.n.Branches[b]
		want := c.lowest[branch.From] != c.lowest[branch.To]
		if floating != want || (floating && (c.s.Voltage[b] != 0 || c.s.Current[b] != 0)) {
			c.Errorf("branch %d: floating %v, %v V and %v A, want floating %v", b, floating, c.s.Voltage[b], c.s.Current[b], want)
		}
	}
}

// currents checks Kirchhoff's current law, and that the branch currents are those of the meshes.
func (c *checker[T]) currents() {
	c.Helper()
	node := make([]T, c.n.Nodes)
	mesh := make([]T, len(c.n.Branches))
	for m := range c.n.Meshes {
		for _, step := range c.n.Meshes[m].Path {
			if step.Sense > 0 {
				mesh[step.Branch] += c.s.Mesh[m]
			} else {
				mesh[step.Branch] -= c.s.Mesh[m]
			}
		}
	}
	meshes := c.amperes
	for _, i := range c.s.Mesh {
		meshes = max(meshes, size(i))
	}
	for b, j := range c.s.Current {
		node[c.n.Branches[b].From] += j
		node[c.n.Branches[b].To] -= j
		if wrong(j-mesh[b], meshes) {
			c.Errorf("branch %d carries %v A, its meshes %v A", b, j, mesh[b])
		}
	}
	for k, sum := range node {
		if wrong(sum, c.amperes) {
			c.Errorf("the currents at node %d add up to %v A", k, sum)
		}
	}
}

// voltages checks Kirchhoff's voltage law around the meshes, and the branch voltages against those of the nodes.
func (c *checker[T]) voltages() {
	c.Helper()
	for m, mesh := range c.n.Meshes {
		var sum T
		floating := false
		for _, step := range mesh.Path {
			floating = floating || c.s.FloatingBranch[step.Branch]
			if step.Sense > 0 {
				sum += c.s.Voltage[step.Branch]
			} else {
				sum -= c.s.Voltage[step.Branch]
			}
		}
		if !floating && wrong(sum, c.volts) {
			c.Errorf("the voltages around mesh %d add up to %v V", m, sum)
		}
	}
	for b, branch := range c.n.Branches {
		if c.s.FloatingNode[branch.From] || c.s.FloatingNode[branch.To] {
			continue
		}
		if wrong(c.s.Node[branch.From]-c.s.Node[branch.To]-c.s.Voltage[b], c.volts) {
			c.Errorf("branch %d has %v V between nodes of %v V and %v V", b, c.s.Voltage[b], c.s.Node[branch.From], c.s.Node[branch.To])
		}
	}
}

// laws checks Alpha·j + Beta·u + Σ Terms = Gamma for each branch.
func (c *checker[T]) laws() {
	c.Helper()
	for b, law := range c.s.Laws {
		sum := law.Alpha*c.s.Current[b] + law.Beta*c.s.Voltage[b] - law.Gamma
		scale := size(law.Alpha)*c.amperes + size(law.Beta)*c.volts + size(law.Gamma)
		for _, term := range law.Terms {
			sum += term.Alpha*c.s.Current[term.Branch] + term.Beta*c.s.Voltage[term.Branch]
			scale += size(term.Alpha)*c.amperes + size(term.Beta)*c.volts
		}
		if wrong(sum, scale) {
			c.Errorf("the law of branch %d is missed by %v of %v", b, sum, scale)
		}
	}
}

// power checks Tellegen's theorem, and that the audit agrees with all of this.
func (c *checker[T]) power() {
	c.Helper()
	var sum complex128
	largest := 0.0
	for b := range c.s.Current {
		power := number(c.s.Voltage[b]) * cmplx.Conj(number(c.s.Current[b]))
		sum += power
		largest = max(largest, cmplx.Abs(power))
	}
	if wrong(sum, max(largest, 1e-6*c.volts*c.amperes)) {
		c.Errorf("the powers add up to %v W, the largest is %v W", sum, largest)
	}
	if !c.s.Audit.Passed {
		c.Errorf("the audit is not passed: %+v", c.s.Audit)
	}
}
