package sparse

import (
	"context"
	"fmt"
)

// order eliminates variables of least approximate degree until none is left, and gives the order of the columns.
func (q *quotient) order(ctx context.Context) ([]int, error) {
	columns := make([]int, 0, q.n)
	q.fill(false)
	for step := 0; q.left > 0; step++ {
		if step%pollEvery == 0 && ctx.Err() != nil {
			return nil, fmt.Errorf("ordering stopped: %w", ctx.Err())
		}
		if q.buckets.count == 0 {
			q.fill(true)
		}
		pivot := q.buckets.takeLeast()
		q.left -= q.weight[pivot]
		q.weight[pivot] = 0
		q.form(pivot)
		q.measure(pivot)
		q.update(pivot)
		q.mergeAlike(pivot)
		q.settle(pivot)
		for i := pivot; i >= 0; i = q.next[i] {
			columns = append(columns, i)
		}
	}
	return append(columns, q.dense...), nil
}

// fill puts the variables that wait, or those that do not, into the buckets.
func (q *quotient) fill(waiting bool) {
	for i := q.n - 1; i >= 0; i-- {
		if q.weight[i] > 0 && q.waiting[i] == waiting {
			q.waiting[i] = false
			q.buckets.add(i, q.degree[i])
		}
	}
}

// form makes the pivot an element, whose clique is all that it is joined to. The elements that it had become part of it.
func (q *quotient) form(pivot int) {
	q.stamp++
	q.mark[pivot] = q.stamp
	clique := q.take(q.degree[pivot])
	size := 0
	for _, i := range q.variables[pivot] {
		clique, size = q.include(i, clique, size)
	}
	for _, e := range q.elements[pivot] {
		for _, i := range q.clique[e] {
			clique, size = q.include(i, clique, size)
		}
		q.absorb(e)
	}
	q.clique[pivot], q.size[pivot] = clique, size
	q.variables[pivot], q.elements[pivot] = nil, nil
}

func (q *quotient) include(i int, clique []int, size int) ([]int, int) {
	if q.weight[i] == 0 || q.mark[i] == q.stamp {
		return clique, size
	}
	q.mark[i] = q.stamp
	if q.waiting[i] {
		q.waiting[i] = false
	} else {
		q.buckets.remove(i, q.degree[i])
	}
	return append(clique, i), size + q.weight[i]
}

func (q *quotient) absorb(e int) { q.absorbed[e], q.clique[e] = true, nil }

// measure finds, for each element that touches the clique, the weight of its variables outside of it.
func (q *quotient) measure(pivot int) {
	for _, i := range q.clique[pivot] {
		for _, e := range q.elements[i] {
			if q.outside[e] < q.base {
				q.outside[e] = q.base + q.size[e]
			}
			q.outside[e] -= q.weight[i]
		}
	}
}

// update drops from each variable of the clique what the pivot covers, and bounds its degree outside the clique. What is
// joined to nothing else is ordered together with the pivot.
func (q *quotient) update(pivot int) {
	for _, i := range q.clique[pivot] {
		degree, hash := 0, pivot
		elements := q.elements[i][:0]
		for _, e := range q.elements[i] {
			if q.absorbed[e] {
				continue
			}
			if outside := q.outside[e] - q.base; outside > 0 {
				degree += outside
				hash += e
				elements = append(elements, e)
			} else {
				q.absorb(e)
			}
		}
		variables := q.variables[i][:0]
		for _, j := range q.variables[i] {
			if q.weight[j] > 0 && q.mark[j] != q.stamp {
				degree += q.weight[j]
				hash += j
				variables = append(variables, j)
			}
		}
		q.variables[i] = variables
		q.elements[i] = append(elements, pivot)
		if degree == 0 {
			q.left -= q.weight[i]
			q.size[pivot] -= q.weight[i]
			q.standFor(pivot, i)
			continue
		}
		q.degree[i] = min(q.degree[i], degree)
		q.hash[i] = hash % q.n
	}
	q.base += q.n + 1
}

// standFor lets one node stand for the columns of a variable, which dies.
func (q *quotient) standFor(keep, dead int) {
	q.weight[dead] = 0
	q.next[q.last[keep]] = dead
	q.last[keep] = q.last[dead]
	q.variables[dead], q.elements[dead] = nil, nil
}

// mergeAlike merges the variables of the clique that are joined to the same nodes: one would follow the other anyway. Only
// variables of the same hash need to be compared.
func (q *quotient) mergeAlike(pivot int) {
	for _, i := range q.clique[pivot] {
		if q.weight[i] > 0 {
			q.chain[i] = q.chains[q.hash[i]]
			q.chains[q.hash[i]] = i
		}
	}
	for _, i := range q.clique[pivot] {
		if q.weight[i] == 0 {
			continue
		}
		first := q.chains[q.hash[i]]
		q.chains[q.hash[i]] = -1
		for ; first >= 0; first = q.chain[first] {
			q.mergeChain(first)
		}
	}
}

// mergeChain merges into i the variables behind it in its chain that are joined to the same nodes.
func (q *quotient) mergeChain(i int) {
	if q.chain[i] < 0 {
		return
	}
	q.stamp++
	for _, e := range q.elements[i] {
		q.mark[e] = q.stamp
	}
	for _, j := range q.variables[i] {
		q.mark[j] = q.stamp
	}
	for before, j := i, q.chain[i]; j >= 0; j = q.chain[j] {
		if !q.alike(i, j) {
			before = j
			continue
		}
		q.weight[i] += q.weight[j]
		q.standFor(i, j)
		q.chain[before] = q.chain[j]
	}
}

// alike reports whether j is joined to the nodes that are marked for i.
func (q *quotient) alike(i, j int) bool {
	if len(q.elements[i]) != len(q.elements[j]) || len(q.variables[i]) != len(q.variables[j]) {
		return false
	}
	for _, e := range q.elements[j] {
		if q.mark[e] != q.stamp {
			return false
		}
	}
	for _, k := range q.variables[j] {
		if q.mark[k] != q.stamp {
			return false
		}
	}
	return true
}

// settle drops the dead variables from the clique and puts the others back into their buckets.
func (q *quotient) settle(pivot int) {
	alive := q.clique[pivot][:0]
	for _, i := range q.clique[pivot] {
		if q.weight[i] == 0 {
			continue
		}
		alive = append(alive, i)
		degree := min(q.degree[i]+q.size[pivot]-q.weight[i], q.left-q.weight[i])
		q.degree[i] = degree
		q.buckets.add(i, degree)
	}
	q.clique[pivot] = alive
}
