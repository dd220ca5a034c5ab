package solver_test

import (
	"context"
	"math/rand/v2"
	"testing"

	"loopwright/solver"
	"loopwright/solver/solvertest"
)

func TestResponsesAndGradientsAgreeWithASecondSolution(t *testing.T) {
	random := rand.New(rand.NewPCG(51, 1))
	mix := solvertest.Mix{Decades: 3, Real: 0.2, Currents: 0.02, Open: 0.15, Closed: 0.1, Row: 0.2}
	compared := 0
	for range 60 {
		n := solvertest.Lattice(random, 3, 3, 0.85, mix.RealLaws(random))
		plan, err := solver.Prepare(context.Background(), n)
		if err != nil {
			t.Fatal(err)
		}
		base, err := plan.Solve(context.Background(), lawsOf(n))
		if err != nil {
			continue
		}
		compared++
		read := solver.Reading{Quantity: solver.Quantity(random.IntN(3)), Branch: random.IntN(len(n.Branches)), From: random.IntN(n.Nodes), To: random.IntN(n.Nodes)}
		gradient, err := plan.Gradient(read)
		if err != nil {
			t.Fatal(err)
		}
		for b := range n.Branches {
			response, err := plan.Respond(b)
			if err != nil {
				t.Fatal(err)
			}
			if want := readResponse(n, base, response, read); abs(gradient[b]-want) > 1e-9*(1+abs(want)) {
				t.Errorf("%+v: the gradient for branch %d is %g, its response %g", read, b, gradient[b], want)
			}
			compareResponse(t, n, b, base, response)
		}
	}
	if compared < 30 {
		t.Errorf("only %d networks have a solution: the test asks for too little", compared)
	}
}

// readResponse picks a reading out of a response.
func readResponse(n *solver.Network[float64], s *solver.Solution[float64], r *solver.Response[float64], read solver.Reading) float64 {
	switch read.Quantity {
	case solver.BranchCurrent:
		return r.Current[read.Branch]
	case solver.BranchVoltage:
		return r.Voltage[read.Branch]
	}
	if s.FloatingNode[read.From] || s.FloatingNode[read.To] {
		return 0
	}
	return r.Node[read.From] - r.Node[read.To]
}

// compareResponse adds 1 to Gamma of a branch and solves again; the equations are linear, so the difference is the response.
func compareResponse(t *testing.T, n *solver.Network[float64], b int, base *solver.Solution[float64], response *solver.Response[float64]) {
	t.Helper()
	if base.Laws[b].Beta == 0 { // an open contact would turn into a current source
		return
	}
	other := *n
	other.Branches = append([]solver.Branch[float64](nil), n.Branches...)
	other.Branches[b].Law.Gamma++
	moved := solve(t, &other)
	for k := range n.Branches {
		j, u := moved.Current[k]-base.Current[k], moved.Voltage[k]-base.Voltage[k]
		if abs(j-response.Current[k]) > 1e-10*(1+abs(moved.Current[k])) || abs(u-response.Voltage[k]) > 1e-10*(1+abs(moved.Voltage[k])) {
			t.Errorf("branch %d answers to branch %d with %g A and %g V, want %g A and %g V", k, b,
				response.Current[k], response.Voltage[k], j, u)
		}
	}
}

// The gradient with respect to an impedance is that with respect to its EMF times the current.
func TestGradientsWithRespectToImpedancesAgreeWithDifferences(t *testing.T) {
	n := network(emf(1, 0, 24), ohms(1, 2, 100), ohms(2, 0, 200), ohms(2, 3, 50), ohms(3, 0, 150))
	plan, err := solver.Prepare(context.Background(), n)
	if err != nil {
		t.Fatal(err)
	}
	s, err := plan.Solve(context.Background(), lawsOf(n))
	if err != nil {
		t.Fatal(err)
	}
	gradient, err := plan.Gradient(solver.Reading{Quantity: solver.NodeVoltage, From: 3})
	if err != nil {
		t.Fatal(err)
	}
	for b := 1; b < 5; b++ {
		step := 1e-4
		laws := lawsOf(n)
		laws[b].Alpha -= step
		above, err := plan.Fork().Solve(context.Background(), laws)
		if err != nil {
			t.Fatal(err)
		}
		want := (above.Node[3] - s.Node[3]) / step
		if got := gradient[b] * s.Current[b]; abs(got-want) > 1e-5*abs(want) {
			t.Errorf("branch %d: %g V/Ω, want %g", b, got, want)
		}
	}
}

func TestEverySingleFaultFollowsFromTheHealthySolution(t *testing.T) {
	random := rand.New(rand.NewPCG(51, 2))
	mix := solvertest.Mix{Decades: 3, Real: 0.2, Open: 0.15, Closed: 0.15}
	direct, refused := 0, 0
	for range 20 {
		n := solvertest.Lattice(random, 3, 3, 0.9, mix.RealLaws(random))
		plan, err := solver.Prepare(context.Background(), n)
		if err != nil {
			t.Fatal(err)
		}
		healthy, err := plan.Solve(context.Background(), lawsOf(n))
		if err != nil {
			t.Fatal(err)
		}
		for b := range n.Branches {
			response, err := plan.Respond(b)
			if err != nil {
				t.Fatal(err)
			}
			for _, fault := range []solver.Law[float64]{solver.Open[float64](), solver.Impedance(0.02, 0), solver.Impedance(1e4, 0), solver.Impedance(1e-6, 0)} {
				faulty, ok := plan.WithLaw(healthy, b, fault, response)
				if !ok {
					refused++
					continue
				}
				direct++
				compareFault(t, n, faulty)
			}
		}
	}
	if direct < 3*refused {
		t.Errorf("%d faults followed directly, %d did not", direct, refused)
	}
}

// compareFault solves under the laws of the faulty solution from scratch.
func compareFault(t *testing.T, n *solver.Network[float64], faulty *solver.Solution[float64]) {
	t.Helper()
	other := *n
	other.Branches = append([]solver.Branch[float64](nil), n.Branches...)
	for b := range other.Branches {
		other.Branches[b].Law = faulty.Laws[b]
	}
	want := solve(t, &other)
	amperes, volts := 0.0, 0.0
	for b := range want.Current {
		amperes, volts = max(amperes, abs(want.Current[b])), max(volts, abs(want.Voltage[b]))
	}
	for b := range want.Current {
		if abs(want.Current[b]-faulty.Current[b]) > 1e-7*amperes || abs(want.Voltage[b]-faulty.Voltage[b]) > 1e-7*volts {
			t.Errorf("branch %d: %g A and %g V, want %g A and %g V", b, faulty.Current[b], faulty.Voltage[b], want.Current[b], want.Voltage[b])
		}
		if want.FloatingBranch[b] != faulty.FloatingBranch[b] {
			t.Errorf("branch %d: floating %v, want %v", b, faulty.FloatingBranch[b], want.FloatingBranch[b])
		}
	}
}

func TestThereIsNoResponseWithoutASolution(t *testing.T) {
	n := network(emf(1, 0, 24), ohms(1, 0, 10))
	plan, err := solver.Prepare(context.Background(), n)
	if err != nil {
		t.Fatal(err)
	}
	if _, err := plan.Respond(0); err == nil {
		t.Error("a response before any solution")
	}
	if _, err := plan.Gradient(solver.Reading{}); err == nil {
		t.Error("a gradient before any solution")
	}
	if _, ok := plan.WithLaw(&solver.Solution[float64]{}, 0, solver.Open[float64](), nil); ok {
		t.Error("a changed solution before any solution")
	}
}
