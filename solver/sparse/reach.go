package sparse

// reach finds which rows of a column of L⁻¹A can be different from zero: those that can be reached from the rows of the
// column of A in the graph of L, by a depth-first search that keeps its own stack.
type reach struct {
	stack  []int // the found rows, from top on
	top    int
	path   []int // rows on the way from the root of the search
	at     []int // where the search stands in the column of each row on the path
	mark   []int // mark[i] == stamp: row i has been found
	stamp  int
	search []int // where the search of column j of L ends: see prune
}

// found gives the rows of the last search, each after all rows whose elimination changes it.
func (r *reach) found() []int { return r.stack[r.top:] }

// find searches from the given rows. position[i] is the column of L in which row i is the pivot row, or −1; the rows of
// column j of L begin at lRow[lStart[j]].
func (r *reach) find(rows, position, lStart, lRow []int) {
	r.top = len(r.stack)
	r.stamp++
	for _, root := range rows {
		if r.mark[root] != r.stamp {
			r.visit(root, position, lStart, lRow)
		}
	}
}

func (r *reach) visit(root int, position, lStart, lRow []int) {
	enter := func(depth, row int) {
		r.path[depth] = row
		r.mark[row] = r.stamp
		if j := position[row]; j >= 0 {
			r.at[depth] = lStart[j]
		}
	}
	enter(0, root)
	for depth := 0; depth >= 0; {
		row := r.path[depth]
		descended := false
		if j := position[row]; j >= 0 {
			for p := r.at[depth]; p < r.search[j]; p++ {
				if next := lRow[p]; r.mark[next] != r.stamp {
					r.at[depth] = p + 1
					depth++
					enter(depth, next)
					descended = true
					break
				}
			}
		}
		if !descended {
			r.top--
			r.stack[r.top] = row
			depth--
		}
	}
}

// prune shortens later searches once row has become the k-th pivot row: where U has the entry (j, k) and L the entry
// (row, j), every row that column j leads to beyond its pivot rows can also be reached through column k. See Eisenstat
// and Liu, "Exploiting structural symmetry in a sparse partial pivoting code", SIAM Journal on Scientific Computing 14
// (1993). Entries of column j are put in order, pivot rows first.
func (f *LU[T]) prune(k, row int) {
	f.reach.search[k] = f.lStart[k+1]
	for _, j := range f.uRow[f.uStart[k]:f.uStart[k+1]] {
		from, end := f.lStart[j], f.lStart[j+1]
		if f.reach.search[j] < end || !contains(f.lRow[from:end], row) {
			continue
		}
		for from < end {
			if f.position[f.lRow[from]] >= 0 {
				from++
				continue
			}
			end--
			f.lRow[from], f.lRow[end] = f.lRow[end], f.lRow[from]
			f.lValue[from], f.lValue[end] = f.lValue[end], f.lValue[from]
		}
		f.reach.search[j] = end
	}
}

func contains(rows []int, row int) bool {
	for _, i := range rows {
		if i == row {
			return true
		}
	}
	return false
}
