package sparse_test

import (
	"context"
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	"loopwright/solver/sparse"
	"loopwright/solver/wide"
)

// matrixOf gives the sparse matrix of dense rows; zeros are left out unless they are negative.
func matrixOf(rows ...[]float64) *sparse.Matrix[float64] {
	var i, j []int
	var values []float64
	for row := range rows {
		for column, value := range rows[row] {
			if value != 0 || math.Signbit(value) {
				i, j, values = append(i, row), append(j, column), append(values, value)
			}
		}
	}
	pattern, slot := sparse.NewPattern(len(rows), i, j)
	a := sparse.NewMatrix[float64](pattern)
	for k, s := range slot {
		a.Value[s] += values[k]
	}
	return a
}

func newLU(t testing.TB, a *sparse.Matrix[float64]) *sparse.LU[float64] {
	t.Helper()
	symbolic, err := sparse.Analyze(context.Background(), a.Pattern, nil)
	if err != nil {
		t.Fatal(err)
	}
	return sparse.NewLU[float64](symbolic)
}

func TestPatternsSortTheirPlacesAndMergeRepeatedOnes(t *testing.T) {
	rows, columns := []int{2, 0, 2, 1, 2, 0}, []int{1, 2, 0, 1, 1, 2}
	pattern, slot := sparse.NewPattern(3, rows, columns)
	a := sparse.NewMatrix[float64](pattern)
	for k, s := range slot {
		a.Value[s] += float64(k + 1)
	}
	want := [][]float64{{0, 0, 8}, {0, 4, 0}, {3, 6, 0}}
	for i := range 3 {
		for j := range 3 {
			got := dense(a).At(i, j)
			if got != want[i][j] {
				t.Errorf("entry (%d, %d) is %g, want %g", i, j, got, want[i][j])
			}
		}
	}
	if pattern.Entries() != 4 || a.Transpose().Entries() != 4 || a.Transpose().Row[0] != 2 {
		t.Errorf("pattern %+v, transposed %+v", pattern, a.Transpose())
	}
}

func TestRefactorGivesTheSameAsFactor(t *testing.T) {
	random := rand.New(rand.NewPCG(5, 1))
	for range 200 {
		n := 1 + random.IntN(80)
		a := randomMatrix(random, n, 3, func() float64 { return 1 + random.Float64() })
		lu := newLU(t, a)
		if err := lu.Factor(context.Background(), a, 0.1); err != nil {
			continue
		}
		for p := range a.Value {
			a.Value[p] *= 1 + random.Float64()/4
		}
		if !lu.Refactor(a) {
			continue
		}
		b, again := make([]float64, n), make([]wide.Number[float64], n)
		for i := range b {
			b[i] = random.NormFloat64()
		}
		fresh := newLU(t, a)
		if err := fresh.Factor(context.Background(), a, 1); err != nil {
			t.Fatal(err)
		}
		want := make([]wide.Number[float64], n)
		if !fresh.SolveRefined(a, want, b).Converged || !lu.SolveRefined(a, again, b).Converged {
			continue
		}
		for i := range want {
			if math.Abs(again[i].Value-want[i].Value) > 1e-15*math.Abs(want[i].Value) {
				t.Errorf("n = %d: x[%d] = %g, want %g", n, i, again[i].Value, want[i].Value)
			}
		}
	}
}

func TestRefactorAllocatesNothing(t *testing.T) {
	a := grid(12)
	lu := newLU(t, a)
	if err := lu.Factor(context.Background(), a, sparse.Lenient); err != nil {
		t.Fatal(err)
	}
	x := make([]float64, a.N)
	allocations := testing.AllocsPerRun(20, func() {
		if !lu.Refactor(a) {
			t.Fatal("the pivots do not fit")
		}
		lu.Solve(x, x)
	})
	if allocations != 0 {
		t.Errorf("%g allocations", allocations)
	}
}

func TestRefactorRefusesPivotsThatHaveBecomeTooSmall(t *testing.T) {
	zero := math.Copysign(0, -1)
	for _, pivot := range []float64{0, 1e-30, math.NaN()} {
		a := matrixOf([]float64{4, 1}, []float64{1, zero})
		lu := newLU(t, a)
		if lu.Refactor(a) {
			t.Error("there were no pivots to take over")
		}
		if err := lu.Factor(context.Background(), a, sparse.Lenient); err != nil {
			t.Fatal(err)
		}
		a.Value[0] = pivot
		if lu.Refactor(a) {
			t.Errorf("%g is accepted as a pivot", pivot)
		}
	}
}

func TestSolveSystemChoosesNewPivotsWhenTheOldOnesFail(t *testing.T) {
	zero := math.Copysign(0, -1)
	a := matrixOf([]float64{1, 1, zero}, []float64{1, zero, 1}, []float64{zero, 1, 1})
	lu := newLU(t, a)
	random := rand.New(rand.NewPCG(5, 2))
	for range 200 {
		for p := range a.Value {
			a.Value[p] = math.Pow(10, float64(random.IntN(30)-15)) * float64(random.IntN(3))
		}
		b, x := []float64{1, 2, 3}, make([]wide.Number[float64], 3)
		solved, err := lu.SolveSystem(context.Background(), a, func() sparse.Refinement { return lu.SolveRefined(a, x, b) })
		if err != nil {
			t.Fatal(err)
		}
		singular := determinant(a) == 0
		if solved == singular {
			t.Errorf("solved %v, but the determinant of %v is %g", solved, a.Value, determinant(a))
		}
		if solved && a.BackwardError([]float64{x[0].Value, x[1].Value, x[2].Value}, b) > 1e-15 {
			t.Errorf("the solution %v of %v is wrong", x, a.Value)
		}
	}
}

// determinant is that of a 3×3 matrix by the rule of Sarrus; with the values above its terms do not cancel.
func determinant(a *sparse.Matrix[float64]) float64 {
	d := dense(a)
	at := d.At
	return at(0, 0)*at(1, 1)*at(2, 2) + at(0, 1)*at(1, 2)*at(2, 0) + at(0, 2)*at(1, 0)*at(2, 1) -
		at(0, 2)*at(1, 1)*at(2, 0) - at(0, 1)*at(1, 0)*at(2, 2) - at(0, 0)*at(1, 2)*at(2, 1)
}

func TestSingularMatricesAreToldAndTheirNullVectorsFound(t *testing.T) {
	third := 1.0 / 3
	tests := []struct {
		name string
		a    *sparse.Matrix[float64]
	}{
		{"an empty column", matrixOf([]float64{1, 0, 2}, []float64{3, 0, 4}, []float64{5, 0, 7})},
		{"equal columns", matrixOf([]float64{1, 1, 2}, []float64{3, 3, 4}, []float64{5, 5, 7})},
		{"a sum of columns, but for rounding", matrixOf([]float64{third, 0.1, third + 0.1}, []float64{0.7, third, third + 0.7}, []float64{0.1, 0.2, 0.30000000000000004})},
	}
	for _, test := range tests {
		lu := newLU(t, test.a)
		x := make([]wide.Number[float64], 3)
		b := []float64{1, 0, 0}
		solved, err := lu.SolveSystem(context.Background(), test.a, func() sparse.Refinement { return lu.SolveRefined(test.a, x, b) })
		if err != nil || solved {
			t.Errorf("%s: solved %v, error %v", test.name, solved, err)
		}
		z := lu.NullVector()
		left := make([]float64, 3)
		test.a.Multiply(left, z)
		size := math.Abs(z[0]) + math.Abs(z[1]) + math.Abs(z[2])
		if size == 0 || math.Abs(left[0])+math.Abs(left[1])+math.Abs(left[2]) > 1e-14*size {
			t.Errorf("%s: A·%v = %v", test.name, z, left)
		}
	}
}

func TestAColumnWithoutPivotIsASingularError(t *testing.T) {
	a := matrixOf([]float64{1, 1}, []float64{1, 1})
	var singular *sparse.Singular
	if err := newLU(t, a).Factor(context.Background(), a, sparse.Strict); !errors.As(err, &singular) || singular.Rank != 1 {
		t.Errorf("the error is %v", err)
	}
}

func TestEmptySystemsAreSolved(t *testing.T) {
	pattern, _ := sparse.NewPattern(0, nil, nil)
	a := sparse.NewMatrix[float64](pattern)
	lu := newLU(t, a)
	solved, err := lu.SolveSystem(context.Background(), a, func() sparse.Refinement { return lu.SolveRefined(a, nil, nil) })
	if !solved || err != nil {
		t.Errorf("solved %v, error %v", solved, err)
	}
}

func TestEquilibrateScalesRowsByPowersOfTwo(t *testing.T) {
	a := matrixOf([]float64{3e-200, 1e-200}, []float64{0, 5e100})
	before := append([]float64(nil), a.Value...)
	scale := make([]float64, 2)
	a.Equilibrate(scale)
	for p, value := range a.Value {
		factor := scale[a.Row[p]]
		if fraction, _ := math.Frexp(factor); fraction != 0.5 || value != before[p]*factor {
			t.Errorf("entry %d: %g times %g is not %g", p, before[p], factor, value)
		}
	}
	if largest := math.Abs(a.Value[0]); largest < 1 || largest >= 2 {
		t.Errorf("the largest entry of row 0 is %g", largest)
	}
}

func TestAnEndedContextStopsOrderingAndFactorisation(t *testing.T) {
	a := grid(12)
	ended, end := context.WithCancel(context.Background())
	end()
	if _, err := sparse.Analyze(ended, a.Pattern, nil); !errors.Is(err, context.Canceled) {
		t.Errorf("Analyze gives %v", err)
	}
	if _, err := sparse.AnalyzeColumns(ended, a.Pattern); !errors.Is(err, context.Canceled) {
		t.Errorf("AnalyzeColumns gives %v", err)
	}
	if err := newLU(t, a).Factor(ended, a, sparse.Lenient); !errors.Is(err, context.Canceled) {
		t.Errorf("Factor gives %v", err)
	}
}

func TestWrongLengthsPanic(t *testing.T) {
	a := grid(3)
	lu := newLU(t, a)
	if err := lu.Factor(context.Background(), a, sparse.Lenient); err != nil {
		t.Fatal(err)
	}
	short := make([]float64, 2)
	calls := map[string]func(){
		"NewPattern":      func() { sparse.NewPattern(2, []int{0}, nil) },
		"Analyze":         func() { _, _ = sparse.Analyze(context.Background(), a.Pattern, make([]bool, 2)) },
		"Factor":          func() { _ = lu.Factor(context.Background(), grid(2), sparse.Lenient) },
		"Refactor":        func() { lu.Refactor(grid(2)) },
		"Solve":           func() { lu.Solve(short, short) },
		"SolveTransposed": func() { lu.SolveTransposed(short, short) },
		"Multiply":        func() { a.Multiply(short, short) },
		"BackwardError":   func() { a.BackwardError(short, short) },
		"Equilibrate":     func() { a.Equilibrate(short) },
		"without factors": func() { newLU(t, a).Solve(make([]float64, a.N), make([]float64, a.N)) },
	}
	for name, call := range calls {
		func() {
			defer func() {
				if recover() == nil {
					t.Errorf("%s does not panic", name)
				}
			}()
			call()
		}()
	}
}
