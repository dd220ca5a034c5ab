package solvertest

import (
	"math"

	"gonum.org/v1/gonum/mat"

	"loopwright/solver"
)

// denseLimit is the number of nodes and branches up to which a solution is held against a dense one.
const denseLimit = 150

// dense checks the currents and voltages against gonum's dense LU of all equations at once: the current law of every node
// but one of each piece, which is at 0 V instead, and the law of every branch. Complex equations are written as real ones
// of twice the number. How closely they must agree follows from the condition that gonum finds.
func (c *checker[T]) dense() {
	c.Helper()
	nodes := c.n.Nodes
	order := nodes + len(c.n.Branches)
	if order > denseLimit {
		return
	}
	equations := mat.NewDense(2*order, 2*order, nil)
	right := mat.NewVecDense(2*order, nil)
	put := func(row, column int, x T) {
		z := number(x)
		equations.Set(row, column, equations.At(row, column)+real(z))
		equations.Set(row+order, column+order, equations.At(row+order, column+order)+real(z))
		equations.Set(row, column+order, equations.At(row, column+order)-imag(z))
		equations.Set(row+order, column, equations.At(row+order, column)+imag(z))
	}
	ohms := c.typical()
	for b := range c.n.Branches {
		scale := c.stampBranch(put, b, ohms)
		right.SetVec(nodes+b, real(number(c.s.Laws[b].Gamma))*scale)
		right.SetVec(nodes+b+order, imag(number(c.s.Laws[b].Gamma))*scale)
	}
	for node, lowest := range c.lowest {
		if node == lowest {
			put(node, node, one[T](1))
		}
	}
	var lu mat.LU
	lu.Factorize(equations)
	allowed := 1e-13 * lu.Cond()
	if !(allowed < 1e-4) {
		return
	}
	var x mat.VecDense
	if err := lu.SolveVecTo(&x, false, right); err != nil {
		return
	}
	at := func(k int) complex128 { return complex(x.AtVec(k), x.AtVec(k+order)) }
	largest := mat.Norm(&x, math.Inf(1))
	for b, branch := range c.n.Branches {
		j, u := at(nodes+b)/complex(ohms, 0), at(branch.From)-at(branch.To)
		if gap := j - number(c.s.Current[b]); !(size(gap)*ohms <= allowed*largest) {
			c.Errorf("branch %d carries %v A, by the dense solution %v A", b, c.s.Current[b], j)
		}
		if gap := u - number(c.s.Voltage[b]); !c.s.FloatingBranch[b] && !(size(gap) <= allowed*largest) {
			c.Errorf("branch %d has %v V, by the dense solution %v V", b, c.s.Voltage[b], u)
		}
	}
}

// typical is the geometric mean of the impedances, the unit of resistance of the dense equations.
func (c *checker[T]) typical() float64 {
	sum, count := 0.0, 0.0
	for _, law := range c.s.Laws {
		if law.Alpha != 0 && law.Beta != 0 {
			sum += math.Log(size(law.Alpha) / size(law.Beta))
			count++
		}
	}
	return math.Exp(sum / max(count, 1))
}

// stampBranch puts a branch into the current laws of its nodes and its own law into a row, and gives the row's scale.
func (c *checker[T]) stampBranch(put func(row, column int, x T), b int, ohms float64) float64 {
	nodes, grounds := c.n.Nodes, c.lowest
	branch, law := c.n.Branches[b], c.s.Laws[b]
	if grounds[branch.From] != branch.From {
		put(branch.From, nodes+b, one[T](1))
	}
	if grounds[branch.To] != branch.To {
		put(branch.To, nodes+b, one[T](-1))
	}
	terms := append([]solver.Term[T]{{Branch: b, Alpha: law.Alpha, Beta: law.Beta}}, law.Terms...)
	largest := 0.0
	for _, term := range terms {
		largest = max(largest, size(term.Alpha)/ohms, size(term.Beta))
	}
	for _, term := range terms {
		put(nodes+b, nodes+term.Branch, term.Alpha*one[T](1/(ohms*largest)))
		put(nodes+b, c.n.Branches[term.Branch].From, term.Beta*one[T](1/largest))
		put(nodes+b, c.n.Branches[term.Branch].To, term.Beta*one[T](-1/largest))
	}
	return 1 / largest
}

// one gives a real number as T.
func one[T solver.Scalar](x float64) T {
	var zero T
	if _, isReal := any(zero).(float64); isReal {
		return any(x).(T)
	}
	return any(complex(x, 0)).(T)
}
