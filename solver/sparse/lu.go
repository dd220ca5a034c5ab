package sparse

import (
	"context"
	"fmt"

	"loopwright/solver/wide"
)

// How large a diagonal entry must be, against the largest entry of its column, to be taken as pivot.
const (
	// Lenient keeps to the order of elimination, and so to the sparsity, as long as refinement can recover what that costs
	// in accuracy.
	Lenient = 1e-8
	// Strict takes the largest entry: partial pivoting.
	Strict = 1
)

// growthLimit is how small a pivot that Refactor takes over may be against the largest entry below it.
const growthLimit = 1e-9

// suspicious is how small a pivot must be against its column to be taken for what rounding may have left of zero.
const suspicious = 1e-10

// pollEvery is the number of columns between two looks at the context.
const pollEvery = 128

// Singular is the error of a matrix in whose elimination no pivot was left.
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
	doubtful     bool // a pivot may be nothing but rounding
	null         []T  // of a singular matrix: see NullVector

	x     []T // one dense column
	reach reach

	remainder []T // of iterative refinement
	sum       []wide.Number[T]
}

// NewLU prepares for matrices on the analysed pattern.
func NewLU[T Scalar](symbolic *Symbolic) *LU[T] {
	n := symbolic.Pattern.N
	expected := symbolic.Pattern.Entries()
	block := make([]int, 9*n+2+2*expected)
	values := make([]T, 2*n+2*expected)
	lower, upper := values[2*n:2*n+expected:2*n+expected], values[2*n+expected:]
	return &LU[T]{
		symbolic: symbolic,
		lStart:   carve(&block, n+1), uStart: carve(&block, n+1),
		lRow: carve(&block, expected)[:0], lValue: lower[:0],
		uRow: carve(&block, expected)[:0], uValue: upper[:0],
		pivot: values[:n:n], rowAt: carve(&block, n), position: carve(&block, n),
		x: values[n : 2*n : 2*n],
		reach: reach{
			stack: carve(&block, n), top: n, path: carve(&block, n), at: carve(&block, n),
			mark: carve(&block, n), search: carve(&block, n),
		},
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
		row, largest := f.choose(column, threshold)
		if row < 0 {
			f.keepNull(k)
			f.clear()
			return &Singular{Column: column, Rank: k}
		}
		f.suspect(f.x[row], largest)
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
	f.complete, f.doubtful, f.null = false, false, nil
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

// choose gives the pivot row for the column in x, or −1 when all candidates are zero, and the largest value in the column.
func (f *LU[T]) choose(column int, threshold float64) (row int, largest float64) {
	row = -1
	best := 0.0
	for _, i := range f.reach.found() {
		size := Magnitude(f.x[i])
		largest = max(largest, size)
		if size > best && f.position[i] < 0 {
			row, best = i, size
		}
	}
	if row >= 0 && f.position[column] < 0 && Magnitude(f.x[column]) >= threshold*best && f.x[column] != 0 {
		row = column
	}
	return row, largest
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

// suspect notes a pivot that is so small against its column that it may be nothing but rounding: see SolveSystem.
func (f *LU[T]) suspect(pivot T, largest float64) {
	if Magnitude(pivot) <= suspicious*largest {
		f.doubtful = true
	}
}
