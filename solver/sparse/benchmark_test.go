package sparse_test

import (
	"context"
	"fmt"
	"testing"

	"gonum.org/v1/gonum/mat"

	"loopwright/solver/sparse"
)

// grid is the Laplacian of a side×side grid, grounded at a corner: the mesh equations of a grid of resistors.
func grid(side int) *sparse.Matrix[float64] {
	var rows, columns []int
	var values []float64
	put := func(i, j int, value float64) {
		rows, columns, values = append(rows, i), append(columns, j), append(values, value)
	}
	for k := range side * side {
		put(k, k, 4)
		if k%side+1 < side {
			put(k, k+1, -1)
			put(k+1, k, -1)
		}
		if k+side < side*side {
			put(k, k+side, -1)
			put(k+side, k, -1)
		}
	}
	pattern, slot := sparse.NewPattern(side*side, rows, columns)
	a := sparse.NewMatrix[float64](pattern)
	for k, s := range slot {
		a.Value[s] += values[k]
	}
	return a
}

func BenchmarkFactorGrid(b *testing.B) {
	for _, side := range []int{10, 30, 100} {
		a := grid(side)
		for _, order := range analyses() {
			b.Run(fmt.Sprintf("%s/%d", order.name, side*side), func(b *testing.B) {
				symbolic, err := order.analyze(context.Background(), a.Pattern)
				if err != nil {
					b.Fatal(err)
				}
				lu := sparse.NewLU[float64](symbolic)
				for b.Loop() {
					if err := lu.Factor(context.Background(), a, sparse.Lenient); err != nil {
						b.Fatal(err)
					}
				}
				b.ReportMetric(float64(lu.Fill()), "entries")
			})
		}
	}
}

func BenchmarkRefactorGrid(b *testing.B) {
	for _, side := range []int{10, 30, 100} {
		a := grid(side)
		b.Run(fmt.Sprint(side*side), func(b *testing.B) {
			symbolic, err := sparse.Analyze(context.Background(), a.Pattern, nil)
			if err != nil {
				b.Fatal(err)
			}
			lu := sparse.NewLU[float64](symbolic)
			if err := lu.Factor(context.Background(), a, sparse.Lenient); err != nil {
				b.Fatal(err)
			}
			for b.Loop() {
				if !lu.Refactor(a) {
					b.Fatal("the pivots do not fit")
				}
			}
		})
	}
}

func BenchmarkAnalyzeGrid(b *testing.B) {
	for _, side := range []int{10, 30, 100} {
		a := grid(side)
		for _, order := range analyses() {
			b.Run(fmt.Sprintf("%s/%d", order.name, side*side), func(b *testing.B) {
				for b.Loop() {
					if _, err := order.analyze(context.Background(), a.Pattern); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
}

// BenchmarkAgainstDense factorises the same grids with gonum's dense LU: where the lines cross, sparse begins to pay.
func BenchmarkAgainstDense(b *testing.B) {
	for _, side := range []int{2, 3, 4, 6, 8, 12, 20} {
		a := grid(side)
		x := make([]float64, a.N)
		b.Run(fmt.Sprintf("sparse/%d", a.N), func(b *testing.B) {
			symbolic, err := sparse.Analyze(context.Background(), a.Pattern, nil)
			if err != nil {
				b.Fatal(err)
			}
			lu := sparse.NewLU[float64](symbolic)
			for b.Loop() {
				if err := lu.Factor(context.Background(), a, sparse.Lenient); err != nil {
					b.Fatal(err)
				}
				lu.Solve(x, x)
			}
		})
		b.Run(fmt.Sprintf("dense/%d", a.N), func(b *testing.B) {
			full := dense(a)
			var lu mat.LU
			right, solution := mat.NewVecDense(a.N, nil), mat.NewVecDense(a.N, nil)
			for b.Loop() {
				lu.Factorize(full)
				if err := lu.SolveVecTo(solution, false, right); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
