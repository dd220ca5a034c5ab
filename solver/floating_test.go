package solver_test

import (
	"context"
	"math/rand/v2"
	"slices"
	"testing"

	"loopwright/solver"
	"loopwright/solver/solvertest"
)

func solve(t *testing.T, n *solver.Network[float64]) *solver.Solution[float64] {
	t.Helper()
	solution, err := solver.Solve(context.Background(), n)
	if err != nil {
		t.Fatal(err)
	}
	solvertest.Check(t, n, solution)
	return solution
}

func TestWhatLiesBetweenTwoOpenContactsFloats(t *testing.T) {
	s := solve(t, network(emf(1, 0, 24), open(1, 2), open(2, 3), ohms(3, 0, 100)))
	if want := []bool{false, false, true, false}; !slices.Equal(s.FloatingNode, want) {
		t.Errorf("floating nodes %v, want %v", s.FloatingNode, want)
	}
	if want := []bool{false, true, true, false}; !slices.Equal(s.FloatingBranch, want) {
		t.Errorf("floating branches %v, want %v", s.FloatingBranch, want)
	}
}

func TestOneOpenContactCarriesTheWholeVoltage(t *testing.T) {
	s := solve(t, network(emf(1, 0, 24), open(1, 2), ohms(2, 0, 100)))
	if s.FloatingBranch[1] || s.Voltage[1] != 24 || s.Current[1] != 0 {
		t.Errorf("the contact has %g V, floating %v", s.Voltage[1], s.FloatingBranch[1])
	}
}

func TestLeakageHoldsTheMiddleOfTwoContacts(t *testing.T) {
	leak := solver.Branch[float64]{From: 1, To: 2, Law: solver.Conductance(1e-6, 0)}
	s := solve(t, network(emf(1, 0, 24), leak, open(2, 3), ohms(3, 0, 100)))
	if slices.Contains(s.FloatingNode, true) || s.Node[2] != 24 || s.Voltage[2] != 24 {
		t.Errorf("nodes %v, floating %v", s.Node, s.FloatingNode)
	}
}

func TestABatteryWithOpenContactsOnBothSidesKeepsItsVoltage(t *testing.T) {
	s := solve(t, network(ohms(0, 4, 10), open(0, 1), emf(1, 2, 9), open(2, 3), ohms(3, 0, 5), ohms(1, 2, 90)))
	if !s.FloatingNode[1] || !s.FloatingNode[2] || s.FloatingBranch[2] {
		t.Errorf("floating nodes %v, branches %v", s.FloatingNode, s.FloatingBranch)
	}
	if s.Voltage[2] != 9 || s.Current[5] != 0.1 {
		t.Errorf("the battery has %g V and gives %g A", s.Voltage[2], s.Current[5])
	}
}

func TestASeparateCircuitFloatsAsAWhole(t *testing.T) {
	s := solve(t, network(emf(1, 0, 24), ohms(1, 0, 10), emf(3, 2, 5), ohms(3, 2, 10)))
	if want := []bool{false, false, true, true}; !slices.Equal(s.FloatingNode, want) {
		t.Errorf("floating nodes %v, want %v", s.FloatingNode, want)
	}
	if s.Current[3] != 0.5 || s.Piece[2] != s.Piece[3] || s.Piece[2] == s.Piece[0] {
		t.Errorf("it carries %g A, pieces %v", s.Current[3], s.Piece)
	}
}

func TestWithoutReferenceEveryNodeFloatsAndEveryBranchIsSolved(t *testing.T) {
	n := network(emf(1, 0, 24), ohms(1, 0, 10))
	n.Reference = -1
	s := solve(t, n)
	if slices.Contains(s.FloatingNode, false) || s.Current[1] != 2.4 {
		t.Errorf("floating nodes %v, %g A", s.FloatingNode, s.Current[1])
	}
}

func TestACurrentSourceOfZeroIsAnOpenContact(t *testing.T) {
	s := solve(t, network(emf(1, 0, 24), drive(1, 2, 0), drive(2, 0, 0), ohms(1, 0, 10)))
	if !s.FloatingNode[2] || !s.FloatingBranch[1] || !s.FloatingBranch[2] {
		t.Errorf("floating nodes %v, branches %v", s.FloatingNode, s.FloatingBranch)
	}
}

func TestABridgeCarriesNoCurrentAndPassesItsVoltageOn(t *testing.T) {
	s := solve(t, network(emf(1, 0, 24), ohms(1, 0, 10), emf(2, 1, 6), ohms(2, 3, 1e9)))
	if s.Current[2] != 0 || s.Current[3] != 0 || s.Node[2] != 30 || s.Node[3] != 30 {
		t.Errorf("currents %v, nodes %v", s.Current, s.Node)
	}
}

func TestMeshesFuseWhenTheContactBetweenThemOpens(t *testing.T) {
	n := network(emf(1, 0, 24), ohms(1, 2, 10), ohms(2, 0, 10), open(2, 3), ohms(3, 0, 10), ohms(2, 4, 1), ohms(4, 0, 1))
	n.Branches[3] = open(2, 0)
	n.Branches[4] = ohms(2, 3, 10)
	n.Branches[5] = ohms(3, 0, 10)
	n.Branches = n.Branches[:6]
	n.Nodes = 4
	n.Meshes = []solver.Mesh{
		{Name: "m1", Path: []solver.Step{{Branch: 0, Sense: -1}, {Branch: 1, Sense: 1}, {Branch: 2, Sense: 1}}},
		{Name: "m2", Path: []solver.Step{{Branch: 2, Sense: -1}, {Branch: 3, Sense: 1}}},
		{Name: "m3", Path: []solver.Step{{Branch: 3, Sense: -1}, {Branch: 4, Sense: 1}, {Branch: 5, Sense: 1}}},
	}
	s := solve(t, n)
	if len(s.Supermeshes) != 1 || !slices.Equal(s.Supermeshes[0].Meshes, []int{1, 2}) || !slices.Equal(s.Supermeshes[0].Through, []int{3}) {
		t.Errorf("supermeshes %v", s.Supermeshes)
	}
}

// Every pattern of up to eight switches in a row of circuits: with one plan, and from scratch.
func TestEveryPatternOfEightSwitchesIsSolved(t *testing.T) {
	random := rand.New(rand.NewPCG(21, 1))
	mix := solvertest.Mix{Decades: 5, Real: 0.1, Row: 0.1}
	for range 6 {
		n := solvertest.Lattice(random, 3, 3, 0.9, mix.RealLaws(random))
		n.Branches[0].Law = solver.Impedance(0.05, 24)
		switches := random.Perm(len(n.Branches))[:8]
		for _, b := range switches {
			n.Branches[b].Law.Row = true
		}
		plan, err := solver.Prepare(context.Background(), n)
		if err != nil {
			t.Fatal(err)
		}
		for pattern := range 1 << len(switches) {
			laws := lawsOf(n)
			for k, b := range switches {
				laws[b] = solver.Impedance(0.02, 0)
				laws[b].Row = true
				if pattern>>k&1 == 1 {
					laws[b] = solver.Open[float64]()
				}
			}
			solution, err := plan.Solve(context.Background(), laws)
			if err != nil {
				t.Fatalf("pattern %08b: %v", pattern, err)
			}
			if pattern%16 == 0 {
				solvertest.Check(t, n, solution)
			}
			compareWithFresh(t, n, laws, solution)
		}
	}
}

// compareWithFresh solves the network from scratch and compares every value.
func compareWithFresh(t *testing.T, n *solver.Network[float64], laws []solver.Law[float64], solution *solver.Solution[float64]) {
	t.Helper()
	fresh := *n
	fresh.Branches = slices.Clone(n.Branches)
	for b := range laws {
		fresh.Branches[b].Law = laws[b]
	}
	want, err := solver.Solve(context.Background(), &fresh)
	if err != nil {
		t.Fatal(err)
	}
	if !solution.Audit.Passed || !want.Audit.Passed {
		t.Errorf("audits %+v and %+v", solution.Audit, want.Audit)
	}
	for b := range laws {
		if !near(solution.Current[b], want.Current[b]) || !near(solution.Voltage[b], want.Voltage[b]) ||
			solution.FloatingBranch[b] != want.FloatingBranch[b] {
			t.Errorf("branch %d: %g A and %g V planned, %g A and %g V from scratch", b,
				solution.Current[b], solution.Voltage[b], want.Current[b], want.Voltage[b])
		}
	}
}

// near reports whether two values agree but for the last digits.
func near(a, b float64) bool { return abs(a-b) <= 1e-14*max(abs(a), abs(b))+1e-20 }
