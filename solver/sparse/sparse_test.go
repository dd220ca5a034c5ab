package sparse_test

import (
	"context"
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/mat"

	"loopwright/solver/sparse"
	"loopwright/solver/wide"
)

// randomMatrix has about perColumn entries in each column beside a diagonal that is sometimes missing.
func randomMatrix[T sparse.Scalar](random *rand.Rand, n, perColumn int, value func() T) *sparse.Matrix[T] {
	var rows, columns []int
	for j := range n {
		rows, columns = append(rows, random.IntN(n), (j+1)%n), append(columns, j, j)
		for range random.IntN(perColumn + 1) {
			rows, columns = append(rows, random.IntN(n)), append(columns, j)
		}
		if random.IntN(3) > 0 {
			rows, columns = append(rows, j), append(columns, j)
		}
	}
	pattern, slot := sparse.NewPattern(n, rows, columns)
	a := sparse.NewMatrix[T](pattern)
	for _, s := range slot {
		a.Value[s] = value()
	}
	return a
}

func dense(a *sparse.Matrix[float64]) *mat.Dense {
	d := mat.NewDense(a.N, a.N, nil)
	for j := range a.N {
		for p := a.Start[j]; p < a.Start[j+1]; p++ {
			d.Set(a.Row[p], j, a.Value[p])
		}
	}
	return d
}

// embedded is the real matrix [Re −Im; Im Re] of twice the size that does what a complex one does.
func embedded(a *sparse.Matrix[complex128]) *mat.Dense {
	n := a.N
	d := mat.NewDense(2*n, 2*n, nil)
	for j := range n {
		for p := a.Start[j]; p < a.Start[j+1]; p++ {
			i, value := a.Row[p], a.Value[p]
			d.Set(i, j, real(value))
			d.Set(i+n, j+n, real(value))
			d.Set(i, j+n, -imag(value))
			d.Set(i+n, j, imag(value))
		}
	}
	return d
}

type analysis struct {
	name    string
	analyze func(context.Context, *sparse.Pattern) (*sparse.Symbolic, error)
}

func analyses() []analysis {
	return []analysis{{"symmetric", func(ctx context.Context, p *sparse.Pattern) (*sparse.Symbolic, error) {
		return sparse.Analyze(ctx, p, nil)
	}}, {"columns", sparse.AnalyzeColumns}}
}

func TestBothOrderingsArePermutations(t *testing.T) {
	random := rand.New(rand.NewPCG(4, 1))
	for _, a := range analyses() {
		for trial := range 400 {
			n := 1 + random.IntN(60)
			m := randomMatrix(random, n, random.IntN(6), random.NormFloat64)
			symbolic, err := a.analyze(context.Background(), m.Pattern)
			if err != nil {
				t.Fatal(err)
			}
			seen := make([]bool, n)
			for _, column := range symbolic.Order {
				if seen[column] {
					t.Fatalf("%s, trial %d: column %d is ordered twice", a.name, trial, column)
				}
				seen[column] = true
			}
			if len(symbolic.Order) != n {
				t.Fatalf("%s, trial %d: %d of %d columns are ordered", a.name, trial, len(symbolic.Order), n)
			}
		}
	}
}

// The oracle is the dense LU of gonum.
func TestRealSolutionsAgreeWithGonum(t *testing.T) {
	random := rand.New(rand.NewPCG(4, 2))
	for _, a := range analyses() {
		for _, n := range []int{1, 2, 3, 5, 10, 31, 32, 33, 100} {
			for range 20 {
				m := randomMatrix(random, n, 4, random.NormFloat64)
				b := make([]float64, n)
				for i := range b {
					b[i] = random.NormFloat64()
				}
				checkAgainstGonum(t, a, m, b)
			}
		}
	}
}

func checkAgainstGonum(t *testing.T, a analysis, m *sparse.Matrix[float64], b []float64) {
	t.Helper()
	n := m.N
	var oracle mat.LU
	oracle.Factorize(dense(m))
	symbolic, err := a.analyze(context.Background(), m.Pattern)
	if err != nil {
		t.Fatal(err)
	}
	lu := sparse.NewLU[float64](symbolic)
	if err := lu.Factor(context.Background(), m, 1e-3); err != nil {
		if oracle.Cond() < 1e14 {
			t.Errorf("%s, n = %d: %v, but the condition is %g", a.name, n, err, oracle.Cond())
		}
		return
	}
	if oracle.Cond() > 1e10 {
		return
	}
	for _, transposed := range []bool{false, true} {
		var want mat.VecDense
		if err := oracle.SolveVecTo(&want, transposed, mat.NewVecDense(n, b)); err != nil {
			t.Fatal(err)
		}
		x := make([]float64, n)
		if transposed {
			lu.SolveTransposed(x, b)
		} else {
			lu.Solve(x, b)
			if omega := m.BackwardError(x, b); omega > 1e-8 {
				t.Errorf("%s, n = %d: backward error %g", a.name, n, omega)
			}
		}
		for i := range x {
			if math.Abs(x[i]-want.AtVec(i)) > 1e-13*float64(n+10)*oracle.Cond()*mat.Norm(&want, 2) {
				t.Errorf("%s, n = %d, transposed %v: x[%d] = %g, want %g", a.name, n, transposed, i, x[i], want.AtVec(i))
			}
		}
	}
}

// The oracle is the dense LU of gonum on the real embedding of twice the size.
func TestComplexSolutionsAgreeWithGonum(t *testing.T) {
	random := rand.New(rand.NewPCG(4, 3))
	value := func() complex128 { return complex(random.NormFloat64(), random.NormFloat64()) }
	for _, n := range []int{1, 2, 3, 10, 40} {
		for range 30 {
			m := randomMatrix(random, n, 3, value)
			b := make([]complex128, n)
			flat := make([]float64, 2*n)
			for i := range b {
				b[i] = value()
				flat[i], flat[i+n] = real(b[i]), imag(b[i])
			}
			var oracle mat.LU
			oracle.Factorize(embedded(m))
			if oracle.Cond() > 1e10 {
				continue
			}
			symbolic, err := sparse.Analyze(context.Background(), m.Pattern, nil)
			if err != nil {
				t.Fatal(err)
			}
			lu := sparse.NewLU[complex128](symbolic)
			if err := lu.Factor(context.Background(), m, 1e-3); err != nil {
				t.Fatal(err)
			}
			x := make([]wide.Number[complex128], n)
			if refinement := lu.SolveRefined(m, x, b); !refinement.Converged {
				t.Errorf("n = %d, condition %g: refinement did not converge", n, oracle.Cond())
			}
			var want mat.VecDense
			if err := oracle.SolveVecTo(&want, false, mat.NewVecDense(2*n, flat)); err != nil {
				t.Fatal(err)
			}
			for i := range x {
				gap := x[i].Value - complex(want.AtVec(i), want.AtVec(i+n))
				if math.Hypot(real(gap), imag(gap)) > 1e-15*float64(n+10)*oracle.Cond()*mat.Norm(&want, 2) {
					t.Errorf("n = %d: x[%d] is off by %g", n, i, gap)
				}
			}
		}
	}
}

// Whole numbers make right sides without rounding, so the solution is known to the last digit.
func TestRefinedSolutionsAreExactThoughTheMatrixIsIllConditioned(t *testing.T) {
	random := rand.New(rand.NewPCG(4, 4))
	hardest := 0.0
	for range 300 {
		n := 2 + random.IntN(30)
		m := randomMatrix(random, n, 3, func() float64 { return math.Trunc(math.Pow(10, 5*random.Float64())) })
		var oracle mat.LU
		oracle.Factorize(dense(m))
		if oracle.Cond() > 1e12 {
			continue
		}
		want, b := make([]float64, n), make([]float64, n)
		for i := range want {
			want[i] = float64(random.IntN(2001) - 1000)
		}
		m.Multiply(b, want)
		symbolic, err := sparse.Analyze(context.Background(), m.Pattern, nil)
		if err != nil {
			t.Fatal(err)
		}
		lu := sparse.NewLU[float64](symbolic)
		if err := lu.Factor(context.Background(), m, 1e-3); err != nil {
			t.Fatal(err)
		}
		x := make([]wide.Number[float64], n)
		if refinement := lu.SolveRefined(m, x, b); !refinement.Converged {
			t.Errorf("n = %d, condition %g: refinement did not converge", n, oracle.Cond())
		}
		hardest = max(hardest, oracle.Cond())
		for i := range x {
			if x[i].Value != want[i] && math.Abs(x[i].Value-want[i]) > 1e-20 {
				t.Errorf("n = %d, condition %g: x[%d] = %.17g, want %g", n, oracle.Cond(), i, x[i].Value, want[i])
			}
		}
	}
	if hardest < 1e9 {
		t.Errorf("the hardest matrix has the condition %g: the test asks for too little", hardest)
	}
}
