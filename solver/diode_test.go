package solver_test

import (
	"context"
	"encoding/json"
	"math"
	"testing"

	"loopwright/solver"
)

// diode is the junction of an example: j = is·(exp(u/(n·vt)) − 1).
type diode struct{ Is, N, Vt float64 }

// tangent is the law of the diode for small changes around a voltage.
func (d diode) tangent(u float64) solver.Law[float64] {
	slope := d.Is / (d.N * d.Vt) * math.Exp(u/(d.N*d.Vt))
	return solver.Conductance(slope, d.Is*(math.Exp(u/(d.N*d.Vt))-1)-slope*u)
}

// next limits how far a junction's voltage may rise in one step (Nagel, "SPICE2", University of California 1975: the limit
// follows the current instead of the voltage beyond the knee).
func (d diode) next(from, to float64) float64 {
	scale := d.N * d.Vt
	knee := scale * math.Log(scale/(math.Sqrt2*d.Is))
	if to <= knee || math.Abs(to-from) <= 2*scale {
		return to
	}
	if from > 0 {
		return from + scale*math.Log(max(1+(to-from)/scale, 1e-3))
	}
	return scale * math.Log(to/scale)
}

// diodeCircuit reads an example with diodes: the network, and the diodes by branch.
func diodeCircuit(t *testing.T, e *example) (*solver.Network[float64], map[string]int, map[int]diode) {
	t.Helper()
	var parts []struct {
		Ref, Type, Pos, Neg string
		Value               json.RawMessage
	}
	if err := json.Unmarshal(e.Raw, &parts); err != nil {
		t.Fatal(err)
	}
	n := &solver.Network[float64]{}
	nodes, refs, diodes := map[string]int{"0": 0}, map[string]int{}, map[int]diode{}
	node := func(name string) int {
		if _, known := nodes[name]; !known {
			nodes[name] = len(nodes)
		}
		return nodes[name]
	}
	for b, p := range parts {
		var law solver.Law[float64]
		var junction diode
		var value float64
		var err error
		if p.Type == "D" {
			err = json.Unmarshal(p.Value, &junction)
			diodes[b] = junction
			law = junction.tangent(0)
		} else {
			err = json.Unmarshal(p.Value, &value)
			law = map[string]solver.Law[float64]{
				"V": solver.VoltageSource(value), "I": solver.CurrentSource(value), "R": solver.Impedance(value, 0),
			}[p.Type]
		}
		if err != nil {
			t.Fatal(err)
		}
		refs[p.Ref] = b
		n.Branches = append(n.Branches, solver.Branch[float64]{From: node(p.Pos), To: node(p.Neg), Law: law})
	}
	n.Nodes = len(nodes)
	n.Meshes = solver.FundamentalLoops(n.Nodes, n.Branches)
	return n, refs, diodes
}

func TestIterationsWithOnePlanReachThePublishedOperatingPoints(t *testing.T) {
	for _, example := range readPublished(t).Examples {
		if example.Class != "f" {
			continue
		}
		t.Run(example.ID, func(t *testing.T) {
			n, refs, diodes := diodeCircuit(t, &example)
			solution := iterate(t, n, diodes)
			for _, want := range example.Published {
				var of string
				if err := json.Unmarshal(want.Of, &of); err != nil {
					t.Fatal(err)
				}
				got := solution.Current[refs[of]]
				if want.Quantity == "voltage" {
					got = solution.Voltage[refs[of]]
				}
				compare(t, want, want.Quantity+" of "+of, complex(got, 0))
			}
		})
	}
}

// iterate follows the tangents of the diodes until their voltages stay.
func iterate(t *testing.T, n *solver.Network[float64], diodes map[int]diode) *solver.Solution[float64] {
	t.Helper()
	plan, err := solver.Prepare(context.Background(), n)
	if err != nil {
		t.Fatal(err)
	}
	at := map[int]float64{}
	laws := lawsOf(n)
	for range 100 {
		solution, err := plan.SolveUnaudited(context.Background(), laws)
		if err != nil {
			t.Fatal(err)
		}
		settled := true
		for b, d := range diodes {
			next := d.next(at[b], solution.Voltage[b])
			settled = settled && math.Abs(next-at[b]) < 1e-12
			at[b] = next
			laws[b] = d.tangent(next)
		}
		if settled {
			if err := plan.Audit(context.Background(), solution); err != nil || !solution.Audit.Passed {
				t.Errorf("audit %+v, error %v", solution.Audit, err)
			}
			return solution
		}
	}
	t.Fatal("the iteration does not settle")
	return nil
}
