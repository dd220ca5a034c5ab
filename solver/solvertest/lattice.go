package solvertest

import (
	"math/rand/v2"
	"strconv"

	"loopwright/solver"
)

// Lattice is a plane network: the nodes are the crossings of a lattice of columns × rows squares, the branches those of
// its edges that are kept, each with the given probability. Its meshes are the faces of what is left, clockwise. Where a
// part hangs by a single branch inside a face, the mesh runs along that branch and back.
func Lattice[T solver.Scalar](random *rand.Rand, columns, rows int, keep float64, law Laws[T]) *solver.Network[T] {
	l := &lattice[T]{
		columns: columns, rows: rows,
		network: &solver.Network[T]{Nodes: (columns + 1) * (rows + 1)},
		edge:    map[[2]int]int{},
	}
	for y := range rows + 1 {
		for x := range columns + 1 {
			for direction := range 2 { // to the right, then down
				if l.neighbour(l.node(x, y), direction) >= 0 && random.Float64() < keep {
					l.add(random, l.node(x, y), direction, law())
				}
			}
		}
	}
	l.faces()
	return l.network
}

type lattice[T solver.Scalar] struct {
	columns, rows int
	network       *solver.Network[T]
	edge          map[[2]int]int // branch by node and direction
}

func (l *lattice[T]) node(x, y int) int { return y*(l.columns+1) + x }

// neighbour is the next node to the right, down, left or up (0 … 3), or −1 at the edge.
func (l *lattice[T]) neighbour(node, direction int) int {
	x, y := node%(l.columns+1), node/(l.columns+1)
	switch direction {
	case 0:
		x++
	case 1:
		y++
	case 2:
		x--
	default:
		y--
	}
	if x < 0 || y < 0 || x > l.columns || y > l.rows {
		return -1
	}
	return l.node(x, y)
}

func (l *lattice[T]) add(random *rand.Rand, node, direction int, law solver.Law[T]) {
	next := l.neighbour(node, direction)
	b := len(l.network.Branches)
	branch := solver.Branch[T]{From: node, To: next, Law: law}
	if random.IntN(2) == 0 {
		branch.From, branch.To = next, node
	}
	l.network.Branches = append(l.network.Branches, branch)
	l.edge[[2]int{node, direction}] = b
	l.edge[[2]int{next, direction + 2}] = b
}

// faces walks around each face with its inside on the right; walks that turn the other way are outer boundaries.
func (l *lattice[T]) faces() {
	walked := map[[2]int]bool{}
	for node := range l.network.Nodes {
		for direction := range 4 {
			start := [2]int{node, direction}
			if _, exists := l.edge[start]; !exists || walked[start] {
				continue
			}
			path, turns := l.walk(start, walked)
			if turns > 0 {
				name := "m" + strconv.Itoa(len(l.network.Meshes)+1)
				l.network.Meshes = append(l.network.Meshes, solver.Mesh{Name: name, Path: path})
			}
		}
	}
}

// walk gives the steps from one directed edge around to itself, and the right turns less the left turns on the way.
func (l *lattice[T]) walk(start [2]int, walked map[[2]int]bool) (path []solver.Step, turns int) {
	for at := start; ; {
		walked[at] = true
		b := l.edge[at]
		sense := 1
		if l.network.Branches[b].From != at[0] {
			sense = -1
		}
		path = append(path, solver.Step{Branch: b, Sense: sense})
		node := l.neighbour(at[0], at[1])
		for _, turn := range [4]int{1, 0, -1, -2} { // right first
			next := [2]int{node, (at[1] + turn + 4) % 4}
			if _, exists := l.edge[next]; exists {
				turns += turn
				at = next
				break
			}
		}
		if at == start {
			return path, turns
		}
	}
}
