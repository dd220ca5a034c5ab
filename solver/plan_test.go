package solver_test

import (
	"context"
	"errors"
	"math"
	"math/rand/v2"
	"strings"
	"sync"
	"testing"

	"loopwright/solver"
	"loopwright/solver/solvertest"
)

func TestAPlanTakesLawsThatItWasNotLaidOutFor(t *testing.T) {
	random := rand.New(rand.NewPCG(31, 1))
	n := solvertest.Lattice(random, 4, 4, 0.9, solvertest.Mix{Decades: 3, Real: 0.1}.RealLaws(random))
	plan, err := solver.Prepare(context.Background(), n)
	if err != nil {
		t.Fatal(err)
	}
	draw := everyday().RealLaws(random)
	for range 100 {
		laws := lawsOf(n)
		for range 4 {
			laws[random.IntN(len(laws))] = draw()
		}
		solution, err := plan.Solve(context.Background(), laws)
		var problem *solver.Problem
		if errors.As(err, &problem) {
			continue
		}
		if err != nil {
			t.Fatal(err)
		}
		compareWithFresh(t, n, laws, solution)
	}
}

func TestForkedPlansWorkSideBySide(t *testing.T) {
	random := rand.New(rand.NewPCG(31, 2))
	n := solvertest.Lattice(random, 5, 5, 1, solvertest.Mix{Decades: 3, Real: 0.2}.RealLaws(random))
	plan, err := solver.Prepare(context.Background(), n)
	if err != nil {
		t.Fatal(err)
	}
	want, err := plan.Solve(context.Background(), lawsOf(n))
	if err != nil {
		t.Fatal(err)
	}
	var group sync.WaitGroup
	for range 4 {
		fork := plan.Fork()
		group.Go(func() {
			for range 20 {
				solution, err := fork.Solve(context.Background(), lawsOf(n))
				if err != nil || !solution.Audit.Passed || solution.Current[3] != want.Current[3] {
					t.Errorf("error %v", err)
				}
			}
		})
	}
	group.Wait()
}

func TestAControlledSourceMayBecomeOpenButNotReadAnotherBranch(t *testing.T) {
	n := network(emf(1, 0, 5), ohms(1, 0, 10), vcvs(2, 0, 1, 3), ohms(2, 0, 10))
	plan, err := solver.Prepare(context.Background(), n)
	if err != nil {
		t.Fatal(err)
	}
	laws := lawsOf(n)
	laws[2] = solver.Open[float64]()
	solution, err := plan.Solve(context.Background(), laws)
	if err != nil || !solution.Audit.Passed || solution.Voltage[3] != 0 {
		t.Errorf("solution %+v, error %v", solution, err)
	}
	laws[2] = vcvs(2, 0, 3, 3).Law
	if _, err := plan.Solve(context.Background(), laws); err == nil || !strings.Contains(err.Error(), "other branches") {
		t.Errorf("the error is %v", err)
	}
}

func TestAnAuditFindsEveryKindOfError(t *testing.T) {
	n := network(emf(1, 0, 24), ohms(1, 2, 10), ohms(2, 0, 30), ohms(2, 3, 5), ohms(3, 0, 25))
	plan, err := solver.Prepare(context.Background(), n)
	if err != nil {
		t.Fatal(err)
	}
	tests := []struct {
		name  string
		wrong func(*solver.Solution[float64])
		seen  func(solver.Audit) float64
	}{
		{"a current", func(s *solver.Solution[float64]) { s.Current[1] *= 1 + 1e-8 }, func(a solver.Audit) float64 { return a.KCL }},
		{"a drop", func(s *solver.Solution[float64]) { s.Current[2] *= 1 + 1e-8 }, func(a solver.Audit) float64 { return a.KVL }},
		{"a voltage", func(s *solver.Solution[float64]) { s.Voltage[3] += 1e-6 }, func(a solver.Audit) float64 { return a.Power }},
		{"a node", func(s *solver.Solution[float64]) { s.Node[2] += 1e-6 }, func(a solver.Audit) float64 { return a.NodalGap }},
	}
	for _, test := range tests {
		solution, err := plan.Solve(context.Background(), lawsOf(n))
		if err != nil || !solution.Audit.Passed {
			t.Fatalf("%+v, error %v", solution, err)
		}
		test.wrong(solution)
		if err := plan.Audit(context.Background(), solution); err != nil {
			t.Fatal(err)
		}
		if solution.Audit.Passed || test.seen(solution.Audit) < solver.AuditLimit {
			t.Errorf("%s is wrong, and the audit says %+v", test.name, solution.Audit)
		}
	}
}

func TestNoZeroHasASign(t *testing.T) {
	s := solve(t, network(emf(1, 0, -24), open(1, 2), ohms(2, 0, 10), ohms(2, 3, 5), ohms(3, 0, 5), open(0, 3)))
	for _, values := range [][]float64{s.Mesh, s.Current, s.Voltage, s.Node} {
		for k, x := range values {
			if x == 0 && math.Signbit(x) {
				t.Errorf("value %d of %v is −0", k, values)
			}
		}
	}
}

func TestACaseWithoutAnyCurrentPassesItsAuditWithZeros(t *testing.T) {
	s := solve(t, network(emf(1, 0, 24), open(1, 2), ohms(2, 0, 10)))
	if s.Audit != (solver.Audit{Passed: true}) {
		t.Errorf("audit %+v", s.Audit)
	}
}

// Sheets have closed contacts of milliohms beside meters of megohms; beyond that the digits must hold just as well.
func TestImpedancesFarApartPassTheAudit(t *testing.T) {
	for _, pair := range [][2]float64{{1e-3, 1e8}, {0.02, 1e7}, {1e-9, 1e9}, {1e-12, 1e12}} {
		small, large := pair[0], pair[1]
		networks := map[string]*solver.Network[float64]{
			"a meter beside a short circuit": network(emf(1, 0, 24), ohms(1, 2, small), ohms(2, 0, large), ohms(2, 0, small)),
			"meters across closed contacts":  network(emf(1, 0, 24), ohms(1, 2, small), ohms(1, 2, large), ohms(2, 3, small), ohms(2, 3, large), ohms(3, 0, 100)),
			"a ladder of both":               network(emf(1, 0, 24), ohms(1, 2, small), ohms(2, 0, large), ohms(2, 3, large), ohms(3, 0, small), ohms(3, 4, small), ohms(4, 0, large)),
			"a bridge out of balance":        network(emf(1, 0, 24), ohms(1, 2, small), ohms(2, 0, large), ohms(1, 3, large), ohms(3, 0, small), ohms(2, 3, 1)),
		}
		for name, n := range networks {
			s, err := solver.Solve(context.Background(), n)
			if err != nil {
				t.Fatal(err)
			}
			if !s.Audit.Passed || s.Audit.NodalGap > 1e-13 {
				t.Errorf("%s, %g and %g ohms: %+v", name, small, large, s.Audit)
			}
		}
	}
}

func TestAnEndedContextEndsTheWork(t *testing.T) {
	random := rand.New(rand.NewPCG(31, 3))
	n := solvertest.Lattice(random, 40, 40, 1, solvertest.Mix{Real: 0.1}.RealLaws(random))
	ended, end := context.WithCancel(context.Background())
	end()
	if _, err := solver.Solve(ended, n); !errors.Is(err, context.Canceled) {
		t.Errorf("the error is %v", err)
	}
	plan, err := solver.Prepare(context.Background(), n)
	if err != nil {
		t.Fatal(err)
	}
	if _, err := plan.Solve(ended, lawsOf(n)); !errors.Is(err, context.Canceled) {
		t.Errorf("the error is %v", err)
	}
	solution, err := plan.SolveUnaudited(context.Background(), lawsOf(n))
	if err != nil {
		t.Fatal(err)
	}
	if err := plan.Audit(ended, solution); !errors.Is(err, context.Canceled) {
		t.Errorf("the error is %v", err)
	}
	if solution, err := plan.Solve(context.Background(), lawsOf(n)); err != nil || !solution.Audit.Passed {
		t.Errorf("after that the plan gives %v", err)
	}
}

func TestMistakesOfTheCallerAreErrorsAndNotProblems(t *testing.T) {
	good := func() *solver.Network[float64] { return network(emf(1, 0, 24), ohms(1, 0, 10), ohms(1, 0, 5)) }
	tests := []struct {
		name  string
		wrong func(*solver.Network[float64])
		says  string
	}{
		{"a branch to nowhere", func(n *solver.Network[float64]) { n.Branches[1].To = 2 }, "branch 1 ends at node 2"},
		{"a reference that is not there", func(n *solver.Network[float64]) { n.Reference = 7 }, "reference node 7"},
		{"too few meshes", func(n *solver.Network[float64]) { n.Meshes = n.Meshes[:1] }, "1 meshes given"},
		{"an empty mesh", func(n *solver.Network[float64]) { n.Meshes[1].Path = nil }, "mesh 1 has no branches"},
		{"a mesh that does not close", func(n *solver.Network[float64]) { n.Meshes[0].Path[0].Sense *= -1 }, "does not close"},
		{"a mesh with a wild sense", func(n *solver.Network[float64]) { n.Meshes[0].Path[0].Sense = 2 }, "must be 1 or -1"},
		{"a mesh through nothing", func(n *solver.Network[float64]) { n.Meshes[0].Path[0].Branch = 9 }, "branch 9, which does not exist"},
		{"the same mesh twice", func(n *solver.Network[float64]) { n.Meshes[1] = n.Meshes[0] }, "not independent"},
		{"a law that says nothing", func(n *solver.Network[float64]) { n.Branches[1].Law = solver.Law[float64]{} }, "says nothing"},
		{"a law that is no number", func(n *solver.Network[float64]) { n.Branches[1].Law.Alpha = math.NaN() }, "not finite"},
		{"an endless law", func(n *solver.Network[float64]) { n.Branches[0].Law.Gamma = math.Inf(1) }, "not finite"},
		{"a control by nothing", func(n *solver.Network[float64]) { n.Branches[1] = vcvs(1, 0, 5, 1) }, "branch 5, which does not exist"},
		{"a control that is no number", func(n *solver.Network[float64]) { n.Branches[1] = vcvs(1, 0, 2, math.NaN()) }, "not finite"},
	}
	for _, test := range tests {
		n := good()
		test.wrong(n)
		_, err := solver.Solve(context.Background(), n)
		var problem *solver.Problem
		if err == nil || errors.As(err, &problem) || !strings.Contains(err.Error(), test.says) {
			t.Errorf("%s: the error is %v, want %q in it", test.name, err, test.says)
		}
	}
}

// With v = a·(v1 − v3) and Kirchhoff's current law at the feedback point 3, by hand:
//
//	v = v1·a·(g1 + g2) / (g1 + g2 + g + a·g2)
func TestAnAmplifierWithFeedbackHasItsClosedLoopGain(t *testing.T) {
	for _, gain := range []float64{1e3, 1e6, 1e9, 1e12} {
		s := solve(t, network(emf(1, 0, 0.1), ohms(1, 3, 1e7), vcvs(2, 0, 1, gain), ohms(2, 3, 9000), ohms(3, 0, 1000)))
		g, g1, g2 := 1/1e7, 1/1000.0, 1/9000.0
		want := 0.1 * gain * (g1 + g2) / (g1 + g2 + g + gain*g2)
		if got := s.Node[2]; abs(got-want) > 1e-14*want {
			t.Errorf("gain %g: %.15g V, want %.15g V", gain, got, want)
		}
	}
}
