package sparse

const errFactors = "sparse: solve without factors"

// Solve computes x = A⁻¹·b. x and b may be the same slice. The cost is proportional to Fill.
func (f *LU[T]) Solve(x, b []T) {
	f.check(x, b)
	y := f.x
	for k, row := range f.rowAt {
		y[k] = b[row]
	}
	for k, yk := range y {
		if yk != 0 {
			for p := f.lStart[k]; p < f.lStart[k+1]; p++ {
				y[f.lRow[p]] -= f.lValue[p] * yk
			}
		}
	}
	for k := len(y) - 1; k >= 0; k-- {
		if y[k] != 0 {
			y[k] /= f.pivot[k]
			for p := f.uStart[k]; p < f.uStart[k+1]; p++ {
				y[f.uRow[p]] -= f.uValue[p] * y[k]
			}
		}
	}
	for k, column := range f.symbolic.Order {
		x[column] = y[k]
		y[k] = 0
	}
}

// SolveTransposed computes x = A⁻ᵀ·b, without conjugation. x and b may be the same slice.
func (f *LU[T]) SolveTransposed(x, b []T) {
	f.check(x, b)
	y := f.x
	for k, column := range f.symbolic.Order {
		y[k] = b[column]
	}
	for k := range y {
		sum := y[k]
		for p := f.uStart[k]; p < f.uStart[k+1]; p++ {
			sum -= f.uValue[p] * y[f.uRow[p]]
		}
		y[k] = sum / f.pivot[k]
	}
	for k := len(y) - 1; k >= 0; k-- {
		sum := y[k]
		for p := f.lStart[k]; p < f.lStart[k+1]; p++ {
			sum -= f.lValue[p] * y[f.lRow[p]]
		}
		y[k] = sum
	}
	for k, row := range f.rowAt {
		x[row] = y[k]
	}
	clear(y)
}

func (f *LU[T]) check(x, b []T) {
	if !f.complete {
		panic(errFactors)
	}
	if n := f.symbolic.Pattern.N; len(x) != n || len(b) != n {
		panic(errLength)
	}
}
