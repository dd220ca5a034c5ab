package solver

import (
	"fmt"
	"math"
)

// validate refuses networks that are not networks: nodes or branches that do not exist, meshes that do not close, a
// wrong number of meshes. Such errors are mistakes of the caller, not Problems of the circuit.
func validate[T Scalar](n *Network[T]) error {
	if n.Reference < -1 || n.Reference >= max(n.Nodes, 1) {
		return fmt.Errorf("reference node %d does not exist: there are %d nodes", n.Reference, n.Nodes)
	}
	joined := newGroups(n.Nodes)
	components := n.Nodes
	for b, branch := range n.Branches {
		for _, node := range [2]int{branch.From, branch.To} {
			if node < 0 || node >= n.Nodes {
				return fmt.Errorf("branch %d ends at node %d, which does not exist: there are %d nodes", b, node, n.Nodes)
			}
		}
		if joined.join(branch.From, branch.To) {
			components--
		}
	}
	if want := len(n.Branches) - n.Nodes + components; len(n.Meshes) != want {
		return fmt.Errorf("%d meshes given, but %d branches, %d nodes and %d connected components need %d",
			len(n.Meshes), len(n.Branches), n.Nodes, components, want)
	}
	for m := range n.Meshes {
		if err := validateMesh(n, m); err != nil {
			return err
		}
	}
	return nil
}

func validateMesh[T Scalar](n *Network[T], m int) error {
	path := n.Meshes[m].Path
	if len(path) == 0 {
		return fmt.Errorf("mesh %d has no branches", m)
	}
	for _, step := range path {
		if step.Branch < 0 || step.Branch >= len(n.Branches) {
			return fmt.Errorf("mesh %d runs through branch %d, which does not exist", m, step.Branch)
		}
		if step.Sense != 1 && step.Sense != -1 {
			return fmt.Errorf("mesh %d runs through branch %d in the sense %d: it must be 1 or -1", m, step.Branch, step.Sense)
		}
	}
	_, at := n.ends(path[len(path)-1])
	for _, step := range path {
		from, to := n.ends(step)
		if from != at {
			return fmt.Errorf("mesh %d does not close: branch %d does not begin where the one before it ends", m, step.Branch)
		}
		at = to
	}
	return nil
}

// ends gives the nodes between which a step runs, in its own sense.
func (n *Network[T]) ends(step Step) (from, to int) {
	branch := &n.Branches[step.Branch]
	if step.Sense < 0 {
		return branch.To, branch.From
	}
	return branch.From, branch.To
}

// validateLaws refuses laws that say nothing or are no numbers.
func validateLaws[T Scalar](laws []Law[T]) error {
	for b := range laws {
		law := &laws[b]
		if !finite(law.Alpha) || !finite(law.Beta) || !finite(law.Gamma) {
			return fmt.Errorf("the law of branch %d has a value that is not finite", b)
		}
		if law.Alpha == 0 && law.Beta == 0 && !law.controlled() {
			return fmt.Errorf("the law of branch %d says nothing about its current or voltage", b)
		}
		for _, term := range law.Terms {
			if term.Branch < 0 || term.Branch >= len(laws) {
				return fmt.Errorf("the law of branch %d refers to branch %d, which does not exist", b, term.Branch)
			}
			if !finite(term.Alpha) || !finite(term.Beta) {
				return fmt.Errorf("the law of branch %d refers to branch %d with a value that is not finite", b, term.Branch)
			}
		}
	}
	return nil
}

func finite[T Scalar](x T) bool {
	size := magnitude(x)
	return !math.IsNaN(size) && !math.IsInf(size, 0)
}

// independent reports whether no mesh is a combination of the others, by elimination over the integers modulo a prime.
// It is only asked when the mesh equations turn out singular.
func independent(meshes []Mesh) bool {
	const prime = 1<<31 - 1
	reduced := map[int]map[int]int64{} // by leading branch; the leading coefficient is 1
	for _, mesh := range meshes {
		row := map[int]int64{}
		for _, step := range mesh.Path {
			row[step.Branch] = (row[step.Branch] + int64(step.Sense) + prime) % prime
		}
		lead := leading(row)
		for lead >= 0 {
			pivot, known := reduced[lead]
			if !known {
				break
			}
			factor := row[lead]
			for branch, value := range pivot {
				row[branch] = (row[branch] + (prime-factor)*value) % prime
			}
			lead = leading(row)
		}
		if lead < 0 {
			return false
		}
		inverse := power(row[lead], prime-2, prime)
		for branch := range row {
			row[branch] = row[branch] * inverse % prime
		}
		reduced[lead] = row
	}
	return true
}

// leading drops the zeros of a row and gives its lowest branch, −1 when none is left.
func leading(row map[int]int64) int {
	lowest := -1
	for branch, value := range row {
		if value == 0 {
			delete(row, branch)
		} else if lowest < 0 || branch < lowest {
			lowest = branch
		}
	}
	return lowest
}

func power(base, exponent, modulus int64) int64 {
	result := int64(1)
	for ; exponent > 0; exponent >>= 1 {
		if exponent&1 == 1 {
			result = result * base % modulus
		}
		base = base * base % modulus
	}
	return result
}
