package solver_test

import (
	"context"
	"errors"
	"math"
	"testing"

	"loopwright/solver"
)

// decode makes a network of up to eight nodes and 24 branches from bytes, four for each branch, with laws of every kind.
func decode(data []byte) *solver.Network[float64] {
	n := &solver.Network[float64]{Nodes: 8}
	count := min(len(data)/4, 24)
	for k := range count {
		from, to := int(data[4*k]&7), int(data[4*k]>>3&7)
		value := math.Ldexp(1+float64(data[4*k+1]&15), int(int8(data[4*k+2]))/2)
		if data[4*k+1]&16 != 0 {
			value = -value
		}
		n.Branches = append(n.Branches, solver.Branch[float64]{From: from, To: to, Law: decodeLaw(data[4*k+3], value, count)})
	}
	n.Meshes = solver.FundamentalLoops(n.Nodes, n.Branches)
	return n
}

func decodeLaw(kind byte, value float64, count int) solver.Law[float64] {
	other := int(kind>>3) % count
	switch kind & 7 {
	case 0:
		return solver.VoltageSource(value)
	case 1:
		return solver.CurrentSource(value)
	case 2:
		return solver.Open[float64]()
	case 3:
		return solver.Conductance(value, 0)
	case 4:
		return solver.Impedance(value, 24)
	case 5:
		return solver.Law[float64]{Beta: 1, Terms: []solver.Term[float64]{{Branch: other, Beta: value}}}
	case 6:
		return solver.Law[float64]{Alpha: 1, Terms: []solver.Term[float64]{{Branch: other, Beta: value, Alpha: 1}}}
	}
	return solver.Impedance(value, 0)
}

func FuzzEveryNetworkGivesFiniteValuesOrAProblem(f *testing.F) {
	f.Add([]byte{1, 0, 0, 0, 1, 0, 0, 7})
	f.Add([]byte{1, 7, 8, 4, 10, 0, 0, 2, 17, 9, 40, 7, 17, 9, 200, 3})
	f.Add([]byte{1, 1, 0, 0, 8, 2, 0, 0, 1, 3, 0, 7})
	f.Add([]byte{1, 0, 0, 5, 1, 0, 0, 7, 10, 0, 0, 14, 2, 0, 0, 7})
	f.Fuzz(func(t *testing.T, data []byte) {
		n := decode(data)
		solution, err := solver.Solve(context.Background(), n)
		var problem *solver.Problem
		if errors.As(err, &problem) {
			if len(problem.Branches) == 0 && problem.Code != solver.Empty {
				t.Errorf("%v names no branch", problem)
			}
			return
		}
		if err != nil {
			t.Fatal(err)
		}
		for b := range n.Branches {
			if sum := solution.Current[b] - solution.Voltage[b]; math.IsNaN(sum) || math.IsInf(sum, 0) {
				t.Errorf("branch %d carries %g A and has %g V", b, solution.Current[b], solution.Voltage[b])
			}
		}
		for _, e := range solver.Equations(n, solution) {
			if value := e.Value(solution); math.IsNaN(value) {
				t.Errorf("an equation of %v is no number", e.Of)
			}
		}
	})
}
