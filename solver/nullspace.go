package solver

import "slices"

// nullSpace gives a basis of the integer vectors c of a given size with Σ row[k]·c[k] = 0 for every row, each without a
// common factor and with its first entry positive. Rows are overwritten. The rows that meshes give hold ±1, at most two of
// them where no conductors cross, so that they stay short under elimination.
func nullSpace(rows []map[int]int, size int) [][]int {
	pivots := make([]map[int]int, size) // the row in which a column is the pivot; nil for free columns
	found := make([]int, size)          // when a pivot column was found
	var order []int                     // pivot columns as they were found
	for _, row := range rows {
		for column := earliest(row, pivots, found); column >= 0; column = earliest(row, pivots, found) {
			cancel(row, pivots[column], column)
		}
		if column := lowest(row); column >= 0 {
			pivots[column], found[column] = row, len(order)
			order = append(order, column)
		}
	}
	var basis [][]int
	for free := range size {
		if pivots[free] == nil {
			basis = append(basis, nullVector(pivots, order, free))
		}
	}
	return basis
}

// earliest is the pivot column that was found first among those in a row, −1 when there is none. A pivot row holds none
// that was found before its own, so cancelling in this order comes to an end.
func earliest(row map[int]int, pivots []map[int]int, found []int) int {
	column := -1
	for k := range row {
		if pivots[k] != nil && (column < 0 || found[k] < found[column]) {
			column = k
		}
	}
	return column
}

// lowest is the lowest column of a row, −1 for an empty one.
func lowest(row map[int]int) int {
	column := -1
	for k := range row {
		if column < 0 || k < column {
			column = k
		}
	}
	return column
}

// cancel removes a column from a row by adding multiples of both rows, and divides by what is common.
func cancel(row, pivot map[int]int, column int) {
	a, b := pivot[column], row[column]
	for k := range row {
		row[k] *= a
	}
	for k, x := range pivot {
		row[k] -= b * x
		if row[k] == 0 {
			delete(row, k)
		}
	}
	common := 0
	for _, x := range row {
		common = commonDivisor(common, magnitudeOf(x))
	}
	for k := range row {
		row[k] /= common
	}
}

// nullVector gives the vector whose only free entry that is not zero is the given one. A pivot row holds, beside its
// pivot, free columns and pivots that were found after it.
func nullVector(pivots []map[int]int, order []int, free int) []int {
	vector := make([]int, len(pivots))
	vector[free] = 1
	for _, column := range slices.Backward(order) {
		row := pivots[column]
		sum := 0
		for k, x := range row {
			if k != column {
				sum += x * vector[k]
			}
		}
		pivot := row[column]
		multiple := magnitudeOf(pivot) / max(1, commonDivisor(sum, magnitudeOf(pivot)))
		if multiple > 1 {
			for k := range vector {
				vector[k] *= multiple
			}
			sum *= multiple
		}
		vector[column] = -sum / pivot
	}
	return normalised(vector)
}

// normalised divides a vector by what is common to its entries and makes its first entry positive.
func normalised(vector []int) []int {
	common := 0
	for _, x := range vector {
		common = commonDivisor(common, magnitudeOf(x))
	}
	first := slices.IndexFunc(vector, func(x int) bool { return x != 0 })
	if first >= 0 && vector[first] < 0 {
		common = -common
	}
	for k := range vector {
		vector[k] /= common
	}
	return vector
}

func magnitudeOf(x int) int { return max(x, -x) }

// commonDivisor is the greatest common divisor of |a| and b ≥ 0; that of 0 and b is b.
func commonDivisor(a, b int) int {
	a = magnitudeOf(a)
	for b != 0 {
		a, b = b, a%b
	}
	return a
}
