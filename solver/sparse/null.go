package sparse

// keepNull stores the vector that the columns eliminated so far and the k-th one combine to zero with: 1 for the column
// in which no pivot was left, and −U⁻¹·x for those before it.
func (f *LU[T]) keepNull(k int) {
	order := f.symbolic.Order
	y := make([]T, k)
	for j := range k {
		y[j] = -f.x[f.rowAt[j]]
	}
	for j := k - 1; j >= 0; j-- {
		if y[j] == 0 {
			continue
		}
		y[j] /= f.pivot[j]
		for p := f.uStart[j]; p < f.uStart[j+1]; p++ {
			y[f.uRow[p]] -= f.uValue[p] * y[j]
		}
	}
	f.null = make([]T, f.symbolic.Pattern.N)
	for j, value := range y {
		f.null[order[j]] = value
	}
	f.null[order[k]] = 1
}

// NullVector gives a vector z with A·z ≈ 0 after a factorisation that found the matrix singular, or whose solutions did
// not converge. Then z comes from inverse iteration (Wilkinson, "The Algebraic Eigenvalue Problem", 1965, chapter 5).
func (f *LU[T]) NullVector() []T {
	if f.null != nil {
		return f.null
	}
	z := make([]T, f.symbolic.Pattern.N)
	if !f.complete {
		return z
	}
	unruly(z)
	for range 3 {
		f.Solve(z, z)
		largest := 0.0
		for _, value := range z {
			largest = max(largest, Magnitude(value))
		}
		for i := range z {
			z[i] = Scaled(z[i], 1/largest)
		}
	}
	return z
}
