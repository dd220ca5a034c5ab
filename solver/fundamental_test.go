package solver_test

import (
	"context"
	"errors"
	"math/rand/v2"
	"reflect"
	"testing"

	"pgregory.net/rapid"

	"loopwright/solver"
	"loopwright/solver/solvertest"
)

func TestFundamentalLoopsAreABasisForEveryGraph(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		nodes := rapid.IntRange(1, 12).Draw(t, "nodes")
		node := rapid.IntRange(0, nodes-1)
		var branches []solver.Branch[float64]
		for range rapid.IntRange(1, 30).Draw(t, "branches") {
			branches = append(branches, ohms(node.Draw(t, "from"), node.Draw(t, "to"), 1))
		}
		meshes := solver.FundamentalLoops(nodes, branches)
		if again := solver.FundamentalLoops(nodes, branches); !reflect.DeepEqual(meshes, again) {
			t.Fatal("the same graph gives other loops")
		}
		// Solve checks the number of meshes and that they close, and would find them dependent.
		n := &solver.Network[float64]{Nodes: nodes, Branches: branches, Meshes: meshes}
		if _, err := solver.Solve(context.Background(), n); err != nil {
			t.Fatal(err)
		}
	})
}

func TestMeshesAreBranchesLessNodesPlusComponents(t *testing.T) {
	random := rand.New(rand.NewPCG(61, 1))
	law := func() solver.Law[float64] { return solver.Impedance(1.0, 0) }
	for range 200 {
		columns, rows := 1+random.IntN(8), 1+random.IntN(8)
		n := solvertest.Lattice(random, columns, rows, random.Float64(), law)
		if want := len(solver.FundamentalLoops(n.Nodes, n.Branches)); len(n.Meshes) != want {
			t.Errorf("%d × %d: %d faces, %d independent loops", columns, rows, len(n.Meshes), want)
		}
	}
	if n := solvertest.Lattice(random, 7, 5, 1, law); len(n.Meshes) != 35 || len(n.Branches) != 82 || n.Nodes != 48 {
		t.Errorf("a whole lattice of 7 × 5 has %d meshes, %d branches and %d nodes", len(n.Meshes), len(n.Branches), n.Nodes)
	}
}

func TestANetworkWithoutBranchesIsEmpty(t *testing.T) {
	for _, nodes := range []int{0, 1, 5} {
		_, err := solver.Solve(context.Background(), &solver.Network[complex128]{Nodes: nodes})
		var problem *solver.Problem
		if !errors.As(err, &problem) || problem.Code != solver.Empty {
			t.Errorf("%d nodes: the error is %v", nodes, err)
		}
	}
}

// The solution must not depend on which basis of meshes it is found with.
func TestEveryBasisOfMeshesGivesTheSameSolution(t *testing.T) {
	random := rand.New(rand.NewPCG(61, 2))
	for range 50 {
		n := solvertest.Lattice(random, 4, 4, 0.9, everyday().RealLaws(random))
		faces := solveOrProblem(t, n)
		loops := *n
		loops.Meshes = solver.FundamentalLoops(n.Nodes, n.Branches)
		other := solveOrProblem(t, &loops)
		if (faces == nil) != (other == nil) {
			t.Fatal("one basis has a solution, the other has none")
		}
		if faces == nil {
			continue
		}
		for b := range n.Branches {
			if !near(faces.Current[b], other.Current[b]) || !near(faces.Voltage[b], other.Voltage[b]) {
				t.Errorf("branch %d: %g A and %g V by faces, %g A and %g V by loops", b,
					faces.Current[b], faces.Voltage[b], other.Current[b], other.Voltage[b])
			}
		}
	}
}
