package sparse

import "math"

// quotient is a graph under elimination, kept as a quotient graph: an eliminated variable becomes an element, which stands
// for the clique of the variables that its elimination has joined. Variables that cannot be told apart are merged: one of
// them stands for the columns of all, the others are dead. See Amestoy, Davis and Duff, "An approximate minimum degree
// ordering algorithm", SIAM Journal on Matrix Analysis and Applications 17 (1996).
//
// Nodes 0 … n−1 are variables and, once eliminated, elements; further nodes are elements from the start.
type quotient struct {
	n         int
	variables [][]int // of a variable: the variables next to it, beside those that its elements join it to
	elements  [][]int // of a variable: its elements
	weight    []int   // of a variable: how many columns it stands for; 0 when it is dead or eliminated
	degree    []int   // of a variable: approximate weight of what it is joined to
	next      []int   // the columns that a variable stands for, as a list that ends with −1
	last      []int

	clique   [][]int // of an element: its variables
	size     []int   // of an element: their weight
	absorbed []bool  // of an element: all of it is part of another one

	waiting []bool // of a variable: it is not eliminated before it belongs to an element
	buckets buckets
	mark    []int // mark[i] == stamp: variable i belongs to the present clique
	stamp   int
	outside []int // outside[e] − base is the weight of the variables of element e that are not in the present clique
	base    int
	hash    []int
	chain   []int // variables of the same hash, as lists
	chains  []int // their heads; −1 for none
	left    int   // columns not yet ordered
	dense   []int // columns that are ordered last
	memory  []int // room for cliques
}

func newQuotient(n, elements int) *quotient {
	total := n + elements
	block := make([]int, 10*n+1+3*total)
	lists := make([][]int, 2*n+total)
	flags := make([]bool, total+n)
	q := &quotient{
		n: n, variables: lists[:n], elements: lists[n : 2*n], clique: lists[2*n:],
		weight: carve(&block, n), degree: carve(&block, n), next: carve(&block, n), last: carve(&block, n),
		size: carve(&block, total), absorbed: flags[:total], waiting: flags[total:],
		mark: carve(&block, total), outside: carve(&block, total), base: 1,
		hash: carve(&block, n), chain: carve(&block, n), chains: carve(&block, n), left: n,
		buckets: buckets{head: carve(&block, n+1), next: carve(&block, n), previous: carve(&block, n)},
	}
	for degree := range q.buckets.head {
		q.buckets.head[degree] = -1
	}
	for i := range n {
		q.weight[i], q.next[i], q.last[i], q.chains[i] = 1, -1, i, -1
	}
	return q
}

// newSymmetricQuotient begins with the graph of A + Aᵀ.
func newSymmetricQuotient(p *Pattern) *quotient {
	n := p.N
	q := newQuotient(n, 0)
	transposed := p.Transpose()
	memory := make([]int, 0, 2*p.Entries())
	for j := range n {
		from := len(memory)
		q.stamp++
		q.mark[j] = q.stamp
		for _, half := range [2]*Pattern{p, transposed} {
			for _, i := range half.Row[half.Start[j]:half.Start[j+1]] {
				if q.mark[i] != q.stamp {
					q.mark[i] = q.stamp
					memory = append(memory, i)
				}
			}
		}
		q.variables[j] = memory[from:len(memory):len(memory)]
	}
	q.leaveOutDense()
	room := make([]int, len(memory))
	for i, adjacent := range q.variables {
		q.degree[i] = len(adjacent)
		// An element comes for each variable or element that goes, so there are never more of them than this.
		q.elements[i], room = room[:0:len(adjacent)], room[len(adjacent):]
	}
	return q
}

// newColumnQuotient begins with the graph of AᵀA: each row of A is an element that joins its columns.
func newColumnQuotient(p *Pattern) *quotient {
	n := p.N
	q := newQuotient(n, n)
	transposed := p.Transpose()
	limit := denseLimit(n)
	for i := range n {
		columns := transposed.Row[transposed.Start[i]:transposed.Start[i+1]]
		q.absorbed[n+i] = len(columns) > limit
		q.clique[n+i], q.size[n+i] = columns, len(columns)
	}
	for j := range n {
		for _, i := range p.Row[p.Start[j]:p.Start[j+1]] {
			if !q.absorbed[n+i] {
				q.elements[j] = append(q.elements[j], n+i)
				q.degree[j] += q.size[n+i] - 1
			}
		}
		q.degree[j] = min(q.degree[j], n-1)
	}
	return q
}

// denseLimit is the degree beyond which a variable is ordered last, or a row left out, so that it does not slow down the
// rest.
func denseLimit(n int) int { return max(16, int(10*math.Sqrt(float64(n)))) }

func (q *quotient) leaveOutDense() {
	limit := denseLimit(q.n)
	for i, adjacent := range q.variables {
		if len(adjacent) > limit {
			q.dense = append(q.dense, i)
			q.weight[i] = 0
			q.left--
		}
	}
	if len(q.dense) == 0 {
		return
	}
	for i, adjacent := range q.variables {
		kept := adjacent[:0]
		for _, j := range adjacent {
			if q.weight[j] > 0 {
				kept = append(kept, j)
			}
		}
		q.variables[i] = kept
	}
}

// take gives room for a clique.
func (q *quotient) take(length int) []int {
	if len(q.memory) < length {
		q.memory = make([]int, max(length, 4*q.n))
	}
	room := q.memory[:0:length]
	q.memory = q.memory[length:]
	return room
}

// buckets holds the variables by degree, each bucket as a doubly linked list.
type buckets struct {
	head           []int // by degree; −1 for none
	next, previous []int
	least          int // no bucket below it holds anything
	count          int
}

func (b *buckets) add(i, degree int) {
	first := b.head[degree]
	b.next[i], b.previous[i] = first, -1
	if first >= 0 {
		b.previous[first] = i
	}
	b.head[degree] = i
	b.least = min(b.least, degree)
	b.count++
}

func (b *buckets) remove(i, degree int) {
	b.count--
	if b.previous[i] >= 0 {
		b.next[b.previous[i]] = b.next[i]
	} else {
		b.head[degree] = b.next[i]
	}
	if b.next[i] >= 0 {
		b.previous[b.next[i]] = b.previous[i]
	}
}

// takeLeast removes a variable of the least degree; there must be one.
func (b *buckets) takeLeast() int {
	for b.head[b.least] < 0 {
		b.least++
	}
	i := b.head[b.least]
	b.remove(i, b.least)
	return i
}
