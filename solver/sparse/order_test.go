package sparse_test

import (
	"context"
	"math/rand/v2"
	"testing"

	"loopwright/solver/sparse"
)

func fillOf(t *testing.T, a *sparse.Matrix[float64], symbolic *sparse.Symbolic) int {
	t.Helper()
	lu := sparse.NewLU[float64](symbolic)
	if err := lu.Factor(context.Background(), a, sparse.Lenient); err != nil {
		t.Fatal(err)
	}
	return lu.Fill()
}

// Nested dissection, which is optimal, leaves a grid of n nodes with about 31·n·log2(n)/4 entries in both factors (George,
// "Nested dissection of a regular finite element mesh", SIAM Journal on Numerical Analysis 10, 1973; constant from memory).
func TestOrderingKeepsAGridSparse(t *testing.T) {
	a := grid(50)
	natural := make([]int, a.N)
	for k := range natural {
		natural[k] = k
	}
	banded := fillOf(t, a, &sparse.Symbolic{Pattern: a.Pattern, Order: natural})
	for _, order := range analyses() {
		symbolic, err := order.analyze(context.Background(), a.Pattern)
		if err != nil {
			t.Fatal(err)
		}
		if fill := fillOf(t, a, symbolic); fill > banded/2 || fill > 31*2500*12/4 {
			t.Errorf("%s: %d entries, in natural order %d", order.name, fill, banded)
		}
	}
}

func TestAnArrowIsEliminatedFromItsPoints(t *testing.T) {
	for _, n := range []int{30, 500} {
		rows, columns := []int{0}, []int{0}
		for k := 1; k < n; k++ {
			rows, columns = append(rows, 0, k, k), append(columns, k, 0, k)
		}
		pattern, _ := sparse.NewPattern(n, rows, columns)
		a := sparse.NewMatrix[float64](pattern)
		for p := range a.Value {
			a.Value[p] = 1
		}
		a.Value[0] = float64(2 * n)
		for _, order := range analyses() {
			symbolic, err := order.analyze(context.Background(), pattern)
			if err != nil {
				t.Fatal(err)
			}
			if fill := fillOf(t, a, symbolic); order.name == "symmetric" && fill != pattern.Entries() {
				t.Errorf("n = %d, %s: %d entries, want %d", n, order.name, fill, pattern.Entries())
			}
		}
	}
}

// saddle is the matrix of a chain of 1 Ω meshes with an open branch in each: [R S; Sᵀ 0].
func saddle(meshes int) (*sparse.Matrix[float64], []bool) {
	var rows, columns []int
	var values []float64
	put := func(i, j int, value float64) {
		rows, columns, values = append(rows, i), append(columns, j), append(values, value)
	}
	for m := range meshes {
		put(m, m, 3)
		if m+1 < meshes {
			put(m, m+1, -1)
			put(m+1, m, -1)
		}
		if m%2 == 0 {
			u := meshes + m/2
			put(m, u, 1)
			put(u, m, 1)
			put(u, u, 0)
		}
	}
	n := meshes + (meshes+1)/2
	pattern, slot := sparse.NewPattern(n, rows, columns)
	a := sparse.NewMatrix[float64](pattern)
	for k, s := range slot {
		a.Value[s] += values[k]
	}
	waiting := make([]bool, n)
	for k := meshes; k < n; k++ {
		waiting[k] = true
	}
	return a, waiting
}

func TestWaitingColumnsComeAfterANeighbour(t *testing.T) {
	for _, meshes := range []int{2, 5, 40, 60, 400} {
		a, waiting := saddle(meshes)
		symbolic, err := sparse.Analyze(context.Background(), a.Pattern, waiting)
		if err != nil {
			t.Fatal(err)
		}
		position := make([]int, a.N)
		for k, column := range symbolic.Order {
			position[column] = k
		}
		for u := meshes; u < a.N; u++ {
			if m := 2 * (u - meshes); position[u] < position[m] {
				t.Errorf("%d meshes: the constraint of mesh %d is eliminated before it", meshes, m)
			}
		}
		if fill := fillOf(t, a, symbolic); fill > 3*a.Entries() {
			t.Errorf("%d meshes: %d entries become %d", meshes, a.Entries(), fill)
		}
	}
}

func TestWhereEverythingWaitsEverythingIsOrderedAllTheSame(t *testing.T) {
	random := rand.New(rand.NewPCG(6, 1))
	for _, n := range []int{1, 10, 64, 65, 300} {
		a := randomMatrix(random, n, 3, random.NormFloat64)
		waiting := make([]bool, n)
		for k := range waiting {
			waiting[k] = true
		}
		symbolic, err := sparse.Analyze(context.Background(), a.Pattern, waiting)
		if err != nil {
			t.Fatal(err)
		}
		seen := make([]bool, n)
		for _, column := range symbolic.Order {
			seen[column] = true
		}
		for column, ordered := range seen {
			if !ordered {
				t.Errorf("n = %d: column %d is not ordered", n, column)
			}
		}
	}
}
