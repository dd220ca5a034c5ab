package sparse

import "math/bits"

// smallOrder is the largest pattern that is ordered with one word for each row of the graph.
const smallOrder = 64

// orderSmall orders the columns of a small pattern by minimum degree in the graph of A + Aᵀ, which it keeps as a matrix of
// bits; eliminating a column joins its neighbours to one another. Among equals the lowest column comes first. This gives
// exact degrees, and costs less than the lists of a quotient graph as long as a row fits a word.
func orderSmall(p *Pattern, waiting []bool) []int {
	var graph [smallOrder]uint64
	for j := range p.N {
		for _, i := range p.Row[p.Start[j]:p.Start[j+1]] {
			graph[i] |= 1 << j
			graph[j] |= 1 << i
		}
	}
	var blocked uint64
	for j, waits := range waiting {
		if waits {
			blocked |= 1 << j
		}
	}
	order := make([]int, 0, p.N)
	left := ^uint64(0) >> (smallOrder - p.N)
	for left != 0 {
		choice := left &^ blocked
		if choice == 0 {
			choice = left
		}
		pivot, least := 0, smallOrder+1
		for rest := choice; rest != 0; rest &= rest - 1 {
			j := bits.TrailingZeros64(rest)
			if degree := bits.OnesCount64(graph[j] & left &^ (1 << j)); degree < least {
				pivot, least = j, degree
			}
		}
		left &^= 1 << pivot
		clique := graph[pivot] & left
		blocked &^= clique
		for rest := clique; rest != 0; rest &= rest - 1 {
			graph[bits.TrailingZeros64(rest)] |= clique
		}
		order = append(order, pivot)
	}
	return order
}
