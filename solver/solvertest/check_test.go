package solvertest_test

import (
	"context"
	"math"
	"math/rand/v2"
	"testing"

	"loopwright/solver"
	"loopwright/solver/solvertest"
)

// recorder takes the errors that a check reports.
type recorder struct {
	testing.TB
	failed bool
}

func (r *recorder) Errorf(string, ...any) { r.failed = true }
func (r *recorder) Helper()               {}

func TestTheContractRefusesWhatIsWrong(t *testing.T) {
	random := rand.New(rand.NewPCG(81, 1))
	n := solvertest.Lattice(random, 3, 3, 1, solvertest.Mix{Decades: 2, Real: 0.2, Open: 0.1}.RealLaws(random))
	n.Branches[5].Law = solver.Open[float64]()
	wrong := map[string]func(*solver.Solution[float64]){
		"nothing":              func(*solver.Solution[float64]) {},
		"a current":            func(s *solver.Solution[float64]) { s.Current[0] *= 1 + 1e-6 },
		"a voltage":            func(s *solver.Solution[float64]) { s.Voltage[0] *= 1 + 1e-6 },
		"a node":               func(s *solver.Solution[float64]) { s.Node[3] += 1e-6 },
		"a mesh":               func(s *solver.Solution[float64]) { s.Mesh[2] += 1e-6 },
		"a value that is none": func(s *solver.Solution[float64]) { s.Current[1] = math.NaN() },
		"a floating node":      func(s *solver.Solution[float64]) { s.FloatingNode[1] = true },
		"a floating branch":    func(s *solver.Solution[float64]) { s.FloatingBranch[1] = true },
		"a law":                func(s *solver.Solution[float64]) { s.Laws[2].Gamma += 1e-3 },
		"the audit":            func(s *solver.Solution[float64]) { s.Audit.Passed = false },
		"all by a factor": func(s *solver.Solution[float64]) {
			for _, values := range [][]float64{s.Current, s.Voltage, s.Node, s.Mesh} {
				for k := range values {
					values[k] *= 1.001
				}
			}
		},
	}
	for name, change := range wrong {
		solution, err := solver.Solve(context.Background(), n)
		if err != nil {
			t.Fatal(err)
		}
		change(solution)
		r := &recorder{TB: t}
		solvertest.Check(r, n, solution)
		if r.failed != (name != "nothing") {
			t.Errorf("%s is wrong, and the check fails: %v", name, r.failed)
		}
	}
}

// A voltage divider of 3 Ω and 1 Ω at 12 V, by hand: 3 A, 9 V and 3 V.
func TestTheExactSolutionIsExact(t *testing.T) {
	n := &solver.Network[float64]{Nodes: 3, Branches: []solver.Branch[float64]{
		{From: 1, To: 0, Law: solver.VoltageSource(12.0)},
		{From: 1, To: 2, Law: solver.Impedance(3.0, 0)},
		{From: 2, To: 0, Law: solver.Impedance(1.0, 0)},
	}}
	exact, unique := solvertest.SolveExactly(n)
	if !unique {
		t.Fatal("the divider has a unique solution")
	}
	for b, want := range [][2]string{{"-3", "12"}, {"3", "9"}, {"3", "3"}} {
		if j, u := exact.Current[b].RatString(), exact.Voltage[b].RatString(); j != want[0] || u != want[1] {
			t.Errorf("branch %d: %s A and %s V, want %s A and %s V", b, j, u, want[0], want[1])
		}
	}
	n.Branches[2].Law = solver.VoltageSource(3.0)
	n.Branches[1].Law = solver.VoltageSource(8.0)
	if _, unique := solvertest.SolveExactly(n); unique {
		t.Error("12 V against 8 V and 3 V has no solution")
	}
}
