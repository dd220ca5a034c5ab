package sparse

import "math"

// Pattern is where a square matrix may have entries, in compressed columns: the rows of column j are
// Row[Start[j]:Start[j+1]], ascending and each once.
type Pattern struct {
	N     int
	Start []int // N+1
	Row   []int
}

// Matrix is a pattern with the value of each of its entries; entries may be zero.
type Matrix[T Scalar] struct {
	*Pattern
	Value []T
}

// Entries is the number of places that the pattern holds.
func (p *Pattern) Entries() int { return len(p.Row) }

// NewMatrix makes a matrix of zeros on a pattern.
func NewMatrix[T Scalar](p *Pattern) *Matrix[T] {
	return &Matrix[T]{Pattern: p, Value: make([]T, p.Entries())}
}

// NewPattern gathers the places (rows[k], columns[k]) of an n×n matrix, in any order, repeated or not. slot[k] is where the
// value of place k belongs in Matrix.Value: adding each term to its slot assembles a matrix. Places out of range panic.
// Linear time, by two counting sorts.
func NewPattern(n int, rows, columns []int) (pattern *Pattern, slot []int) {
	if len(rows) != len(columns) {
		panic(errLength)
	}
	block := make([]int, 5*len(rows)+2*(n+1))
	next := carve(&block, n+1)
	byRow := countingSort(rows, nil, next, carve(&block, len(rows)))
	order := countingSort(columns, byRow, next, carve(&block, len(rows)))
	pattern = &Pattern{N: n, Start: carve(&block, n+1), Row: carve(&block, len(rows))[:0]}
	slot = carve(&block, len(rows))
	column := 0
	for index, k := range order {
		for column < columns[k] {
			column++
			pattern.Start[column] = len(pattern.Row)
		}
		repeated := index > 0 && rows[order[index-1]] == rows[k] && columns[order[index-1]] == columns[k]
		if !repeated {
			pattern.Row = append(pattern.Row, rows[k])
		}
		slot[k] = len(pattern.Row) - 1
	}
	for column < n {
		column++
		pattern.Start[column] = len(pattern.Row)
	}
	return pattern, slot
}

// countingSort writes the order of 0 … len(keys)−1 by key, keeping the order of first (nil: ascending) among equal keys. next
// is scratch with one place more than there are keys to tell apart.
func countingSort(keys, first, next, order []int) []int {
	clear(next)
	for _, key := range keys {
		next[key+1]++
	}
	for key := range len(next) - 1 {
		next[key+1] += next[key]
	}
	for position := range keys {
		k := position
		if first != nil {
			k = first[position]
		}
		order[next[keys[k]]] = k
		next[keys[k]]++
	}
	return order
}

// Transpose gives the pattern of the transposed matrix.
func (p *Pattern) Transpose() *Pattern {
	block := make([]int, 2*p.N+1+p.Entries())
	t := &Pattern{N: p.N, Start: carve(&block, p.N+1), Row: carve(&block, p.Entries())}
	for _, i := range p.Row {
		t.Start[i+1]++
	}
	for i := range p.N {
		t.Start[i+1] += t.Start[i]
	}
	next := carve(&block, p.N)
	copy(next, t.Start)
	for j := range p.N {
		for _, i := range p.Row[p.Start[j]:p.Start[j+1]] {
			t.Row[next[i]] = j
			next[i]++
		}
	}
	return t
}

// Zero sets all values to zero.
func (a *Matrix[T]) Zero() { clear(a.Value) }

// Multiply adds A·x to y.
func (a *Matrix[T]) Multiply(y, x []T) {
	if len(x) != a.N || len(y) != a.N {
		panic(errLength)
	}
	for j, xj := range x {
		for p := a.Start[j]; p < a.Start[j+1]; p++ {
			y[a.Row[p]] += a.Value[p] * xj
		}
	}
}

// Equilibrate multiplies each row by the power of two that brings its largest entry between 1 and 2, so that nothing is
// rounded, and writes the factors to scale. Rows of zeros keep the factor 1.
func (a *Matrix[T]) Equilibrate(scale []float64) {
	if len(scale) != a.N {
		panic(errLength)
	}
	clear(scale)
	for p, i := range a.Row {
		scale[i] = max(scale[i], Magnitude(a.Value[p]))
	}
	for i, largest := range scale {
		scale[i] = 1
		if largest > 0 {
			_, exponent := math.Frexp(largest)
			scale[i] = math.Ldexp(1, min(1-exponent, 1000))
		}
	}
	for p, i := range a.Row {
		a.Value[p] = Scaled(a.Value[p], scale[i])
	}
}
