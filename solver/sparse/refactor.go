package sparse

// Refactor computes the factors of another matrix on the same pattern with the pivots that Factor chose. It allocates
// nothing. It reports false, and leaves no usable factors, when a pivot has become too small for them to be accurate or
// when there are no earlier pivots: then Factor must choose new ones.
//
// An entry below a pivot must not be larger than 1/growthLimit pivots. This watch over the growth of the pivots follows
// Davis and Palamadai Natarajan, "Algorithm 907: KLU", ACM Transactions on Mathematical Software 37 (2010).
func (f *LU[T]) Refactor(a *Matrix[T]) bool {
	if a.Pattern != f.symbolic.Pattern && a.N != f.symbolic.Pattern.N {
		panic(errLength)
	}
	if !f.complete {
		return false
	}
	f.complete, f.doubtful, f.null = false, false, nil
	x := f.x
	for k, column := range f.symbolic.Order {
		for p := a.Start[column]; p < a.Start[column+1]; p++ {
			x[f.position[a.Row[p]]] = a.Value[p]
		}
		above := f.eliminateAgain(k)
		pivot := x[k]
		x[k] = 0
		largest := 0.0
		for p := f.lStart[k]; p < f.lStart[k+1]; p++ {
			i := f.lRow[p]
			largest = max(largest, Magnitude(x[i]))
			f.lValue[p] = x[i] / pivot
			x[i] = 0
		}
		if size := Magnitude(pivot); !(size > 0 && size >= growthLimit*largest) {
			return false
		}
		f.suspect(pivot, max(above, largest))
		f.pivot[k] = pivot
	}
	f.complete = true
	return true
}

// eliminateAgain applies the earlier columns of L to x in the order that Factor found, and moves column k of U out of x.
// It gives the largest value of that column.
func (f *LU[T]) eliminateAgain(k int) (largest float64) {
	x := f.x
	for p := f.uStart[k]; p < f.uStart[k+1]; p++ {
		j := f.uRow[p]
		xj := x[j]
		x[j] = 0
		f.uValue[p] = xj
		if xj == 0 {
			continue
		}
		largest = max(largest, Magnitude(xj))
		rows := f.lRow[f.lStart[j]:f.lStart[j+1]]
		values := f.lValue[f.lStart[j]:f.lStart[j+1]]
		for q, row := range rows {
			x[row] -= values[q] * xj
		}
	}
	return largest
}
