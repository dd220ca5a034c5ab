package solver_test

import (
	"context"
	"fmt"
	"math/cmplx"
	"math/rand/v2"
	"strings"
	"testing"

	"gonum.org/v1/gonum/mat"

	"loopwright/solver"
	"loopwright/solver/solvertest"
)

// write renders an equation with numbers, with branches and meshes by their index.
func write(e solver.Equation[float64]) string {
	var text strings.Builder
	for _, term := range e.Terms {
		fmt.Fprintf(&text, "%+g", term.Value)
		if term.Kind == solver.Voltage {
			fmt.Fprintf(&text, "·u%d", term.Of)
		}
		if len(term.Meshes) > 0 {
			text.WriteString("·(")
			for k, m := range term.Meshes {
				sign := "+"
				if m.Sign < 0 {
					sign = "-"
				}
				if k > 0 || m.Sign < 0 {
					text.WriteString(sign)
				}
				fmt.Fprintf(&text, "i%d", m.Mesh+1)
			}
			text.WriteString(")")
		}
	}
	fmt.Fprintf(&text, " = %g", e.Right)
	return text.String()
}

func checkEquations(t *testing.T, n *solver.Network[float64], want ...string) {
	t.Helper()
	s := solve(t, n)
	equations := solver.Equations(n, s)
	if len(equations) != len(want) {
		t.Errorf("%d equations, want %d", len(equations), len(want))
	}
	for k, e := range equations {
		if k < len(want) && write(e) != want[k] {
			t.Errorf("equation %d: %s, want %s", k, write(e), want[k])
		}
	}
}

// loop gives a mesh through branches counted from 1, negative where it runs from their To to their From.
func loop(branches ...int) solver.Mesh {
	mesh := solver.Mesh{}
	for _, b := range branches {
		if b > 0 {
			mesh.Path = append(mesh.Path, solver.Step{Branch: b - 1, Sense: 1})
		} else {
			mesh.Path = append(mesh.Path, solver.Step{Branch: -b - 1, Sense: -1})
		}
	}
	return mesh
}

func TestSourcesComeFirstAndDropsFollowThePath(t *testing.T) {
	n := network(
		solver.Branch[float64]{From: 1, To: 0, Law: solver.Impedance(0.05, 24)},
		ohms(1, 2, 4), ohms(2, 0, 6), ohms(2, 3, 8), emf(3, 0, 5))
	n.Meshes = []solver.Mesh{loop(-1, 2, 3), loop(-3, 4, 5)}
	checkEquations(t, n,
		"-24+0.05·(i1)+4·(i1)+6·(i1-i2) = 0",
		"+5+6·(-i1+i2)+8·(i2) = 0")
}

// C. K. Alexander and M. N. O. Sadiku, Fundamentals of Electric Circuits, Example 3.7 (Fig. 3.24): the supermesh of meshes 1,
// 2 and 3 and the two constraints, as the book sets them up (from memory; the currents are checked against the stored
// example in TestPublishedExamplesGiveThePublishedDigits).
func TestTwoOverlappingSupermeshesBecomeOneEquation(t *testing.T) {
	cccs := func(from, to, of int, gain float64) part {
		return part{From: from, To: to, Law: solver.Law[float64]{Alpha: 1, Terms: []solver.Term[float64]{{Branch: of, Alpha: -gain}}}}
	}
	// R2a, I5, R6, F1, R4, R8, R2b, V10 between n1 = 1, n2 = 2, n3 = 3, n4 = 4 and 0
	n := network(ohms(1, 2, 2), drive(1, 2, 5), ohms(0, 1, 6), cccs(2, 0, 6, 3), ohms(2, 3, 4), ohms(3, 0, 8), ohms(4, 3, 2), emf(4, 0, 10))
	n.Meshes = []solver.Mesh{loop(1, -2), loop(3, 2, 4), loop(-4, 5, 6), loop(-6, -7, 8)}
	checkEquations(t, n,
		"+2·(i1)+4·(i3)+8·(i3-i4)+6·(i2) = 0",
		"+10+8·(-i3+i4)+2·(i4) = 0",
		"+1·(i1-i2) = -5",
		"+1·(i2-i3)-3·(-i4) = 0")
	s := solve(t, n)
	for m, want := range []float64{-7.5, -2.5, 3.9285714285714284, 2.142857142857143} {
		if !near(s.Mesh[m], want) {
			t.Errorf("i%d = %g, want %g", m+1, s.Mesh[m], want)
		}
	}
}

func TestAMeshWhoseCurrentASourceSetsHasOnlyItsConstraint(t *testing.T) {
	n := network(emf(1, 0, 10), ohms(1, 2, 4), ohms(2, 0, 6), ohms(2, 3, 3), drive(0, 3, 5))
	n.Meshes = []solver.Mesh{loop(-1, 2, 3), loop(-3, 4, -5)}
	checkEquations(t, n,
		"-10+4·(i1)+6·(i1-i2) = 0",
		"+1·(i2) = -5")
}

func TestControllingVoltagesAreDefined(t *testing.T) {
	n := network(emf(1, 0, 12), ohms(1, 2, 2), ohms(2, 0, 4), vcvs(3, 2, 2, 2), ohms(3, 0, 10))
	n.Meshes = []solver.Mesh{loop(-1, 2, 3), loop(-3, -4, 5)}
	checkEquations(t, n,
		"-12+2·(i1)+4·(i1-i2) = 0",
		"+4·(-i1+i2)-2·u2+10·(i2) = 0",
		"+1·u2-4·(i1-i2) = 0")
}

func TestEquationsOfRandomNetworksHoldAndDetermineTheMeshCurrents(t *testing.T) {
	random := rand.New(rand.NewPCG(41, 1))
	mix := solvertest.Mix{Decades: 2, Ideal: 0.05, Real: 0.1, Currents: 0.05, Open: 0.2, Closed: 0.1}
	solved := 0
	for trial := range 1000 {
		n := solvertest.Lattice(random, 1+random.IntN(4), 1+random.IntN(4), 0.8, mix.RealLaws(random))
		if trial%2 == 0 {
			n = solvertest.Multigraph(random, 2+random.IntN(6), 1+random.IntN(12), mix.RealLaws(random))
		}
		s := solveOrProblem(t, n)
		if s == nil || len(n.Meshes) == 0 {
			continue
		}
		solved++
		equations := solver.Equations(n, s)
		left := mat.NewDense(len(equations)+1, len(n.Meshes), nil)
		for row, e := range equations {
			if gap := e.Value(s); abs(gap) > 1e-9*(1+abs(e.Right)) {
				t.Errorf("trial %d: %s is missed by %g", trial, write(e), gap)
			}
			addCoefficients(t, left, row, e)
		}
		var decomposition mat.SVD
		decomposition.Factorize(left, mat.SVDNone)
		if rank := decomposition.Rank(1e-12); rank != len(n.Meshes) {
			t.Errorf("trial %d: the equations have rank %d, for %d mesh currents", trial, rank, len(n.Meshes))
		}
	}
	if solved < 400 {
		t.Errorf("only %d networks have a solution: the test asks for too little", solved)
	}
}

func addCoefficients(t *testing.T, left *mat.Dense, row int, e solver.Equation[float64]) {
	t.Helper()
	for _, term := range e.Terms {
		if term.Kind == solver.Voltage {
			t.Errorf("%s shows an unknown voltage", write(e))
		}
		for _, m := range term.Meshes {
			left.Set(row, m.Mesh, left.At(row, m.Mesh)+term.Value*float64(m.Sign))
		}
	}
	largest := mat.Norm(left.RowView(row), 2)
	for m := range left.RawMatrix().Cols {
		left.Set(row, m, left.At(row, m)/largest)
	}
}

func TestEquationsOfPhasorsHold(t *testing.T) {
	random := rand.New(rand.NewPCG(41, 2))
	mix := solvertest.Mix{Decades: 2, Real: 0.2, Currents: 0.03, Open: 0.2}
	for range 200 {
		n := solvertest.Lattice(random, 3, 3, 0.9, mix.ComplexLaws(random))
		s := solveOrProblem(t, n)
		if s == nil {
			continue
		}
		for _, e := range solver.Equations(n, s) {
			if gap := e.Value(s); cmplx.Abs(gap) > 1e-10 {
				t.Errorf("equation of %v is missed by %v", e.Of, gap)
			}
		}
	}
}

func TestASupermeshOfManyMeshesRunsAroundAllOfThem(t *testing.T) {
	n := solvertest.Lattice(rand.New(rand.NewPCG(41, 3)), 40, 1, 1, func() solver.Law[float64] { return solver.Impedance(1.0, 0) })
	n.Branches[0].Law = solver.Impedance(1, 24.0)
	for b, branch := range n.Branches {
		if distance := branch.From - branch.To; (distance == 41 || distance == -41) && branch.From%41 > 0 && branch.From%41 < 40 {
			n.Branches[b].Law = solver.Open[float64]()
		}
	}
	s, err := solver.Solve(context.Background(), n)
	if err != nil {
		t.Fatal(err)
	}
	equations := solver.Equations(n, s)
	if first := equations[0]; len(first.Of) != 40 || len(first.Terms) != 83 || len(equations) != 40 {
		t.Errorf("%d equations; the first of %d meshes with %d terms", len(equations), len(first.Of), len(first.Terms))
	}
}
