package trace

import "math/bits"

// classes tells closed ways apart, but for the drawn meshes: two of them are of one class when they differ by a sum of drawn
// meshes, over the field of two elements. A class is a list of as many bits as meshes are missing.
type classes struct {
	words int      // of 64 bits in a class
	bits  []uint64 // of branch b: bits[b*words:(b+1)*words]; the class of a way is the sum over its branches
}

// newClasses finds the classes. Every kept face gives up one of its branches, which lies between it and the face next
// nearer to one that is not kept. The other branches still hold a spanning forest of the circuit together; those of them
// outside of it are as many as meshes are missing, and have one bit each. A given-up branch is worth the sum of the
// others around its face. So the cost is that of reading the faces once, times the words of a class.
func (d *Drawing) newClasses(f *faces, missing int) *classes {
	c := &classes{words: (missing + 63) / 64}
	c.bits = make([]uint64, c.words*len(d.Branches))
	order, given := f.giveUp()
	givenUp := make([]bool, len(d.Branches))
	for _, b := range given {
		givenUp[b] = true
	}
	forest := newSets(len(d.Potentials))
	bit := 0
	for b, branch := range d.Branches {
		if !givenUp[b] && !forest.union(branch.From, branch.To) {
			c.of(b)[bit/64] |= 1 << (bit % 64)
			bit++
		}
	}
	for i := len(order) - 1; i >= 0; i-- {
		for _, half := range f.list[order[i]].halves {
			if b := f.edges[half/2].branch; b >= 0 && b != given[i] {
				c.add(c.of(given[i]), b)
			}
		}
	}
	return c
}

func (c *classes) of(b int) []uint64 { return c.bits[b*c.words : (b+1)*c.words] }

// add adds the class of a branch to a sum.
func (c *classes) add(sum []uint64, b int) {
	for i, word := range c.of(b) {
		sum[i] ^= word
	}
}

// giveUp chooses the branch that each kept face gives up, by a search from the faces that are not kept, across branches.
// It gives the faces in the order in which the search reaches them, and their branches.
func (f *faces) giveUp() (order, given []int) {
	reached := make([]bool, len(f.list))
	var queue []int
	for i := range f.list {
		if reached[i] = !f.list[i].kept; reached[i] {
			queue = append(queue, i)
		}
	}
	for len(queue) > 0 {
		at := queue[0]
		queue = queue[1:]
		for _, half := range f.list[at].halves {
			next := f.beside[half^1]
			if b := f.edges[half/2].branch; b >= 0 && !reached[next] {
				reached[next] = true
				queue = append(queue, next)
				order, given = append(order, next), append(given, b)
			}
		}
	}
	return order, given
}

// basis holds independent classes, each at the first bit that it has set.
type basis [][]uint64

// add takes a class into the basis and reports whether it was independent of those before. It changes its argument.
func (b basis) add(class []uint64) bool {
	for i := 0; i < len(class); {
		if class[i] == 0 {
			i++
			continue
		}
		bit := 64*i + bits.TrailingZeros64(class[i])
		if b[bit] == nil {
			b[bit] = class
			return true
		}
		for k := i; k < len(class); k++ {
			class[k] ^= b[bit][k]
		}
	}
	return false
}
