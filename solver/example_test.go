package solver_test

import (
	"context"
	"errors"
	"fmt"

	"loopwright/solver"
)

// A supply of 24 V with 0.05 Ω feeds two coils of 576 Ω; the second one is behind an open contact.
func ExampleSolve() {
	branches := []solver.Branch[float64]{
		{From: 1, To: 0, Law: solver.Impedance(0.05, 24.0)},
		{From: 1, To: 0, Law: solver.Impedance(576.0, 0)},
		{From: 1, To: 2, Law: solver.Open[float64]()},
		{From: 2, To: 0, Law: solver.Impedance(576.0, 0)},
	}
	network := &solver.Network[float64]{Nodes: 3, Branches: branches, Meshes: solver.FundamentalLoops(3, branches)}
	solution, err := solver.Solve(context.Background(), network)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("coils: %.5f A, %.5f A\n", solution.Current[1], solution.Current[3])
	fmt.Printf("across the contact: %.5f V\n", solution.Voltage[2])
	fmt.Println("checked by two methods:", solution.Audit.Passed)
	// Output:
	// coils: 0.04166 A, 0.00000 A
	// across the contact: 23.99792 V
	// checked by two methods: true
}

// One plan solves every position of a switch.
func ExamplePlan_Solve() {
	contact := solver.Impedance(0.02, 0.0)
	contact.Row = true
	branches := []solver.Branch[float64]{
		{From: 1, To: 0, Law: solver.VoltageSource(24.0)},
		{From: 1, To: 2, Law: contact},
		{From: 2, To: 0, Law: solver.Impedance(48.0, 0)},
	}
	network := &solver.Network[float64]{Nodes: 3, Branches: branches, Meshes: solver.FundamentalLoops(3, branches)}
	plan, err := solver.Prepare(context.Background(), network)
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, position := range []solver.Law[float64]{solver.Open[float64](), contact} {
		laws := []solver.Law[float64]{branches[0].Law, position, branches[2].Law}
		solution, err := plan.Solve(context.Background(), laws)
		if err != nil {
			fmt.Println(err)
			return
		}
		fmt.Printf("%.4f A\n", solution.Current[2])
	}
	// Output:
	// 0.0000 A
	// 0.4998 A
}

// A problem names the branches that are at fault.
func ExampleProblem() {
	branches := []solver.Branch[float64]{
		{From: 1, To: 0, Law: solver.VoltageSource(24.0)},
		{From: 1, To: 0, Law: solver.Impedance(100.0, 0)},
		{From: 1, To: 0, Law: solver.Impedance(0.0, 0)},
	}
	network := &solver.Network[float64]{Nodes: 2, Branches: branches, Meshes: solver.FundamentalLoops(2, branches)}
	_, err := solver.Solve(context.Background(), network)
	var problem *solver.Problem
	if errors.As(err, &problem) {
		fmt.Println(problem.Code, problem.Branches, real(problem.Sum), "V")
	}
	// Output: shorted-source [0 2] 24 V
}
