package solver_test

import (
	"context"
	"math/rand/v2"
	"testing"

	"loopwright/solver"
	"loopwright/solver/solvertest"
)

// control is what a control circuit is made of: mostly loads and wires, many contacts.
func control() solvertest.Mix {
	return solvertest.Mix{Decades: 6, Real: 0.05, Open: 0.15, Closed: 0.3}
}

func benchmarkNetwork[T solver.Scalar](b *testing.B, n *solver.Network[T]) {
	ctx := context.Background()
	solution, err := solver.Solve(ctx, n)
	if err != nil {
		b.Fatal(err)
	}
	if !solution.Audit.Passed {
		b.Fatalf("audit not passed: %+v", solution.Audit)
	}
	laws := make([]solver.Law[T], len(n.Branches))
	for k := range laws {
		laws[k] = n.Branches[k].Law
	}
	plan, err := solver.Prepare(ctx, n)
	if err != nil {
		b.Fatal(err)
	}
	b.Run("from scratch", func(b *testing.B) {
		for b.Loop() {
			if _, err := solver.Solve(ctx, n); err != nil {
				b.Fatal(err)
			}
		}
	})
	b.Run("planned", func(b *testing.B) {
		for b.Loop() {
			if _, err := plan.Solve(ctx, laws); err != nil {
				b.Fatal(err)
			}
		}
	})
	b.Run("planned, not audited", func(b *testing.B) {
		for b.Loop() {
			if _, err := plan.SolveUnaudited(ctx, laws); err != nil {
				b.Fatal(err)
			}
		}
	})
}

func BenchmarkSolveTenMeshes(b *testing.B) {
	benchmarkNetwork(b, solvertest.Ladder(10, control().RealLaws(rand.New(rand.NewPCG(7, 1)))))
}

func BenchmarkSolveTenMeshesComplex(b *testing.B) {
	benchmarkNetwork(b, solvertest.Ladder(10, control().ComplexLaws(rand.New(rand.NewPCG(7, 1)))))
}

func BenchmarkSolveHundredMeshes(b *testing.B) {
	random := rand.New(rand.NewPCG(7, 2))
	benchmarkNetwork(b, solvertest.Lattice(random, 10, 10, 1, control().RealLaws(random)))
}

func BenchmarkSolveGrid100(b *testing.B) {
	random := rand.New(rand.NewPCG(7, 3))
	benchmarkNetwork(b, solvertest.Lattice(random, 100, 100, 1, solvertest.Mix{Real: 0.001}.RealLaws(random)))
}
