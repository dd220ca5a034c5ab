package solver_test

import (
	"context"
	"errors"
	"math/big"
	"math/rand/v2"
	"testing"

	"pgregory.net/rapid"

	"loopwright/solver"
	"loopwright/solver/solvertest"
)

// everyday is a mix of laws as sheets have them; hostile one with impedances 18 decades apart.
func everyday() solvertest.Mix {
	return solvertest.Mix{Decades: 5, Ideal: 0.04, Real: 0.1, Currents: 0.03, Open: 0.15, Closed: 0.15, Admittance: 0.05, Row: 0.1}
}

func hostile() solvertest.Mix {
	return solvertest.Mix{Decades: 18, Ideal: 0.03, Real: 0.1, Currents: 0.03, Open: 0.15, Closed: 0.05, Admittance: 0.1, Row: 0.1}
}

// solveOrProblem gives nil for a network that has no unique solution.
func solveOrProblem[T solver.Scalar](t testing.TB, n *solver.Network[T]) *solver.Solution[T] {
	t.Helper()
	solution, err := solver.Solve(context.Background(), n)
	var problem *solver.Problem
	if errors.As(err, &problem) {
		return nil
	}
	if err != nil {
		t.Fatal(err)
	}
	return solution
}

func lawsOf[T solver.Scalar](n *solver.Network[T]) []solver.Law[T] {
	laws := make([]solver.Law[T], len(n.Branches))
	for b := range laws {
		laws[b] = n.Branches[b].Law
	}
	return laws
}

func TestRandomNetworksPassTheContract(t *testing.T) {
	for _, mix := range []solvertest.Mix{everyday(), hostile()} {
		random := rand.New(rand.NewPCG(11, 1))
		solved := 0
		for range 300 {
			networks := []*solver.Network[float64]{
				solvertest.Lattice(random, 1+random.IntN(6), 1+random.IntN(6), 0.5+random.Float64()/2, mix.RealLaws(random)),
				solvertest.Ladder(1+random.IntN(20), mix.RealLaws(random)),
				solvertest.Multigraph(random, 1+random.IntN(10), 1+random.IntN(25), mix.RealLaws(random)),
			}
			for _, n := range networks {
				if solution := solveOrProblem(t, n); solution != nil {
					solvertest.Check(t, n, solution)
					solved++
				}
			}
		}
		if solved < 300 {
			t.Errorf("only %d networks have a solution: the test asks for too little", solved)
		}
	}
}

func TestRandomNetworksOfPhasorsPassTheContract(t *testing.T) {
	for _, mix := range []solvertest.Mix{everyday(), hostile()} {
		random := rand.New(rand.NewPCG(11, 2))
		solved := 0
		for range 200 {
			networks := []*solver.Network[complex128]{
				solvertest.Lattice(random, 1+random.IntN(5), 1+random.IntN(5), 0.5+random.Float64()/2, mix.ComplexLaws(random)),
				solvertest.Multigraph(random, 1+random.IntN(8), 1+random.IntN(20), mix.ComplexLaws(random)),
			}
			for _, n := range networks {
				if solution := solveOrProblem(t, n); solution != nil {
					solvertest.Check(t, n, solution)
					solved++
				}
			}
		}
		if solved < 150 {
			t.Errorf("only %d networks have a solution: the test asks for too little", solved)
		}
	}
}

func TestMeshAndNodalAnalysisAgreeOnPlaneCircuits(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		random := rand.New(rand.NewPCG(rapid.Uint64().Draw(t, "seed"), 0))
		columns, rows := rapid.IntRange(1, 8).Draw(t, "columns"), rapid.IntRange(1, 8).Draw(t, "rows")
		keep := rapid.Float64Range(0.3, 1).Draw(t, "share of edges")
		mix := everyday()
		mix.Decades = rapid.Float64Range(0, 18).Draw(t, "decades")
		n := solvertest.Lattice(random, columns, rows, keep, mix.RealLaws(random))
		if len(n.Branches) == 0 {
			return
		}
		solution, err := solver.Solve(context.Background(), n)
		var problem *solver.Problem
		if errors.As(err, &problem) {
			return
		}
		if err != nil {
			t.Fatal(err)
		}
		if gap := solution.Audit.NodalGap; !solution.Audit.Passed || gap > 1e-12 {
			t.Fatalf("audit: %+v", solution.Audit)
		}
	})
}

// The oracle is elimination over the rational numbers, which rounds nothing: it decides whether there is a unique solution,
// and what its last digits are.
func TestSmallNetworksAgreeWithRationalArithmetic(t *testing.T) {
	for _, mix := range []solvertest.Mix{everyday(), hostile()} {
		random := rand.New(rand.NewPCG(11, 3))
		laws := mix.RealLaws(random)
		for trial := range 1500 {
			n := solvertest.Multigraph(random, 2+random.IntN(5), 1+random.IntN(11), laws)
			compareExactly(t, trial, n)
		}
	}
}

// Small whole numbers make controlled sources cancel, contradict and leave things open often.
func TestControlledSourcesAgreeWithRationalArithmetic(t *testing.T) {
	random := rand.New(rand.NewPCG(11, 4))
	codes := map[solver.Code]int{}
	for trial := range 2500 {
		nodes, branches := 2+random.IntN(5), 2+random.IntN(10)
		laws := func() solver.Law[float64] {
			if random.IntN(4) > 0 {
				return solvertest.Mix{Real: 0.2, Currents: 0.1, Open: 0.1, Ideal: 0.05}.RealLaws(random)()
			}
			return controlled(random, branches)
		}
		n := solvertest.Multigraph(random, nodes, branches, laws)
		if !readsFloating(n) {
			codes[compareExactly(t, trial, n)]++
		}
	}
	if codes[""] < 500 || codes[solver.ControlLoop] < 50 {
		t.Errorf("the outcomes are %v: the test asks for too little", codes)
	}
}

func controlled(random *rand.Rand, branches int) solver.Law[float64] {
	law := solver.Law[float64]{Terms: []solver.Term[float64]{{Branch: random.IntN(branches)}}}
	gain := float64(random.IntN(5) - 2)
	if random.IntN(2) == 0 {
		law.Alpha = 1
	} else {
		law.Beta = 1
	}
	if random.IntN(2) == 0 {
		law.Terms[0].Alpha = gain
	} else {
		law.Terms[0].Beta = gain
	}
	return law
}

// readsFloating reports whether a controlled source reads the voltage of an open branch that may float. The solver refuses
// such a control, while the rational solution puts the floating voltage at the value that the grounds happen to give.
func readsFloating(n *solver.Network[float64]) bool {
	for _, branch := range n.Branches {
		for _, term := range branch.Law.Terms {
			if term.Beta != 0 && solvertest.Open(&n.Branches[term.Branch].Law) {
				return true
			}
		}
	}
	return false
}

func compareExactly(t *testing.T, trial int, n *solver.Network[float64]) solver.Code {
	t.Helper()
	exact, unique := solvertest.SolveExactly(n)
	solution, err := solver.Solve(context.Background(), n)
	var problem *solver.Problem
	if err != nil && !errors.As(err, &problem) {
		t.Fatal(err)
	}
	if unique != (err == nil) {
		t.Errorf("trial %d: unique by rational arithmetic: %v, but the error is %v\n%+v", trial, unique, err, n.Branches)
	}
	if problem != nil {
		return problem.Code
	}
	if !unique {
		return ""
	}
	if !solution.Audit.Passed {
		t.Errorf("trial %d: the audit is not passed: %+v", trial, solution.Audit)
	}
	amperes, volts := 0.0, 0.0
	for b := range solution.Current {
		amperes, volts = max(amperes, abs(solution.Current[b])), max(volts, abs(solution.Voltage[b]))
	}
	for b := range solution.Current {
		j, u := float(exact.Current[b]), float(exact.Voltage[b])
		if abs(j-solution.Current[b]) > 4e-16*abs(j)+1e-18*amperes {
			t.Errorf("trial %d: branch %d carries %.17g A, exactly %.17g A", trial, b, solution.Current[b], j)
		}
		if !solution.FloatingBranch[b] && abs(u-solution.Voltage[b]) > 4e-16*abs(u)+1e-17 {
			t.Errorf("trial %d: branch %d has %.17g V, exactly %.17g V", trial, b, solution.Voltage[b], u)
		}
	}
	return ""
}

func abs(x float64) float64 { return max(x, -x) }

func float(x *big.Rat) float64 {
	value, _ := x.Float64()
	return value
}
