package solvertest

import (
	"math/big"

	"loopwright/solver"
)

// Exact is a solution in rational numbers, without any rounding.
type Exact struct {
	Current, Voltage []*big.Rat // per branch
}

// SolveExactly solves a small network of real laws over the rational numbers by elimination of all its equations: the
// current law at every node and the law of every branch, with the node voltages and branch currents as unknowns, and the
// lowest node of each piece that hangs together without open branches at 0 V. It reports false when these equations
// contradict each other or leave anything undetermined. It shares nothing with the solver; the cost grows with the cube
// of the size, and faster with the length of the fractions.
func SolveExactly(n *solver.Network[float64]) (*Exact, bool) {
	unknowns := n.Nodes + len(n.Branches)
	rows := make([][]*big.Rat, 0, unknowns+n.Nodes)
	for node := range n.Nodes {
		rows = append(rows, currentLaw(n, node, unknowns))
	}
	for b := range n.Branches {
		rows = append(rows, branchLaw(n, b, unknowns))
	}
	laws := make([]solver.Law[float64], len(n.Branches))
	for b := range laws {
		laws[b] = n.Branches[b].Law
	}
	for node, piece := range lowestNodes(n, laws) {
		if piece == node {
			row := zeros(unknowns + 1)
			row[node].SetInt64(1)
			rows = append(rows, row)
		}
	}
	x, unique := eliminate(rows, unknowns)
	if !unique {
		return nil, false
	}
	exact := &Exact{}
	for b, branch := range n.Branches {
		exact.Current = append(exact.Current, x[n.Nodes+b])
		exact.Voltage = append(exact.Voltage, new(big.Rat).Sub(x[branch.From], x[branch.To]))
	}
	return exact, true
}

func zeros(length int) []*big.Rat {
	row := make([]*big.Rat, length)
	for k := range row {
		row[k] = new(big.Rat)
	}
	return row
}

func add(to *big.Rat, x float64) { to.Add(to, new(big.Rat).SetFloat64(x)) }

func currentLaw(n *solver.Network[float64], node, unknowns int) []*big.Rat {
	row := zeros(unknowns + 1)
	for b, branch := range n.Branches {
		if branch.From == node {
			add(row[n.Nodes+b], 1)
		}
		if branch.To == node {
			add(row[n.Nodes+b], -1)
		}
	}
	return row
}

func branchLaw(n *solver.Network[float64], b, unknowns int) []*big.Rat {
	row := zeros(unknowns + 1)
	put := func(b int, alpha, beta float64) {
		add(row[n.Nodes+b], alpha)
		add(row[n.Branches[b].From], beta)
		add(row[n.Branches[b].To], -beta)
	}
	law := n.Branches[b].Law
	put(b, law.Alpha, law.Beta)
	for _, term := range law.Terms {
		put(term.Branch, term.Alpha, term.Beta)
	}
	add(row[unknowns], law.Gamma)
	return row
}

// eliminate brings the augmented rows to reduced echelon form.
func eliminate(rows [][]*big.Rat, unknowns int) (x []*big.Rat, unique bool) {
	done := 0
	for column := range unknowns {
		pivot := -1
		for r := done; r < len(rows); r++ {
			if rows[r][column].Sign() != 0 {
				pivot = r
				break
			}
		}
		if pivot < 0 {
			return nil, false
		}
		rows[done], rows[pivot] = rows[pivot], rows[done]
		reduce(rows, done, column)
		done++
	}
	for _, row := range rows[done:] {
		if row[unknowns].Sign() != 0 {
			return nil, false
		}
	}
	x = make([]*big.Rat, unknowns)
	for column := range unknowns {
		x[column] = rows[column][unknowns]
	}
	return x, true
}

// reduce makes the pivot 1 and clears its column in all other rows.
func reduce(rows [][]*big.Rat, pivot, column int) {
	inverse := new(big.Rat).Inv(rows[pivot][column])
	var live []int
	for k, value := range rows[pivot] {
		if value.Sign() != 0 {
			value.Mul(value, inverse)
			live = append(live, k)
		}
	}
	for r, row := range rows {
		if r == pivot || row[column].Sign() == 0 {
			continue
		}
		factor := new(big.Rat).Set(row[column])
		for _, k := range live {
			row[k].Sub(row[k], new(big.Rat).Mul(factor, rows[pivot][k]))
		}
	}
}
