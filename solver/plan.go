package solver

import (
	"context"
	"fmt"
	"slices"
	"time"
)

// Plan is a network prepared for being solved many times with other laws: its graph, its meshes, the order of
// elimination and the memory are kept. It belongs to one goroutine at a time; Fork gives others their own.
type Plan[T Scalar] struct {
	network *Network[T]
	through *membership
	terms   [][]int // branches that the laws refer to
	walk    *spread[T]
	compact *meshSystem[T]
	full    *meshSystem[T] // with a row for every branch; made when it is first needed
	nodal   *nodalSystem[T]

	// The last solution, for responses around it; last is nil when there is none.
	last  *meshSystem[T]
	laws  []Law[T]
	split *pieces
}

// Solve prepares a network and solves it once. The error is a *Problem when the network has no unique solution, wraps
// ctx.Err() when the context ended, and names the mistake when n is no network.
func Solve[T Scalar](ctx context.Context, n *Network[T]) (*Solution[T], error) {
	start := time.Now()
	plan, err := Prepare(ctx, n)
	if err != nil {
		return nil, err
	}
	preparing := time.Since(start)
	solution, err := plan.Solve(ctx, lawsOf(n))
	if err != nil {
		return nil, err
	}
	solution.Timing.Solve += preparing
	return solution, nil
}

func lawsOf[T Scalar](n *Network[T]) []Law[T] {
	laws := make([]Law[T], len(n.Branches))
	for b := range laws {
		laws[b] = n.Branches[b].Law
	}
	return laws
}

// Prepare checks a network and orders its mesh equations. The laws of n decide which branches are given a row; a branch
// with Law.Row set can take any law later, while others cost a second, larger layout when they no longer have the form
// u − Z·j = E. The plan keeps n, whose graph and meshes must not change any more.
func Prepare[T Scalar](ctx context.Context, n *Network[T]) (*Plan[T], error) {
	if err := validate(n); err != nil {
		return nil, err
	}
	laws := lawsOf(n)
	if err := validateLaws(laws); err != nil {
		return nil, err
	}
	all := make([]int, len(laws))
	p := &Plan[T]{network: n, through: newMembership(len(laws), n.Meshes), terms: make([][]int, len(laws))}
	for b := range laws {
		all[b] = b
		p.terms[b] = termBranches(&laws[b])
	}
	p.walk = newSpread(n, all)
	large := largeImpedance(laws)
	var err error
	p.compact, err = newMeshSystem(ctx, n, p.through, laws, func(b int) bool {
		return laws[b].needsRow() || magnitude(laws[b].Alpha) > large*magnitude(laws[b].Beta)
	})
	return p, err
}

// Fork gives a plan for another goroutine. It shares what never changes, the analyses, and has its own memory.
func (p *Plan[T]) Fork() *Plan[T] {
	fork := &Plan[T]{network: p.network, through: p.through, terms: p.terms, walk: p.walk.fork(), compact: p.compact.fork()}
	if p.full != nil {
		fork.full = p.full.fork()
	}
	if p.nodal != nil {
		fork.nodal = p.nodal.fork()
	}
	return fork
}

func termBranches[T Scalar](law *Law[T]) []int {
	var branches []int
	for _, term := range law.Terms {
		branches = append(branches, term.Branch)
	}
	return branches
}

// spreadLimit is how far apart impedances in one mesh equation may be. Adding them loses that part of the digits of the
// smaller in the factors, which refinement then has to recover.
const spreadLimit = 1e5

// largeImpedance gives the impedance above which a branch is given a row of its own.
func largeImpedance[T Scalar](laws []Law[T]) float64 {
	smallest := 0.0
	for b := range laws {
		if laws[b].Alpha != 0 && laws[b].Beta != 0 {
			z := magnitude(laws[b].Alpha) / magnitude(laws[b].Beta)
			if smallest == 0 || z < smallest {
				smallest = z
			}
		}
	}
	return smallest * spreadLimit
}

// Solve solves the network with the given laws, one for each branch, and audits the solution. Laws must refer to the same
// other branches as those that the plan was prepared with, or to none. Errors are as those of the function Solve.
func (p *Plan[T]) Solve(ctx context.Context, laws []Law[T]) (*Solution[T], error) {
	solution, err := p.SolveUnaudited(ctx, laws)
	if err != nil {
		return nil, err
	}
	if err := p.Audit(ctx, solution); err != nil {
		return nil, err
	}
	return solution, nil
}

// SolveUnaudited is Solve without the audit, for the steps of an iteration whose last result is audited.
func (p *Plan[T]) SolveUnaudited(ctx context.Context, laws []Law[T]) (*Solution[T], error) {
	start := time.Now()
	p.last = nil
	laws, err := p.accept(laws)
	if err != nil {
		return nil, err
	}
	split := findPieces(p.network, laws)
	if problem := findProblem(p.network, laws, split); problem != nil {
		return nil, problem
	}
	system, err := p.solveMeshes(ctx, laws, split)
	if err != nil {
		return nil, err
	}
	solution := p.solution(system, laws, split)
	p.last, p.laws, p.split = system, solution.Laws, split
	solution.Timing.Solve = time.Since(start)
	return solution, nil
}

// accept checks laws, and fills in terms of zero where a controlled source has become something else.
func (p *Plan[T]) accept(laws []Law[T]) ([]Law[T], error) {
	if len(laws) != len(p.network.Branches) {
		return nil, fmt.Errorf("%d laws given for %d branches", len(laws), len(p.network.Branches))
	}
	if err := validateLaws(laws); err != nil {
		return nil, err
	}
	laws = slices.Clone(laws)
	for b := range laws {
		if len(laws[b].Terms) == 0 && len(p.terms[b]) > 0 {
			laws[b].Terms = make([]Term[T], len(p.terms[b]))
			for k, branch := range p.terms[b] {
				laws[b].Terms[k].Branch = branch
			}
		}
		if !slices.EqualFunc(laws[b].Terms, p.terms[b], func(t Term[T], branch int) bool { return t.Branch == branch }) {
			return nil, fmt.Errorf("the law of branch %d refers to other branches than when the network was prepared", b)
		}
	}
	return laws, nil
}

// solveMeshes solves the mesh equations in the compact layout, or with a row for every branch where the compact layout
// cannot hold the laws or is singular to rounding because its impedances are too far apart.
func (p *Plan[T]) solveMeshes(ctx context.Context, laws []Law[T], split *pieces) (*meshSystem[T], error) {
	if p.compact.holds(laws) {
		if solved, err := p.compact.solve(ctx, laws, split.gauge); solved || err != nil {
			return p.compact, err
		}
	}
	if p.full == nil {
		full, err := newMeshSystem(ctx, p.network, p.through, laws, func(int) bool { return true })
		if err != nil {
			return nil, err
		}
		p.full = full
	}
	solved, err := p.full.solve(ctx, laws, split.gauge)
	if !solved && err == nil {
		err = p.singular(p.full, laws)
	}
	return p.full, err
}
