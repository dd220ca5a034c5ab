package sparse

import (
	"context"
	"fmt"

	"loopwright/solver/wide"
)

// How large a diagonal entry must be, against the largest entry of its column, to be taken as pivot.
const (
	// Lenient keeps to the order of elimination, and so to the sparsity, as long as refinement can recover what it costs in
	// accuracy.
	Lenient = 1e-3
	// Strict takes the largest entry: partial pivoting.
	Strict = 1
)

// growthLimit is how small a pivot that Refactor takes over may be against the largest entry below it.
const growthLimit = 1e-4

// suspicious is how small a pivot must be against its column before it is tested for being nothing but rounding.
const suspicious = 1e-8

// pollEvery is the number of columns between two looks at the context.
const pollEvery = 128

// Singular is the error of a matrix without inverse.
type Singular struct {
	Column int // the column of A in which no pivot was left
	Rank   int // the number of columns eliminated before it
}

// Error says where the elimination stopped.
func (s *Singular) Error() string {
	return fmt.Sprintf("sparse: the matrix is singular: no pivot in column %d after %d columns", s.Column, s.Rank)
}

// LU holds the factors of a matrix. It keeps its memory from one factorisation to the next. It belongs to one goroutine
// at a time.
type LU[T Scalar] struct {
	symbolic *Symbolic

	lStart, lRow []int // L below the diagonal; rows are pivot positions once Factor is done
	lValue       []T
	uStart, uRow []int // U above the diagonal; each column in an order in which it can be eliminated
	uValue       []T
	pivot        []T   // diagonal of U
	rowAt        []int // row rowAt[k] of A is the k-th pivot row
	position     []int // inverse of rowAt; −1 while a row is no pivot row
	complete     bool

	x     []T // one dense column
	reach reach
	sums  []float64

	remainder []T // of iterative refinement
	sum       []wide.Number[T]
}

// NewLU prepares for matrices on the analysed pattern.
func NewLU[T Scalar](symbolic *Symbolic) *LU[T] {
	n := symbolic.Pattern.N
	return &LU[T]{
		symbolic: symbolic,
		lStart:   make([]int, n+1), uStart: make([]int, n+1),
		pivot: make([]T, n), rowAt: make([]int, n), position: make([]int, n),
		x:     make([]T, n),
		reach: newReach(n),
	}
}

// Fill is the number of stored entries of both factors.
func (f *LU[T]) Fill() int { return len(f.lRow) + len(f.uRow) + len(f.pivot) }

// Factor computes L·U = P·A·Q column by column with threshold partial pivoting: Gilbert and Peierls, "Sparse partial
// pivoting in time proportional to arithmetic operations", SIAM Journal on Scientific and Statistical Computing 9 (1988).
// Diagonal entries are preferred when they are at least threshold times the largest of their column: Lenient or Strict. The
// error is *Singular, or that of ctx.
func (f *LU[T]) Factor(ctx context.Context, a *Matrix[T], threshold float64) error {
	f.begin(a)
	for k, column := range f.symbolic.Order {
		if k%pollEvery == 0 && ctx.Err() != nil {
			return fmt.Errorf("factorisation stopped: %w", ctx.Err())
		}
		f.reach.find(a.Row[a.Start[column]:a.Start[column+1]], f.position, f.lStart, f.lRow)
		f.eliminate(a, column)
		row := f.choose(column, threshold)
		if row < 0 || f.onlyRounding(a, column, row) {
			f.clear()
			return &Singular{Column: column, Rank: k}
		}
		f.store(k, row)
		f.prune(k, row)
	}
	for p, i := range f.lRow {
		f.lRow[p] = f.position[i]
	}
	f.complete = true
	return nil
}

func (f *LU[T]) begin(a *Matrix[T]) {
	if a.Pattern != f.symbolic.Pattern && a.N != f.symbolic.Pattern.N {
		panic(errLength)
	}
	f.complete = false
	f.lRow, f.lValue = f.lRow[:0], f.lValue[:0]
	f.uRow, f.uValue = f.uRow[:0], f.uValue[:0]
	for i := range f.position {
		f.position[i] = -1
	}
}

// eliminate solves L·x = A(:,column) for the rows that reach has found.
func (f *LU[T]) eliminate(a *Matrix[T], column int) {
	x := f.x
	for p := a.Start[column]; p < a.Start[column+1]; p++ {
		x[a.Row[p]] = a.Value[p]
	}
	for _, i := range f.reach.found() {
		j := f.position[i]
		if j < 0 || x[i] == 0 {
			continue
		}
		xi := x[i]
		rows := f.lRow[f.lStart[j]:f.lStart[j+1]]
		values := f.lValue[f.lStart[j]:f.lStart[j+1]]
		for p, row := range rows {
			x[row] -= values[p] * xi
		}
	}
}

// choose gives the pivot row for the column in x, or −1 when all candidates are zero.
func (f *LU[T]) choose(column int, threshold float64) int {
	best, largest := -1, 0.0
	for _, i := range f.reach.found() {
		if f.position[i] >= 0 {
			continue
		}
		if size := Magnitude(f.x[i]); size > largest {
			best, largest = i, size
		}
	}
	if best < 0 {
		return -1
	}
	if f.position[column] < 0 && Magnitude(f.x[column]) >= threshold*largest {
		return column
	}
	return best
}

// store moves x into the factors with row as k-th pivot row and leaves x zero.
func (f *LU[T]) store(k, row int) {
	pivot := f.x[row]
	f.x[row] = 0
	for _, i := range f.reach.found() {
		if j := f.position[i]; j >= 0 {
			f.uRow = append(f.uRow, j)
			f.uValue = append(f.uValue, f.x[i])
		} else if i != row {
			f.lRow = append(f.lRow, i)
			f.lValue = append(f.lValue, f.x[i]/pivot)
		}
		f.x[i] = 0
	}
	f.pivot[k] = pivot
	f.rowAt[k] = row
	f.position[row] = k
	f.lStart[k+1] = len(f.lRow)
	f.uStart[k+1] = len(f.uRow)
}

func (f *LU[T]) clear() {
	for _, i := range f.reach.found() {
		f.x[i] = 0
	}
}

// onlyRounding reports whether no candidate of the column in x stands out of the rounding of the terms that were summed
// to it. Such a pivot would be zero in exact arithmetic.
func (f *LU[T]) onlyRounding(a *Matrix[T], column, row int) bool {
	largest := 0.0
	for p := a.Start[column]; p < a.Start[column+1]; p++ {
		largest = max(largest, Magnitude(a.Value[p]))
	}
	for _, i := range f.reach.found() {
		largest = max(largest, Magnitude(f.x[i]))
	}
	if Magnitude(f.x[row]) > suspicious*largest {
		return false
	}
	if f.sums == nil {
		f.sums = make([]float64, len(f.x))
	}
	sums := f.sums
	for p := a.Start[column]; p < a.Start[column+1]; p++ {
		sums[a.Row[p]] = Magnitude(a.Value[p])
	}
	for _, i := range f.reach.found() {
		if j := f.position[i]; j >= 0 {
			size := Magnitude(f.x[i])
			for p := f.lStart[j]; p < f.lStart[j+1]; p++ {
				sums[f.lRow[p]] += size * Magnitude(f.lValue[p])
			}
		}
	}
	rounding := true
	for _, i := range f.reach.found() {
		if f.position[i] < 0 && Magnitude(f.x[i]) > 8*epsilon*sums[i] {
			rounding = false
		}
	}
	for _, i := range f.reach.found() {
		sums[i] = 0
	}
	return rounding
}
