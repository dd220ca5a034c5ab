// Package cases solves a sheet in each of its operating cases.
//
// All values are complex: phasors, root mean square, in AC, and real numbers in DC. Signs are those of package kinds.
package cases

import (
	"context"
	"errors"
	"math/cmplx"
	"time"

	"loopwright/schematic"
	"loopwright/schematic/kinds"
	"loopwright/schematic/trace"
	"loopwright/solver"
)

// Result is a sheet as a circuit, with its solution in every case.
type Result struct {
	Drawing *trace.Drawing
	Cases   []Case // as on the sheet
	Timing  Timing
}

// Timing says how long the stretches of the work took, for all cases together.
type Timing struct {
	Trace time.Duration // reading the geometry
	Mesh  time.Duration // finding the meshes
	Solve time.Duration // assembling, factorising and solving the equations
	Audit time.Duration // checking the solutions
}

// Case is the solution of one operating case. Without a solution there is a Problem and nothing else.
type Case struct {
	Name        string
	Solved      bool
	Problem     *Problem
	Supply      kinds.Level
	Positions   map[string]string // of every part that can be operated, by reference
	Branches    []Reading         // as Drawing.Branches
	Potentials  []Reading         // as Drawing.Potentials; their Current is 0
	Meshes      []complex128      // mesh currents in amperes, as Drawing.Meshes
	Supermeshes []Supermesh
	Equations   []Equation
	Audit       solver.Audit
}

// Reading is what a meter would show at a branch or a potential.
type Reading struct {
	Voltage, Current complex128
	Floating         bool // the voltage has no reference and is not defined
}

// Power is the power that the branch absorbs, V·conj(I), in volt-amperes.
func (r Reading) Power() complex128 { return r.Voltage * cmplx.Conj(r.Current) }

// Supermesh is a group of meshes that a current source or an open contact between them fuses.
type Supermesh struct {
	Meshes  []int // indices in Drawing.Meshes
	Through []int // indices in Drawing.Branches
}

// Solve solves every case of a sheet. A case without a solution has its Problem and does not hide the others. The error
// is ctx.Err(), wrapped, when the context ends first.
func Solve(ctx context.Context, sheet *schematic.Sheet) (*Result, error) {
	drawing := trace.Trace(sheet)
	result := &Result{Drawing: drawing, Timing: Timing{Trace: drawing.Timing.Geometry, Mesh: drawing.Timing.Meshes}}
	var err error
	if sheet.System.AC() {
		err = solveAll[complex128](ctx, sheet, result)
	} else {
		err = solveAll[float64](ctx, sheet, result)
	}
	if err != nil {
		return nil, err
	}
	return result, nil
}

func solveAll[T solver.Scalar](ctx context.Context, sheet *schematic.Sheet, result *Result) error {
	if len(result.Drawing.Branches) == 0 {
		for i := range sheet.Cases {
			c := newCase(sheet, &sheet.Cases[i])
			c.Problem = nothingToSolve()
			result.Cases = append(result.Cases, c)
		}
		return nil
	}
	start := time.Now()
	network := newNetwork[T](result.Drawing)
	laws := make([][]solver.Law[T], len(sheet.Cases))
	for i := range sheet.Cases {
		laws[i] = lawsOf[T](result.Drawing, &sheet.Cases[i])
	}
	for b := range network.Branches {
		network.Branches[b].Law = laws[0][b]
	}
	plan, err := solver.Prepare(ctx, network)
	if err != nil {
		return err
	}
	result.Timing.Solve = time.Since(start)
	for i := range sheet.Cases {
		c := newCase(sheet, &sheet.Cases[i])
		if err := solveOne(ctx, network, plan, laws[i], result, &c); err != nil {
			return err
		}
		result.Cases = append(result.Cases, c)
	}
	return nil
}

func newCase(sheet *schematic.Sheet, c *schematic.Case) Case {
	solved := Case{Name: c.Name, Supply: c.Supply, Positions: map[string]string{}}
	for i := range sheet.Parts {
		if part := &sheet.Parts[i]; part.Kind.Positions != nil {
			solved.Positions[part.Ref] = c.Position(part)
		}
	}
	return solved
}

func solveOne[T solver.Scalar](
	ctx context.Context, network *solver.Network[T], plan *solver.Plan[T], laws []solver.Law[T], result *Result, c *Case,
) error {
	solution, err := plan.Solve(ctx, laws)
	var problem *solver.Problem
	switch {
	case errors.As(err, &problem):
		c.Problem = inWords(result.Drawing, problem)
		return nil
	case err != nil:
		return err
	}
	result.Timing.Solve += solution.Timing.Solve
	result.Timing.Audit += solution.Timing.Audit
	if !solution.Audit.Passed {
		c.Problem = disagreement(solution.Audit)
		return nil
	}
	keep(result.Drawing, solution, c)
	c.Equations = equations(result.Drawing, network, solution)
	return nil
}

// keep takes over what a network's solution says of the drawing.
func keep[T solver.Scalar](drawing *trace.Drawing, solution *solver.Solution[T], c *Case) {
	c.Solved = true
	c.Audit = solution.Audit
	c.Branches = make([]Reading, len(drawing.Branches))
	for b := range c.Branches {
		c.Branches[b] = Reading{phasor(solution.Voltage[b]), phasor(solution.Current[b]), solution.FloatingBranch[b]}
	}
	c.Potentials = make([]Reading, len(drawing.Potentials))
	for p := range c.Potentials {
		c.Potentials[p] = Reading{phasor(solution.Node[p]), 0, solution.FloatingNode[p]}
	}
	c.Meshes = make([]complex128, len(drawing.Meshes))
	for m := range c.Meshes {
		c.Meshes[m] = phasor(solution.Mesh[m])
	}
	for _, super := range solution.Supermeshes {
		c.Supermeshes = append(c.Supermeshes, Supermesh(super))
	}
}
